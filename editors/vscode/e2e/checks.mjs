// The checks, in the order in which they run.

import * as fs from "node:fs";
import * as path from "node:path";

import { until } from "./editor.mjs";

/** Something must be true. */
function must(condition, what) {
  if (!condition) {
    throw new Error(what);
  }
}

const HOIST = "mill-hoist.shaft";

/** Specs for single checks beside the copied ones. */
export function prepare(workspace) {
  const hoist = fs.readFileSync(path.join(workspace, HOIST), "utf8");
  const write = (name, text) => {
    must(text !== hoist, `${name} is to differ from ${HOIST}`);
    fs.writeFileSync(path.join(workspace, name), text);
  };
  write("broken.shaft", hoist.replace("rated_power = 4 kW", "rated_power = 4 kg"));
  write("unit.shaft", hoist.replace("rated_power = 4 kW", "rated_power = 4 kw"));
  write("messy.shaft", hoist.replace("let block_mass = 60 kg", "let   block_mass=60   kg"));
  write("typed.shaft", hoist.replace('title "Mill hoist H3"', 'title "To be typed in"'));
  write("named.shaft", hoist.replace('title "Mill hoist H3"', 'title "To be renamed"'));
}

/** Whether the result of the drive stands at the end of its line. */
async function solved(editor) {
  return /14\.90 m\/min, runs up/.test((await editor.line("drive lift")) ?? "");
}

/** The server as the extension finds it. */
let program = "";

async function serverMissing(editor, { bin, server }) {
  program = path.join(bin, "layshaft");
  await editor.open(HOIST);
  const told = await until("a message that the server is missing", async () =>
    (await editor.notifications()).find((text) => text.includes("was not found")),
  );
  must(told.includes("cargo install"), `it does not say what to do: ${told}`);
  must(told.includes("layshaft.server.path"), `it does not name the setting: ${told}`);
  await editor.picture("server-missing");
  // The user does what the message says.
  fs.symlinkSync(server, path.join(bin, "layshaft"));
  await editor.page.locator(".notification-list-item .monaco-button", { hasText: "Try Again" }).click();
  await until("results after Try Again", () => solved(editor));
  return told;
}

async function results(editor) {
  await until("a result at the end of the drive's line", () => solved(editor));
  const part = await editor.line("transmission reducer");
  must(/912\.2 N·m · 35\.12 rpm$/.test(part ?? ""), `no result at the part: ${part}`);
  await editor.goto(58, 1);
  return until("the verdict at the criterion", async () => {
    const criterion = await editor.line('require "H3-4');
    return /53\.4/.test(criterion?.split("1.5").pop() ?? "") ? criterion : undefined;
  });
}

async function highlighting(editor) {
  await editor.goto(58, 1);
  await until("a criterion on the screen", () => editor.line('require "H3-1'));
  const classes = await editor.active.locator(".view-line", { hasText: "require" }).first().locator("span span[class^=mtk]").evaluateAll((spans) =>
    spans.map((span) => [span.textContent.trim(), getComputedStyle(span).color]),
  );
  const colour = (word) => classes.find(([text]) => text.includes(word))?.[1];
  must(colour("require") !== undefined && colour("require") !== colour("H3-1"), `keyword and clause look alike: ${JSON.stringify(classes)}`);
  must(new Set(classes.map(([, colour]) => colour)).size >= 3, `hardly any colours: ${JSON.stringify(classes)}`);
  return classes.length;
}

async function hoverWithChart(editor) {
  const box = await editor.hover("motor ->", "1447 rpm");
  const image = await until("the chart in the hover", async () => {
    const seen = await box.locator("img").evaluateAll((images) => images.map((i) => ({ alt: i.alt, width: i.naturalWidth, shown: i.offsetWidth })));
    return seen.find(({ alt, width, shown }) => alt.includes("over speed") && width > 0 && shown > 0);
  });
  const text = await box.innerText();
  must(text.includes("3.569 kW"), `no power in the hover: ${text}`);
  await box.locator("img").scrollIntoViewIfNeeded();
  await editor.picture("hover");
  await editor.away();
  return image.alt;
}

async function squiggle(editor) {
  await editor.open("broken.shaft");
  await until("a wavy line", async () => (await editor.active.locator(".squiggly-error").count()) > 0);
  const box = await editor.hover("4 kg", "kind-mismatch");
  const text = await box.innerText();
  await editor.picture("squiggle");
  await editor.away();
  await editor.command("Problems: Focus on Problems View");
  const rows = await until("the problems", async () => {
    const rows = await editor.page.locator(".markers-panel .monaco-list-row").allInnerTexts();
    return rows.length > 1 ? rows : undefined;
  });
  must(rows.filter((row) => /kind-mismatch/.test(row)).length === 1, `not told once: ${rows.join(" | ")}`);
  await editor.command("View: Toggle Panel Visibility");
  return text;
}

