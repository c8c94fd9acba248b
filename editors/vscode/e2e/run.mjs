// What a user sees, one check after the other. A check that fails leaves a picture and the rest go on.
//
//   node run.mjs BUILD_FOLDER REPOSITORY        with CHROMIUM and LAYSHAFT in the environment

import * as fs from "node:fs";
import * as path from "node:path";

import { start } from "./editor.mjs";
import * as checks from "./checks.mjs";

const [work, root] = process.argv.slice(2);
const run = path.join(work, "run");
const screens = path.join(work, "screens");
const workspace = path.join(run, "specs");
const bin = path.join(run, "bin");
for (const folder of [run, screens]) {
  fs.rmSync(folder, { recursive: true, force: true });
  fs.mkdirSync(folder, { recursive: true });
}
fs.mkdirSync(bin);
// A copy, since an editor writes.
fs.cpSync(path.join(root, "tests/specs"), workspace, { recursive: true, filter: (file) => !/\.(rs|out)$|\.hand\.toml$/.test(file) });
checks.prepare(workspace);

const started = Date.now();
const seconds = () => ((Date.now() - started) / 1000).toFixed(1).padStart(5);
const wanted = process.env.ONLY?.split(",");
let failed = 0;
let done = 0;
const editor = await start({ work, workspace, bin, vsix: path.join(work, "layshaft.vsix") });
try {
  console.log(`${seconds()} s  VS Code is up`);
  for (const { name, check, always } of checks.all) {
    if (wanted && !always && !wanted.some((part) => name.includes(part))) {
      continue;
    }
    try {
      const seen = await check(editor, { bin, workspace, server: process.env.LAYSHAFT });
      done += 1;
      console.log(`${seconds()} s  ok    ${name}${seen ? `: ${String(seen).replace(/\s+/g, " ").slice(0, 150)}` : ""}`);
    } catch (error) {
      failed += 1;
      console.log(`${seconds()} s  FAIL  ${name}: ${error.message.split("\n").slice(0, 3).join(" ")}`);
      await editor.picture(`failed-${name.replace(/\W+/g, "-")}`).catch(() => {});
    }
  }
} finally {
  await editor.close();
}
console.log(`${done} passed, ${failed} failed; pictures in ${screens}`);
process.exitCode = failed === 0 && done > 0 ? 0 : 1;
