// Builds the extension into a folder of its own, ready to be packed: nothing that is built stands beside the sources.
//
//   node build.mjs         bundles, and puts beside the bundle what the repository has once: grammar, licence, first spec
//   node build.mjs vsix    the same, and packs it; the packer is fetched, or named by VSCE
//   node build.mjs test    bundles the tests and runs them
//
// LAYSHAFT_SERVER=path/to/layshaft puts that program into the package; it is then good for this platform alone.

import { spawnSync } from "node:child_process";
import * as fs from "node:fs";
import * as path from "node:path";
import { fileURLToPath } from "node:url";

import * as esbuild from "esbuild";

const here = path.dirname(fileURLToPath(import.meta.url));
const root = path.join(here, "../..");
const target = process.env.CARGO_TARGET_DIR ?? path.join(root, "target");
const out = path.join(target, "editors/vscode");
const common = { bundle: true, logLevel: "warning", absWorkingDir: here, metafile: true };

/** Files that are packed as they are: from where, by what name. */
const COPIED = [
  ["README.md", "README.md"],
  ["language-configuration.json", "language-configuration.json"],
  ["snippets", "snippets"],
  ["walkthrough", "walkthrough"],
  ["icons", "icons"],
  ["src/view/view.css", "dist/view.css"],
  ["../../LICENSE", "LICENSE"],
  ["../../grammar/layshaft.tmLanguage.json", "grammar/layshaft.tmLanguage.json"],
  ["../../crates/layshaft/src/starter.shaft", "starter.shaft"],
];

async function buildPackage() {
  const folder = path.join(out, "package");
  fs.rmSync(folder, { recursive: true, force: true });
  fs.mkdirSync(folder, { recursive: true });
  const extension = await esbuild.build({
    ...common,
    entryPoints: ["src/extension.ts"],
    outfile: path.join(folder, "dist/extension.js"),
    platform: "node",
    format: "cjs",
    target: "node20",
    external: ["vscode"],
    minifySyntax: true,
    minifyWhitespace: true,
  });
  const view = await esbuild.build({
    ...common,
    entryPoints: ["src/view/main.ts"],
    outfile: path.join(folder, "dist/view.js"),
    platform: "browser",
    format: "iife",
    target: "es2022",
  });
  for (const [from, to] of COPIED) {
    fs.cpSync(path.join(here, from), path.join(folder, to), { recursive: true });
  }
  const manifest = JSON.parse(fs.readFileSync(path.join(here, "package.json"), "utf8"));
  for (const only of ["scripts", "devDependencies", "dependencies", "private"]) {
    delete manifest[only];
  }
  fs.writeFileSync(path.join(folder, "package.json"), `${JSON.stringify(manifest, null, 2)}\n`);
  fs.writeFileSync(path.join(folder, "NOTICES.txt"), notices([extension, view]));
  if (process.env.LAYSHAFT_SERVER) {
    const name = process.platform === "win32" ? "layshaft.exe" : "layshaft";
    fs.mkdirSync(path.join(folder, "server"));
    fs.copyFileSync(process.env.LAYSHAFT_SERVER, path.join(folder, "server", name));
    fs.chmodSync(path.join(folder, "server", name), 0o755);
  }
  return folder;
}

/** Packs what was built. */
async function buildVsix() {
  const folder = await buildPackage();
  const file = path.join(out, "layshaft.vsix");
  const [program, ...first] = process.env.VSCE ? [process.execPath, process.env.VSCE] : ["npx", "--yes", "@vscode/vsce@4.1.0"];
  // Bundled, so there are no dependencies to look for; links of the page lead inside the package.
  const flags = ["--no-dependencies", "--allow-missing-repository", "--no-rewrite-relative-links", "-o", file];
  const done = spawnSync(program, [...first, "package", ...flags], { cwd: folder, encoding: "utf8" });
  if (done.status !== 0) {
    throw new Error(`the package was not made: ${done.error ?? ""}\n${done.stdout}${done.stderr}`);
  }
  console.log(file);
}

/** The licences of what is in the bundles. */
function notices(results) {
  const inputs = results.flatMap((result) => Object.keys(result.metafile.inputs));
  const folders = inputs.flatMap((input) => /^.*node_modules\/(?:@[^/]+\/)?[^/]+/.exec(input) ?? []);
  const texts = [...new Set(folders)].sort().map((folder) => {
    const { name, version, license } = JSON.parse(fs.readFileSync(path.join(here, folder, "package.json"), "utf8"));
    const file = fs.readdirSync(path.join(here, folder)).find((file) => /^licen[cs]e/i.test(file));
    if (file === undefined) {
      throw new Error(`${name} has no licence file`);
    }
    return `${name} ${version} (${license})\n\n${fs.readFileSync(path.join(here, folder, file), "utf8").trim()}\n`;
  });
  return `The extension holds parts of these packages.\n\n${texts.join(`\n${"-".repeat(72)}\n\n`)}`;
}

async function runTests() {
  const folder = path.join(out, "unit");
  fs.rmSync(folder, { recursive: true, force: true });
  const tests = fs.readdirSync(path.join(here, "test")).filter((file) => file.endsWith(".test.ts"));
  await esbuild.build({
    ...common,
    entryPoints: tests.map((file) => `test/${file}`),
    outdir: folder,
    outExtension: { ".js": ".mjs" },
    platform: "node",
    format: "esm",
    target: "node20",
    sourcemap: "inline",
  });
  const files = tests.map((file) => path.join(folder, file.replace(/\.ts$/, ".mjs")));
  const done = spawnSync(process.execPath, ["--test", "--enable-source-maps", ...files], { stdio: "inherit", cwd: here });
  process.exitCode = done.status ?? 1;
}

const tasks = { vsix: buildVsix, test: runTests, undefined: async () => console.log(await buildPackage()) };
await tasks[process.argv[2]]();