async function pageOfCode(editor) {
  await editor.open("broken.shaft");
  const box = await editor.hover("4 kg", "kind-mismatch");
  await box.locator("a.code-link, a", { hasText: "kind-mismatch" }).first().click();
  const text = await until("the page of the code", async () => {
    for (const frame of editor.page.frames()) {
      const heading = await frame.locator("h1").first().innerText({ timeout: 200 }).catch(() => "");
      if (heading.includes("kind-mismatch")) {
        return heading;
      }
    }
    return undefined;
  });
  await editor.picture("page-of-code");
  return text;
}

async function format(editor) {
  await editor.closeAll();
  await editor.open("messy.shaft");
  must(((await editor.line("let   block")) ?? "").includes("block_mass=60"), "the line is not messy to begin with");
  await until("the server answers", () => solved(editor));
  await editor.command("Format Document");
  return until("the line in its one form", () => editor.line("let block_mass = 60 kg"));
}

async function rename(editor) {
  await editor.open("named.shaft");
  await until("the server answers", () => solved(editor));
  await editor.goto(5, 6);
  await editor.page.keyboard.press("F2");
  const box = editor.page.locator(".rename-box input, .monaco-editor.rename-box input").first();
  await until("the box with the old name", async () => (await box.inputValue()) === "block_mass");
  await box.fill("hook_block");
  await box.press("Enter");
  const changed = async () => {
    const lines = await editor.lines();
    return lines.some((line) => line.includes("block_mass")) ? 0 : lines.filter((line) => line.includes("hook_block")).length;
  };
  await until("the new name where it is declared and where it is used", async () => (await changed()) === 2);
  await editor.goto(60, 1);
  return until("the new name in the cases below", async () => ((await changed()) === 2 ? "in 4 lines" : undefined));
}

async function quickFix(editor) {
  await editor.open("unit.shaft");
  await until("a wavy line", async () => (await editor.active.locator(".squiggly-error").count()) > 0);
  await editor.goto(11, 21);
  await editor.page.keyboard.press("Control+.");
  const menu = editor.page.locator(".action-widget .monaco-list-row");
  const offer = await until("the fix among what is offered", async () => {
    const rows = await menu.allInnerTexts();
    return rows.find((row) => row.includes("kW"));
  });
  await editor.picture("quick-fix");
  await menu.filter({ hasText: offer.trim().split("\n")[0] }).first().click();
  await until("the unit mended", async () => /rated_power = 4 kW/.test((await editor.line("rated_power")) ?? ""));
  await until("no wavy line", async () => (await editor.active.locator(".squiggly-error").count()) === 0);
  return offer;
}

async function completion(editor) {
  await editor.open("typed.shaft");
  await until("the server answers", async () => /14\.90/.test((await editor.line("drive lift")) ?? ""));
  await editor.goto(17, 26);
  await editor.page.keyboard.press("End");
  await editor.page.keyboard.press("Enter");
  await editor.page.keyboard.type("bra");
  const rows = editor.page.locator(".suggest-widget.visible .monaco-list-row");
  const offered = await until("the field among what is offered", async () => {
    const texts = await rows.allInnerTexts();
    return texts.find((text) => /^braking/.test(text.trim()));
  });
  await editor.picture("completion");
  await editor.page.keyboard.press("Escape");
  return offered;
}

async function restart(editor) {
  const before = serverProcesses();
  must(before.length === 1, `${before.length} servers run`);
  await editor.command("Layshaft: Restart Server");
  const after = await until("one other server", () => {
    const now = serverProcesses();
    return now.length === 1 && now[0] !== before[0] ? now : undefined;
  });
  await editor.open("typed.shaft");
  await until("results from the new server", () => solved(editor));
  return `process ${before[0]} became ${after[0]}`;
}

/** The servers that run from the folder of this test. */
function serverProcesses() {
  return fs.readdirSync("/proc").filter((pid) => {
    try {
      return /^\d+$/.test(pid) && fs.readFileSync(`/proc/${pid}/cmdline`, "utf8").startsWith(`${program}\0lsp`);
    } catch {
      return false;
    }
  });
}

