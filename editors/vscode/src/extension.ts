// The extension: keeps one server running, and binds commands, status and results panel to it.

import * as fs from "node:fs";
import * as os from "node:os";

import * as vscode from "vscode";
import { State, type LanguageClient } from "vscode-languageclient/node";

import { newClient, SECTION } from "./client";
import { registerCommands } from "./commands";
import { Pages } from "./pages";
import { ResultsPanel } from "./panel";
import { findServer, type Machine } from "./server";
import { Status } from "./status";

let running: Server | undefined;

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const output = vscode.window.createOutputChannel("Layshaft", { log: true });
  const status = new Status();
  const pages = new Pages(async (method, params) => {
    const client = running?.client;
    if (client?.isRunning() !== true) {
      throw new Error("it does not run");
    }
    return client.sendRequest(method, params);
  });
  const server = new Server(context, output, pages, status);
  running = server;
  const panel = new ResultsPanel(context.extensionUri, () => server.client);
  server.onReady(() => panel.refresh());
  context.subscriptions.push(output, pages, status, panel, ...registerCommands(server, panel, output, context));
  context.subscriptions.push(
    vscode.workspace.onDidChangeConfiguration((change) => {
      // Charts are agreed on when the server starts, the program is chosen then.
      if (["server.path", "charts"].some((name) => change.affectsConfiguration(`${SECTION}.${name}`))) {
        void server.restart();
      }
    }),
  );
  await server.start();
}

export async function deactivate(): Promise<void> {
  await running?.stop();
}

/** The server and the client that talks to it. */
export class Server {
  client: LanguageClient | undefined;
  private readonly ready = new vscode.EventEmitter<void>();
  readonly onReady = this.ready.event;
  /** Starts and stops follow one another, however fast they are asked for. */
  private turn: Promise<void> = Promise.resolve();

  constructor(
    private readonly context: vscode.ExtensionContext,
    private readonly output: vscode.LogOutputChannel,
    readonly pages: Pages,
    private readonly status: Status,
  ) {}

  start(): Promise<void> {
    return this.inTurn(() => this.startNow());
  }

  stop(): Promise<void> {
    return this.inTurn(() => this.stopNow());
  }

  restart(): Promise<void> {
    return this.inTurn(async () => {
      await this.stopNow();
      await this.startNow();
    });
  }

  private inTurn(work: () => Promise<void>): Promise<void> {
    this.turn = this.turn.then(work, work);
    return this.turn;
  }

  private async startNow(): Promise<void> {
    const setting = vscode.workspace.getConfiguration(SECTION).get<string>("server.path", "");
    const found = findServer(setting, this.context.extensionPath, machine());
    if ("missing" in found) {
      this.output.error(found.missing);
      this.fails("not found", found.missing);
      return;
    }
    this.output.info(`starting ${found.program} (from the ${found.from})`);
    const client = newClient(found.program, this.output, this.pages);
    this.client = client;
    client.onDidChangeState((change) => {
      if (change.newState === State.Running) {
        this.status.runs(client.initializeResult?.serverInfo?.version ?? "", found.program);
        void vscode.commands.executeCommand("setContext", "layshaft.serverRuns", true);
        this.ready.fire();
      } else if (change.newState === State.Starting) {
        this.status.starts();
      } else if (this.client === client) {
        this.status.stopped("The server has ended. The log says why.");
        void vscode.commands.executeCommand("setContext", "layshaft.serverRuns", false);
      }
    });
    try {
      await client.start();
    } catch (error) {
      const why = error instanceof Error ? error.message : String(error);
      this.client = undefined;
      this.fails("did not start", `${found.program} did not start: ${why}`);
    }
  }

  private async stopNow(): Promise<void> {
    const client = this.client;
    this.client = undefined;
    try {
      await client?.dispose();
    } catch (error) {
      // One that has crashed cannot be told to stop.
      this.output.warn(`the server did not stop in order: ${String(error)}`);
    }
  }

  private fails(short: string, why: string): void {
    this.status.stopped(why, short);
    void vscode.commands.executeCommand("setContext", "layshaft.serverRuns", false);
    const settings = "Open Setting";
    const again = "Try Again";
    const log = "Show Log";
    void vscode.window.showErrorMessage(`Layshaft: ${why}`, settings, again, log).then((choice) => {
      if (choice === settings) {
        void vscode.commands.executeCommand("workbench.action.openSettings", `${SECTION}.server.path`);
      } else if (choice === again) {
        void this.restart();
      } else if (choice === log) {
        this.output.show();
      }
    });
  }
}

function machine(): Machine {
  return {
    platform: process.platform,
    path: process.env["PATH"] ?? process.env["Path"] ?? "",
    home: os.homedir(),
    isProgram: (file) => {
      try {
        fs.accessSync(file, fs.constants.X_OK);
        return fs.statSync(file).isFile();
      } catch {
        return false;
      }
    },
  };
}
