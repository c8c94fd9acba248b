// A real VS Code in a real browser: starting it, and doing in it what hands do. Every wait is for something to be seen.

import { spawn } from "node:child_process";
import * as fs from "node:fs";
import { createRequire } from "node:module";
import * as net from "node:net";
import * as path from "node:path";

/** How long anything may take on a busy machine, in milliseconds. */
const PATIENCE = 30_000;

/** Waits until a function gives something true, and gives that. */
export async function until(what, look, patience = PATIENCE) {
  const end = Date.now() + patience;
  let last;
  for (;;) {
    try {
      last = await look();
      if (last) {
        return last;
      }
    } catch (error) {
      last = error;
    }
    if (Date.now() > end) {
      throw new Error(`not seen: ${what}${last ? ` (${String(last).split("\n")[0]})` : ""}`);
    }
    await new Promise((done) => setTimeout(done, 50));
  }
}

function freePort() {
  return new Promise((done, fail) => {
    const server = net.createServer();
    server.on("error", fail);
    server.listen(0, "127.0.0.1", () => {
      const { port } = server.address();
      server.close(() => done(port));
    });
  });
}

/** The editor's settings: no first-run pages, nothing that moves by itself. */
const SETTINGS = {
  "workbench.startupEditor": "none",
  "workbench.colorTheme": "Dark Modern",
  "workbench.secondarySideBar.defaultVisibility": "hidden",
  "workbench.tips.enabled": false,
  "window.autoDetectColorScheme": false,
  "telemetry.telemetryLevel": "off",
  "update.mode": "none",
  "extensions.autoUpdate": "off",
  "extensions.autoCheckUpdates": false,
  "extensions.ignoreRecommendations": true,
  "chat.disableAIFeatures": true,
  "editor.minimap.enabled": false,
  "editor.hover.delay": 100,
  "editor.fontSize": 13,
  "editor.lightbulb.enabled": "on",
  "files.autoSave": "off",
  "security.workspace.trust.enabled": false,
  "git.enabled": false,
};

/** Starts VS Code with a fresh profile and the packed extension. `bin` stands first on its path. */
export async function start({ work, workspace, bin, vsix }) {
  const profile = path.join(work, "run/profile");
  fs.mkdirSync(path.join(profile, "data/User"), { recursive: true });
  const port = await freePort();
  fs.writeFileSync(path.join(profile, "config.yaml"), `bind-addr: 127.0.0.1:${port}\nauth: none\ncert: false\n`);
  const entry = path.join(work, "code/node_modules/code-server/out/node/entry.js");
  const folders = ["--user-data-dir", `${profile}/data`, "--extensions-dir", `${profile}/ext`, "--config", `${profile}/config.yaml`];
  // Only the server that this test puts there may be found. VS Code asks the user's shell for its path, so that has a
  // home of its own.
  const others = (process.env.PATH ?? "").split(":").filter((folder) => !fs.existsSync(path.join(folder, "layshaft")));
  const home = path.join(work, "run/home");
  const PATH = [bin, ...others].join(":");
  fs.mkdirSync(home, { recursive: true });
  fs.writeFileSync(path.join(home, ".profile"), `export PATH='${PATH}'\n`);
  const env = { ...process.env, PATH, HOME: home, SHELL: "/bin/bash" };
  const log = fs.openSync(path.join(work, "run/code-server.log"), "w");
  const options = { env, stdio: ["ignore", log, log] };
  const installed = spawn(process.execPath, [entry, ...folders, "--install-extension", vsix], options);
  const status = await new Promise((done) => installed.on("exit", done));
  if (status !== 0) {
    throw new Error("the extension could not be installed; see code-server.log");
  }
  const flags = ["--disable-telemetry", "--disable-update-check", "--disable-workspace-trust", "--disable-getting-started-override"];
  fs.writeFileSync(path.join(profile, "data/User/settings.json"), JSON.stringify(SETTINGS, null, 2));
  const editor = new Editor(work);
  editor.server = spawn(process.execPath, [entry, ...folders, ...flags], options);
  const base = `http://127.0.0.1:${port}`;
  await until("VS Code listens", async () => (await fetch(`${base}/healthz`)).ok);
  await editor.browse(`${base}/?folder=${workspace}`);
  return editor;
}

