// The manifest against the server, the sources and the page for users.

import assert from "node:assert/strict";
import * as fs from "node:fs";
import { test } from "node:test";

// Tests run in the folder of the extension.
const read = (file: string) => fs.readFileSync(file, "utf8");
const manifest = JSON.parse(read("package.json")) as {
  capabilities: { untrustedWorkspaces: { supported: unknown } };
  contributes: {
    commands: { command: string; title: string; category: string }[];
    configuration: { properties: Record<string, { default: unknown; scope?: string; markdownDescription?: string }> };
    walkthroughs: { steps: { description: string; media: { markdown: string } }[] }[];
  };
};
const settings = manifest.contributes.configuration.properties;
/** Settings of the extension itself. */
const OWN = ["layshaft.server.path", "layshaft.trace.server"];

test("every setting of the server is here, and no other", () => {
  const source = read("../../crates/lsp/src/settings.rs");
  const fields = (name: string) => {
    const body = new RegExp(`pub struct ${name} \\{([^}]*)\\}`).exec(source)?.[1] ?? "";
    return [...body.matchAll(/pub (\w+): (\w+)/g)].map(([, field, type]) => [field ?? "", type ?? ""] as const);
  };
  const known = fields("Settings").flatMap(([field, type]) =>
    type === "bool" ? [`layshaft.${field}`] : fields(type).map(([inner]) => `layshaft.${field}.${inner}`),
  );
  assert.ok(known.length >= 6, `settings.rs is read wrongly: ${known.join(" ")}`);
  assert.deepEqual(Object.keys(settings).filter((name) => !OWN.includes(name)).sort(), known.sort());
});

test("a workspace cannot choose the program", () => {
  assert.equal(settings["layshaft.server.path"]?.scope, "machine");
  assert.equal(manifest.capabilities.untrustedWorkspaces.supported, true);
});

test("every setting and command stands on the page for users", () => {
  const page = read("README.md");
  for (const [name, setting] of Object.entries(settings)) {
    assert.ok(page.includes(`\`${name}\``), `${name} is not in README.md`);
    assert.ok((setting.markdownDescription ?? "").length > 20, `${name} is not described`);
  }
  for (const { title } of manifest.contributes.commands) {
    assert.ok(page.includes(title), `“${title}” is not in README.md`);
  }
});

test("every command is registered, and no other", () => {
  const registered = [...read("src/commands.ts").matchAll(/command\("(layshaft\.\w+)"/g)].map(([, name]) => name);
  assert.deepEqual(registered.sort(), manifest.contributes.commands.map(({ command }) => command).sort());
});

test("the walkthrough leads somewhere", () => {
  const commands = manifest.contributes.commands.map(({ command }) => command);
  for (const { description, media } of manifest.contributes.walkthroughs.flatMap(({ steps }) => steps)) {
    assert.ok(fs.existsSync(media.markdown), media.markdown);
    for (const [, command] of description.matchAll(/\(command:([\w.]+)/g)) {
      assert.ok(!command?.startsWith("layshaft.") || commands.includes(command), command);
    }
  }
});