/** What the panel shows now, as texts. */
async function panelSays(panel) {
  return panel.evaluate(() => {
    const text = (selector) => document.querySelector(selector)?.textContent ?? "";
    const rows = (id) => [...document.querySelectorAll(`#${id} tbody tr`)].map((row) => [...row.children].map((cell) => cell.textContent));
    return {
      title: text("h1"),
      of: text(".of"),
      station: text(".chip.picked"),
      here: text(".chart .tick.here"),
      names: [...document.querySelectorAll(".chart .name")].map((name) => name.textContent),
      required: document.querySelector(".chart polyline.required")?.getAttribute("points") ?? "",
      points: rows("points"),
      cases: rows("cases"),
      criteria: rows("criteria"),
      results: rows("results"),
      picked: document.querySelector('input[name="case"]:checked')?.id ?? "",
      notice: text(".notice"),
      focused: document.activeElement?.id ?? "",
    };
  });
}

async function panelOpens(editor) {
  await editor.closeAll();
  await editor.open(HOIST);
  await until("the server answers", () => solved(editor));
  await editor.goto(9, 10);
  await editor.command("Layshaft: Show Results");
  const panel = await editor.panel();
  const says = await until("the chart", async () => {
    const says = await panelSays(panel);
    return says.required === "" ? undefined : says;
  });
  must(says.title === "lift", `another drive: ${says.title}`);
  must(says.station === "at the cursor: motor", `another station: ${says.station}`);
  must(says.here === "1447 rpm", `another speed at the axis: ${says.here}`);
  for (const name of ["available", "required", "runs here", "most 9.668 kW"]) {
    must(says.names.includes(name), `${name} is not written in the chart: ${says.names}`);
  }
  must(says.points.length === 1 && says.points[0].includes("1447 rpm") && /stable/.test(says.points[0][0]), `points: ${says.points}`);
  must(says.cases.length === 1 + 15, `${says.cases.length} cases`);
  must(says.criteria.length === 6, `${says.criteria.length} criteria`);
  must(says.results.some(([name, value]) => name === "motor.peak_power" && value === "9.668 kW"), "no peak power in the table");
  must(editor.complaints.length === 0, `the browser refused: ${editor.complaints[0]}`);
  await editor.picture("panel-dark");
  return `${says.points[0].join(" ")}; ${says.cases.length - 1} cases`;
}

async function panelCase(editor) {
  const panel = await editor.panel();
  const before = await panelSays(panel);
  const label = before.cases.find(([name]) => name.includes("test_load") && name.includes("reverse"))?.[0];
  must(label !== undefined, `no such case: ${before.cases.map(([name]) => name)}`);
  await panel.locator("#cases label", { hasText: label }).locator("input").check();
  const says = await until(`the case ${label}`, async () => {
    const says = await panelSays(panel);
    return says.of.includes(label) && says.required !== before.required ? says : undefined;
  });
  must(says.here !== before.here, "the speed reached is the same");
  must(says.points.some((point) => point.includes("braking")), `a load let down is braked: ${says.points}`);
  await panel.evaluate(() => window.scrollTo(0, 0));
  await editor.picture("panel-case");
  // The same with keys: one down, and back to the cursor.
  await panel.locator("#case-cursor").focus();
  await editor.page.keyboard.press("Space");
  await until("the cursor's case", async () => (await panelSays(panel)).picked === "case-cursor");
  await editor.page.keyboard.press("ArrowDown");
  const first = await until("the first case, the keys still there", async () => {
    const says = await panelSays(panel);
    return says.picked === "case-0" && says.focused === "case-0" && says.required === before.required ? says : undefined;
  });
  must(first.here === before.here, `plain runs at ${first.here}, not as before at ${before.here}`);
  await editor.page.keyboard.press("ArrowUp");
  await until("the cursor's case again", async () => (await panelSays(panel)).picked === "case-cursor");
  return `${before.here} became ${says.here}`;
}

async function panelKeys(editor) {
  const panel = await editor.panel();
  await panel.locator("#chart").focus();
  await editor.page.keyboard.press("Home");
  const reading = () => panel.locator("#reading").innerText();
  const first = await until("a reading", async () => ((await reading()).startsWith("0 rpm") ? reading() : undefined));
  for (let step = 0; step < 3; step += 1) {
    await editor.page.keyboard.press("ArrowRight");
  }
  const second = await until("another reading", async () => ((await reading()) !== first ? reading() : undefined));
  must(/available [\d.]+ N·m/.test(second) && /required [\d.]+ N·m/.test(second), second);
  return second;
}

