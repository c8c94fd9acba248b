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
  write("messy.shaft", hoist.replace("let block_mass = 60 kg", "let   block_mass=60   kg"));
  write("named.shaft", hoist.replace('title "Mill hoist H3"', 'title "To be renamed"'));
}

/** Whether the result of the drive stands at the end of its line. */
async function solved(editor) {
  return /14\.90 m\/min, runs up/.test((await editor.line("drive lift")) ?? "");
}

async function serverMissing(editor, { bin, server }) {
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
  return until("the new name in the cases below", async () => ((await changed()) === 3 ? "in 4 lines" : undefined));
}

export const all = [
  { name: "server missing, then found", check: serverMissing, always: true },
  { name: "results at line ends", check: results },
  { name: "highlighting", check: highlighting },
  { name: "hover with numbers and chart", check: hoverWithChart },
  { name: "squiggle, one message at it", check: squiggle },
  { name: "page of a code", check: pageOfCode },
  { name: "format", check: format },
  { name: "rename", check: rename },
];
