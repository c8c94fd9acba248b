// Writes the `shaft` examples of Markdown pages into a folder, one file each, for a parser to read.
// usage: node examples.cjs OUT PAGE.md…
"use strict";
const fs = require("fs");
const path = require("path");

const [out, ...pages] = process.argv.slice(2);
fs.rmSync(out, { recursive: true, force: true });
fs.mkdirSync(out, { recursive: true });
let count = 0;
for (const page of pages) {
  const blocks = fs.readFileSync(page, "utf8").split(/^```/m);
  // Every other piece stands between fences; its first line says what it is.
  blocks.forEach((block, index) => {
    const [, info, text] = /^([^\n]*)\n([^]*)$/.exec(block) || [];
    if (index % 2 === 0 || !info || !/^shaft\b/.test(info)) return;
    const kind = info.replace("shaft", "").trim() || "whole";
    count += 1;
    fs.writeFileSync(path.join(out, `${path.basename(page, ".md")}-${index}-${kind}.shaft`), text);
  });
}
console.log(`${count} examples`);
