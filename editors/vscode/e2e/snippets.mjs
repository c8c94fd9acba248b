// Every snippet, as it comes out where nothing is changed, is right in the language: together they are a spec that is
// checked and already in its one form.
//
//   node snippets.mjs        with LAYSHAFT in the environment

import { spawnSync } from "node:child_process";
import * as fs from "node:fs";

const snippets = JSON.parse(fs.readFileSync(new URL("../snippets/shaft.json", import.meta.url), "utf8"));

/** What stands in the text when every stop is passed over. */
function expanded({ body }) {
  const text = [body].flat().join("\n").replace(/\t/g, "    ");
  return text
    .replace(/\$\{\d+\|([^,|]*)[^|]*\|\}/g, "$1")
    .replace(/\$\{\d+:([^}]*)\}/g, "$1")
    .replace(/\$\d+/g, "");
}

const texts = Object.entries(snippets).map(([name, snippet]) => [name, expanded(snippet)]);
// An accepted warning needs one to accept; it is only looked at for its form.
const spec = texts.filter(([name]) => name !== "accepted warning");
const source = (found) => `title "Snippets"\n\n${found.map(([, text]) => text).join("\n\n")}\n`;
const run = (args, input) => spawnSync(process.env.LAYSHAFT, args, { input, encoding: "utf8", env: { ...process.env, NO_COLOR: "1" } });

const checked = run(["check", "-"], source(spec));
const errors = /\[[a-z-]+\] (?:Error|Warning)/.exec(checked.stdout + checked.stderr);
const formatted = run(["fmt", "--check", "-"], source(texts));
if (![0, 1].includes(checked.status) || errors || formatted.status !== 0) {
  console.log(source(texts), checked.stdout, checked.stderr, formatted.stdout, formatted.stderr);
  console.log("the snippets are no right spec");
  process.exit(1);
}
console.log(`${texts.length} snippets are right`);
