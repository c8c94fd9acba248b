// Where the server is: the setting, then the extension's own folder, then the path. Nothing of the editor is used here.

import * as path from "node:path";

/** What the search may ask of the machine. */
export interface Machine {
  /** `process.platform`. */
  readonly platform: string;
  /** The variable `PATH`. */
  readonly path: string;
  /** The user's home folder. */
  readonly home: string;
  /** Whether this is a file that can be run. */
  isProgram(file: string): boolean;
}

/** The program, or why there is none, in words for the user. */
export type Search = { readonly program: string; readonly from: Origin } | { readonly missing: string };

/** What led to the program. */
export type Origin = "setting" | "extension" | "path";

/**
 * Looks for the program. A setting that leads nowhere is an error: another program than the one asked for is never
 * started in its place.
 */
export function findServer(setting: string, extension: string, machine: Machine): Search {
  const { join, isAbsolute, delimiter } = machine.platform === "win32" ? path.win32 : path.posix;
  const name = machine.platform === "win32" ? "layshaft.exe" : "layshaft";
  const wanted = setting.trim();
  if (wanted !== "") {
    const file = /^~[/\\]/.test(wanted) ? join(machine.home, wanted.slice(2)) : wanted;
    if (!isAbsolute(file)) {
      return { missing: `The setting layshaft.server.path is “${wanted}”. It must be a full path.` };
    }
    if (!machine.isProgram(file)) {
      return { missing: `The setting layshaft.server.path names ${file}, where there is no program that can be run.` };
    }
    return { program: file, from: "setting" };
  }
  const own = join(extension, "server", name);
  if (machine.isProgram(own)) {
    return { program: own, from: "extension" };
  }
  // A relative entry of PATH would lead into the folder that is open, which nobody has trusted to run programs.
  const folders = machine.path.split(delimiter).filter((folder) => isAbsolute(folder));
  for (const folder of folders) {
    const file = join(folder, name);
    if (machine.isProgram(file)) {
      return { program: file, from: "path" };
    }
  }
  return {
    missing:
      `The program ${name} was not found: not in the extension (${own}) and not on the PATH. ` +
      "Install it with “cargo install --path crates/layshaft” in a copy of the repository, " +
      "or say where it is in the setting layshaft.server.path.",
  };
}