/** A window of VS Code. */
class Editor {
  constructor(work) {
    this.work = work;
    /** What the browser refused to the panel. */
    this.complaints = [];
  }

  /** Picks a colour theme as a user does. */
  async theme(label) {
    await this.command("Preferences: Color Theme");
    const input = this.page.locator(".quick-input-widget input").first();
    await input.waitFor({ state: "visible" });
    await input.fill(label);
    await until(`the theme ${label} in the list`, async () =>
      (await this.page.locator(".quick-input-widget .monaco-list-row.focused").first().innerText()).trim().startsWith(label),
    );
    await this.page.keyboard.press("Enter");
    await input.waitFor({ state: "hidden" });
  }

  async browse(url) {
    const { chromium } = createRequire(path.join(this.work, "tools/package.json"))("playwright-core");
    this.browser = await chromium.launchPersistentContext(path.join(this.work, "run/browser"), {
      executablePath: process.env.CHROMIUM,
      headless: true,
      viewport: { width: 1440, height: 900 },
      args: ["--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync"],
    });
    const page = this.browser.pages()[0] ?? (await this.browser.newPage());
    this.page = page;
    // What the browser refuses to the panel, such as a script that its policy does not name.
    page.on("console", (message) => {
      if (/Content Security Policy|TrustedHTML|TrustedScript/.test(message.text())) {
        this.complaints.push(message.text());
      }
    });
    page.on("pageerror", (error) => {
      if (/layshaft/i.test(error.stack ?? "")) {
        this.complaints.push(String(error));
      }
    });
    await page.goto(url);
    await until("the workbench", () => page.locator(".monaco-workbench .part.statusbar").isVisible());
  }

  async close() {
    await this.browser?.close();
    this.server?.kill();
  }

  /** A picture of the whole window. */
  async picture(name) {
    await this.page.screenshot({ path: path.join(this.work, "screens", `${name}.png`), animations: "disabled" });
  }

  /** Runs a command by its title. */
  async command(title) {
    const { page } = this;
    await page.keyboard.press("F1");
    const input = page.locator(".quick-input-widget input").first();
    await input.waitFor({ state: "visible" });
    await input.fill(`>${title}`);
    const row = await until(`the command ${title}`, async () => {
      const rows = page.locator(".quick-input-widget .monaco-list-row");
      const labels = await rows.evaluateAll((rows) => rows.map((row) => row.getAttribute("aria-label") ?? ""));
      const at = labels.findIndex((label) => label === title || label.startsWith(`${title},`));
      return at >= 0 ? rows.nth(at) : undefined;
    });
    await row.click();
    // A command may ask on in the same box.
    await until(`the command ${title} taken`, async () => !(await input.isVisible()) || !(await input.inputValue()).startsWith(">"));
  }

  /** Opens a file of the workspace and waits for its text. */
  async open(file) {
    const { page } = this;
    await page.keyboard.press("Control+p");
    const input = page.locator(".quick-input-widget input").first();
    await input.waitFor({ state: "visible" });
    await input.fill(file);
    await until(`${file} among the files`, async () =>
      (await page.locator(".quick-input-widget .monaco-list-row").first().innerText()).includes(file),
    );
    await page.keyboard.press("Enter");
    await until(`${file} open`, () => page.locator(`.tab.active[data-resource-name="${file}"]`).first().isVisible());
    await until(`the text of ${file}`, async () => (await this.lines()).length > 0);
  }

  get active() {
    return this.page.locator(".editor-group-container.active .editor-instance").first();
  }

  /** The lines as they stand on the screen, from the top, hints at their ends included. */
  async lines() {
    const lines = await this.active.locator(".view-line").evaluateAll((found) =>
      found.map((line) => [line.getBoundingClientRect().top, line.textContent.replace(/\u00a0/g, " ")]),
    );
    return lines.sort((a, b) => a[0] - b[0]).map(([, text]) => text);
  }

