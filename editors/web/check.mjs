// Opens a spec in the page, in a real Chromium, and looks at what the editor got. Not a part of the tests: run it by
// hand after a change here.
// usage: node check.mjs [SPEC.shaft]      LAYSHAFT and CHROMIUM name the commands where they are not in their places
import fs from "node:fs";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { chromium } from "playwright-core";
import { serve } from "./serve.mjs";

const here = path.dirname(fileURLToPath(import.meta.url));
const given = process.argv[2] || path.join(here, "../../tests/specs/mill-hoist.shaft");
let failed = 0;

function check(name, ok, seen = "") {
  console.log(`${ok ? "ok  " : "FAIL"} ${name}${seen && `: ${String(seen).replace(/\s+/g, " ").slice(0, 140)}`}`);
  failed += ok ? 0 : 1;
}

/** Where a text stands on the screen. */
function placeOf(page, text) {
  return page.evaluate((text) => {
    const at = window.view.state.doc.toString().indexOf(text);
    window.view.dispatch({ selection: { anchor: at }, scrollIntoView: true });
    return new Promise((ready) =>
      requestAnimationFrame(() => {
        const place = window.view.coordsAtPos(at + 1);
        ready({ at, x: place.left + 2, y: (place.top + place.bottom) / 2 });
      }),
    );
  }, text);
}

const replace = (page, from, to) =>
  page.evaluate(
    ([from, to]) => {
      const at = window.view.state.doc.toString().indexOf(from);
      window.view.dispatch({ changes: { from: at, to: at + from.length, insert: to }, userEvent: "input.type" });
    },
    [from, to],
  );

const text = (page) => page.evaluate(() => window.view.state.doc.toString());

async function look(page, spec, folder) {
  await page.waitForFunction(() => /Hover/.test(document.getElementById("state").textContent), null, { timeout: 20000 });
  check("server", true, await page.locator("#state").innerText());
  check("colours", (await page.locator(".cm-line span").count()) > 20, await page.locator(".cm-line span").count());
  await page.waitForTimeout(1500);
  check("no findings in a good spec", (await page.locator(".cm-lintRange").count()) === 0);

  const drive = await placeOf(page, "lift = motor");
  await page.mouse.move(drive.x - 3, drive.y);
  await page.mouse.move(drive.x, drive.y, { steps: 4 });
  await page.waitForSelector(".cm-tooltip-hover", { timeout: 10000 });
  const hover = await page.locator(".cm-tooltip-hover").innerText();
  check("hover has the numbers", hover.includes("1447 rpm"), hover);
  await page.screenshot({ path: path.join(folder, "hover.png") });
  await page.mouse.move(5, 5);

  await replace(page, "= 60 kg ", "= 60 kgg ");
  await placeOf(page, "let block_mass");
  await page.waitForSelector(".cm-lintRange-error", { timeout: 20000 });
  check("a broken unit is told", true, await page.locator(".cm-lintRange-error").first().innerText());
  await page.screenshot({ path: path.join(folder, "finding.png") });
  await replace(page, "= 60 kgg ", "= 60 kg ");
  await page.waitForFunction(() => !document.querySelector(".cm-lintRange-error"), null, { timeout: 20000 });
  check("gone when mended", true);

  await replace(page, "let block_mass = 60 kg", "let block_mass=60 kg");
  await page.locator(".cm-content").focus();
  await page.keyboard.press("Shift+Alt+f");
  await page.waitForFunction(() => window.view.state.doc.toString().includes("let block_mass = 60 kg"), null, { timeout: 20000 });
  check("format", true);

  await placeOf(page, "block_mass = 60");
  await page.keyboard.press("F2");
  await page.locator(".cm-panel input").fill("block_weight");
  await page.keyboard.press("Enter");
  await page.waitForFunction(() => window.view.state.doc.toString().split("block_weight").length === 6, null, { timeout: 20000 });
  check("rename", !(await text(page)).includes("block_mass"));

  await page.keyboard.press("Control+s");
  await page.waitForFunction(() => /Saved/.test(document.getElementById("state").textContent), null, { timeout: 10000 });
  check("save", fs.readFileSync(spec, "utf8") === (await text(page)));
}

const folder = fs.mkdtempSync(path.join(os.tmpdir(), "layshaft-web-"));
const spec = path.join(folder, path.basename(given));
fs.copyFileSync(given, spec);
const { url, stop } = await serve(spec);
const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM || "/usr/bin/chromium",
  args: ["--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking"],
});
try {
  const page = await browser.newPage({ viewport: { width: 1000, height: 640 } });
  page.on("pageerror", (error) => check("no error in the page", false, error));
  await page.goto(url);
  await look(page, spec, folder);
} catch (error) {
  check("no error", false, error.message);
}
await browser.close();
stop();
console.log(`${failed} failed; pictures in ${folder}`);
process.exit(failed === 0 ? 0 : 1);
