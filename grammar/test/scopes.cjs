// Takes specs apart with the TextMate grammar, in the engine VS Code uses, and compares with scopes.txt: a line of a
// spec, and below it lines `^^^ scope`, the marks under the characters that must have that scope, `-` before a scope
// they must not have.
// usage: node scopes.cjs FILE.shaft… (the files are only looked through for what has no scope)
"use strict";
const fs = require("fs");
const path = require("path");
const { Registry, parseRawGrammar, INITIAL } = require("vscode-textmate");
const oniguruma = require("vscode-oniguruma");

const folder = path.resolve(__dirname, "..");
const file = path.join(folder, "layshaft.tmLanguage.json");

async function grammar() {
  const wasm = fs.readFileSync(require.resolve("vscode-oniguruma/release/onig.wasm"));
  await oniguruma.loadWASM(wasm.buffer.slice(wasm.byteOffset, wasm.byteOffset + wasm.byteLength));
  const registry = new Registry({
    onigLib: Promise.resolve({
      createOnigScanner: (patterns) => new oniguruma.OnigScanner(patterns),
      createOnigString: (text) => new oniguruma.OnigString(text),
    }),
    loadGrammar: async () => parseRawGrammar(fs.readFileSync(file, "utf8"), file),
  });
  return registry.loadGrammar("source.shaft");
}

/** The scopes of every character of a line, without that of the file. */
function scopes(tokens, length) {
  const all = new Array(length).fill([]);
  for (const token of tokens) all.fill(token.scopes.slice(1), token.startIndex, Math.min(token.endIndex, length));
  return all;
}

function compare(found, mark, line, at) {
  const [, marks, scope] = /^([ ]*\^+) (\S+)$/.exec(mark) || [];
  if (!scope) return [`line ${at}: \`${mark}\` is no mark`];
  const wrong = [];
  const [not, name] = scope.startsWith("-") ? [true, scope.slice(1)] : [false, scope];
  for (let column = marks.indexOf("^"); column < marks.length; column++) {
    const here = found[column] || [];
    const has = here.some((one) => one === `${name}.shaft` || one.startsWith(`${name}.`));
    if (has === not) wrong.push(`line ${at}, \`${line[column]}\` of \`${line}\`: ${scope} wanted, has ${here}`);
  }
  return wrong.slice(0, 1);
}

function marked(language) {
  const wrong = [];
  let state = INITIAL;
  let line = "";
  let found = [];
  let marks = 0;
  fs.readFileSync(path.join(__dirname, "scopes.txt"), "utf8").split("\n").forEach((text, index) => {
    if (/^ *\^/.test(text)) {
      marks += 1;
      return wrong.push(...compare(found, text, line, index + 1));
    }
    const result = language.tokenizeLine(text, state);
    state = result.ruleStack;
    line = text;
    found = scopes(result.tokens, text.length);
  });
  return { wrong, marks };
}

/** Letters and digits of a good spec that no rule colours. */
function bare(language, spec) {
  const wrong = [];
  let state = INITIAL;
  fs.readFileSync(spec, "utf8").split("\n").forEach((text, index) => {
    const result = language.tokenizeLine(text, state);
    state = result.ruleStack;
    for (const token of result.tokens) {
      const words = text.slice(token.startIndex, token.endIndex);
      if (token.scopes.length === 1 && /[\p{L}\p{N}]/u.test(words)) {
        wrong.push(`${path.basename(spec)}:${index + 1}: \`${words.trim()}\` has no scope`);
      }
    }
  });
  return wrong;
}

(async () => {
  const language = await grammar();
  const { wrong, marks } = marked(language);
  const specs = process.argv.slice(2);
  wrong.push(...specs.flatMap((spec) => bare(language, spec)));
  wrong.forEach((line) => console.log(line));
  console.log(`${marks} marks and ${specs.length} specs looked at, ${wrong.length} wrong`);
  process.exit(wrong.length === 0 && marks > 0 ? 0 : 1);
})();
