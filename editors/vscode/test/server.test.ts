// Finding the server on made-up machines.

import assert from "node:assert/strict";
import { test } from "node:test";

import { findServer, type Machine } from "../src/server";

function machine(programs: string[], path = "/usr/bin:/opt/bin", platform = "linux"): Machine {
  return { platform, path, home: "/users/ada", isProgram: (file) => programs.includes(file) };
}

const OWN = "/ext/server/layshaft";

test("the setting, then the extension's folder, then the path", () => {
  const all = machine(["/own/layshaft", OWN, "/opt/bin/layshaft"]);
  assert.deepEqual(findServer("/own/layshaft", "/ext", all), { program: "/own/layshaft", from: "setting" });
  assert.deepEqual(findServer("", "/ext", all), { program: OWN, from: "extension" });
  assert.deepEqual(findServer("  ", "/ext", machine(["/opt/bin/layshaft"])), { program: "/opt/bin/layshaft", from: "path" });
});

test("a setting that leads nowhere starts nothing else and is named", () => {
  const found = findServer("/gone/layshaft", "/ext", machine([OWN]));
  assert.ok("missing" in found && found.missing.includes("/gone/layshaft") && found.missing.includes("layshaft.server.path"));
  const relative = findServer("bin/layshaft", "/ext", machine(["bin/layshaft", OWN]));
  assert.ok("missing" in relative && relative.missing.includes("full path"));
});

test("the home folder by its sign", () => {
  const found = findServer("~/bin/layshaft", "/ext", machine(["/users/ada/bin/layshaft"]));
  assert.deepEqual(found, { program: "/users/ada/bin/layshaft", from: "setting" });
});

test("relative entries of the path are passed over: they lead into the open folder", () => {
  const found = findServer("", "/ext", machine(["bin/layshaft", "layshaft", "./layshaft"], ".:bin::./"));
  assert.ok("missing" in found);
});

test("what to do stands in the message", () => {
  const found = findServer("", "/ext", machine([]));
  assert.ok("missing" in found);
  for (const part of ["cargo install --path crates/layshaft", OWN, "PATH", "layshaft.server.path"]) {
    assert.ok(found.missing.includes(part), part);
  }
});

test("the names of another system", () => {
  const found = findServer("", "C:\\ext", machine(["D:\\tools\\layshaft.exe"], "C:\\Windows;D:\\tools", "win32"));
  assert.deepEqual(found, { program: "D:\\tools\\layshaft.exe", from: "path" });
});