async function panelFollows(editor) {
  const panel = await editor.panel();
  await editor.intoText();
  await editor.goto(23, 16);
  const says = await until("the reducer", async () => {
    const says = await panelSays(panel);
    return says.station === "at the cursor: reducer" && says.here === "35.12 rpm" ? says : undefined;
  });
  // What is typed is seen at once, and what cannot be solved leaves the last picture.
  const type = async (text) => {
    await editor.goto(4, 22);
    await editor.page.keyboard.press("Shift+ArrowLeft");
    await editor.page.keyboard.type(text);
  };
  await editor.goto(4, 22);
  const motor = await until("the motor, where the cursor is on no part", async () => {
    const now = await panelSays(panel);
    return now.station === "at the cursor: motor" && now.here === "1447 rpm" ? now : undefined;
  });
  await type("9");
  await until("what was typed", async () => /1259 kg/.test(await editor.line("let rated_load")));
  const heavier = await until("a heavier load", async () => {
    const now = await panelSays(panel);
    return now.required !== motor.required && now.required !== "" ? now : undefined;
  });
  await type("+");
  await until("the last picture, marked as old", async () => {
    const now = await panelSays(panel);
    return /As it was before/.test(now.notice) && now.required === heavier.required ? now : undefined;
  });
  await panel.evaluate(() => window.scrollTo(0, 0));
  await editor.picture("panel-old");
  await type("0");
  await until("as it was", async () => {
    const now = await panelSays(panel);
    return now.notice === "" && now.required === motor.required;
  });
  return says.here;
}

/** Contrast of two colours, as the rules for readable pages reckon it (WCAG 2, relative luminance). */
function contrast(one, other) {
  const luminance = (colour) => {
    const most = colour.startsWith("color(") ? 1 : 255;
    const parts = colour.match(/[\d.]+/g).slice(0, 3).map((part) => Number(part) / most);
    const [r, g, b] = parts.map((part) => (part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4));
    return 0.2126 * r + 0.7152 * g + 0.0722 * b;
  };
  const [low, high] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (high + 0.05) / (low + 0.05);
}

async function themes(editor) {
  const panel = await editor.panel();
  await editor.intoText();
  await editor.goto(9, 10);
  await until("the motor", async () => (await panelSays(panel)).station === "at the cursor: motor");
  const out = [];
  for (const [theme, kind, name] of [
    ["Light Modern", "vscode-light", "panel-light"],
    ["Dark High Contrast", "vscode-high-contrast", "panel-high-contrast"],
    ["Light High Contrast", "vscode-high-contrast-light", "panel-high-contrast-light"],
    ["Dark Modern", "vscode-dark", "panel-dark-again"],
  ]) {
    await editor.theme(theme);
    await until(theme, () => panel.evaluate((kind) => document.body.classList.contains(kind), kind));
    const colours = await until(`the colours of ${theme}`, () =>
      panel.evaluate(() => {
        const style = (selector) => getComputedStyle(document.querySelector(selector));
        return {
          ground: getComputedStyle(document.body).backgroundColor,
          text: [style("#results td").color, style(".chart .name").fill, style(".chart .tick").fill, style("thead th").color],
          lines: [style(".chart polyline.available").stroke, style(".chart polyline.required").stroke, style(".chart .point circle").stroke],
        };
      }),
    );
    for (const colour of colours.text) {
      must(contrast(colour, colours.ground) >= 4.5, `${theme}: text ${colour} on ${colours.ground}`);
    }
    for (const colour of colours.lines) {
      must(contrast(colour, colours.ground) >= 3, `${theme}: line ${colour} on ${colours.ground}`);
    }
    await panel.evaluate(() => window.scrollTo(0, 0));
    if (name !== "panel-dark-again") {
      await editor.picture(name);
    }
    out.push(kind);
  }
  return out.join(", ");
}

async function resultTable(editor) {
  await editor.closeAll();
  await editor.open(HOIST);
  await until("the server answers", () => solved(editor));
  await editor.goto(38, 8);
  await editor.command("Layshaft: Show Result Table of Drive");
  const text = await until("the page with the table", async () => {
    for (const frame of editor.page.frames()) {
      const heading = await frame.locator("h1").first().innerText({ timeout: 200 }).catch(() => "");
      if (heading.includes("Mill hoist H3: lift")) {
        return (await frame.locator("table").count()) > 0 ? heading : undefined;
      }
    }
    return undefined;
  });
  await editor.picture("result-table");
  return text;
}

export const all = [
  { name: "server missing, then found", check: serverMissing, always: true },
  { name: "results at line ends", check: results },
  { name: "highlighting", check: highlighting },
  { name: "hover with numbers and chart", check: hoverWithChart },
  { name: "squiggle, one message at it", check: squiggle },
  { name: "page of a code", check: pageOfCode },
  { name: "restart", check: restart },
  { name: "quick fix", check: quickFix },
  { name: "completion", check: completion },
  { name: "format", check: format },
  { name: "rename", check: rename },
  { name: "panel opens with chart and numbers", check: panelOpens },
  { name: "panel: another case", check: panelCase },
  { name: "panel: read with keys", check: panelKeys },
  { name: "panel follows the cursor and the text", check: panelFollows },
  { name: "panel in every theme", check: themes },
  { name: "result table as a page", check: resultTable },
];