  /** The line that begins so. */
  async line(start) {
    return (await this.lines()).find((line) => line.trimStart().startsWith(start));
  }

  /** Puts the cursor at a line and column, both from 1. */
  async goto(line, column) {
    const { page } = this;
    await page.keyboard.press("Control+g");
    const input = page.locator(".quick-input-widget input").first();
    await input.waitFor({ state: "visible" });
    await input.fill(`:${line}:${column}`);
    await page.keyboard.press("Enter");
    await until(`the cursor at ${line}:${column}`, async () =>
      new RegExp(`Ln ${line}, Col ${column}\\b`).test(await page.locator(".part.statusbar").innerText()),
    );
    await until("the text has the keys", () => page.evaluate(() => document.activeElement?.closest(".editor-instance") !== null));
  }

  /** Where a word stands on the screen: its middle. */
  async place(word, nth = 0) {
    return until(`“${word}” on the screen`, () =>
      this.active.locator(".view-lines").evaluate(
        (lines, [word, nth]) => {
          // A word may be several pieces of colour: the text of a line is searched, the place found among its pieces.
          const sorted = [...lines.querySelectorAll(".view-line")].sort((a, b) => a.getBoundingClientRect().top - b.getBoundingClientRect().top);
          let seen = 0;
          for (const line of sorted) {
            const text = line.textContent.replace(/\u00a0/g, " ");
            for (let at = text.indexOf(word); at >= 0; at = text.indexOf(word, at + 1)) {
              if (seen++ < nth) continue;
              const middle = at + Math.floor(word.length / 2);
              const walker = document.createTreeWalker(line, NodeFilter.SHOW_TEXT);
              let before = 0;
              for (let node = walker.nextNode(); node; node = walker.nextNode()) {
                if (middle < before + node.data.length) {
                  const range = document.createRange();
                  range.setStart(node, middle - before);
                  range.setEnd(node, middle - before + 1);
                  const box = range.getBoundingClientRect();
                  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
                }
                before += node.data.length;
              }
            }
          }
          return null;
        },
        [word, nth],
      ),
    );
  }

  /** Rests with the pointer on a word until something is told; gives what is told. */
  async hover(word, expected, nth = 0) {
    const { page } = this;
    await page.keyboard.press("Escape");
    const { x, y } = await this.place(word, nth);
    const box = page.locator(".monaco-hover:not(.hidden)").filter({ has: page.locator(".hover-contents") }).first();
    return until(`a hover with “${expected}”`, async () => {
      await page.mouse.move(x - 4, y);
      await page.mouse.move(x, y, { steps: 4 });
      await box.waitFor({ state: "visible", timeout: 3000 });
      const text = await box.innerText();
      return text.includes(expected) ? box : undefined;
    });
  }

  /** Puts the pointer where it does nothing. */
  async away() {
    await this.page.mouse.move(700, 885);
    await this.page.keyboard.press("Escape");
  }

  /** Messages at the corner of the window. */
  async notifications() {
    return this.page.locator(".notification-list-item").allInnerTexts();
  }

  /** The page inside the results panel. */
  async panel() {
    return until("the results panel", async () => {
      for (const frame of this.page.frames()) {
        if ((await frame.locator("main#page > *").count().catch(() => 0)) > 0) {
          return frame;
        }
      }
      return undefined;
    });
  }

  /** Puts the keys back into the text, wherever they were. */
  async intoText() {
    await this.page.locator(".editor-group-container .editor-instance .view-lines").first().click({ position: { x: 5, y: 5 } });
  }

  async closeAll() {
    await this.command("View: Close All Editors");
    await until("no editor left", async () => {
      const save = this.page.locator(".monaco-dialog-box .monaco-button", { hasText: "Don't Save" });
      if (await save.isVisible()) {
        await save.click();
      }
      return (await this.page.locator(".tab").count()) === 0;
    });
  }
}
