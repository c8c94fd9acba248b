// The results panel: asks the server about the place of the cursor and hands the answer to the page of the panel.

import { randomBytes } from "node:crypto";

import * as vscode from "vscode";
import { LSPErrorCodes, ResponseError, type LanguageClient } from "vscode-languageclient/node";

import { isSpec } from "./client";
import { choiceOf, isResults, RESULTS, type Choice, type FromPage, type Results, type ToPage } from "./results";

const TYPE = "layshaft.results";
/** Rest after the last movement or key before the server is asked, in milliseconds. */
const REST = 80;
/** The same where the text changed while it was asked. */
const AGAIN = 250;

/** The panel, open or not. */
export class ResultsPanel implements vscode.Disposable {
  private panel: vscode.WebviewPanel | undefined;
  private ready = false;
  /** The spec that is shown, and where in it the cursor stands. */
  private at: { uri: vscode.Uri; position: vscode.Position } | undefined;
  private choice: Choice = {};
  private shown: Results | undefined;
  private timer: NodeJS.Timeout | undefined;
  private asking: vscode.CancellationTokenSource | undefined;
  private readonly following: vscode.Disposable;

  constructor(
    private readonly extension: vscode.Uri,
    private readonly client: () => LanguageClient | undefined,
  ) {
    this.following = vscode.Disposable.from(
      vscode.window.onDidChangeTextEditorSelection((event) => this.follow(event.textEditor)),
      vscode.window.onDidChangeActiveTextEditor((editor) => this.follow(editor)),
      vscode.workspace.onDidChangeTextDocument((event) => this.changed([event.document.uri])),
      vscode.workspace.onDidSaveTextDocument(() => this.schedule(AGAIN)),
      // Another file that the spec uses may have changed.
      vscode.languages.onDidChangeDiagnostics((event) => this.changed(event.uris)),
      vscode.window.registerWebviewPanelSerializer(TYPE, {
        deserializeWebviewPanel: async (panel) => this.take(panel),
      }),
    );
  }

  /** Opens the panel beside the text, or brings it to the front. */
  open(): void {
    const editor = vscode.window.activeTextEditor;
    const wanted = { viewColumn: vscode.ViewColumn.Beside, preserveFocus: true };
    if (this.panel === undefined) {
      this.take(vscode.window.createWebviewPanel(TYPE, "Results", wanted, {}));
    } else {
      this.panel.reveal(undefined, true);
    }
    this.follow(editor);
  }

  /** Asks again, if the panel is open. */
  refresh(): void {
    this.follow(vscode.window.activeTextEditor);
    this.schedule(0);
  }

  dispose(): void {
    this.following.dispose();
    this.panel?.dispose();
  }

  private take(panel: vscode.WebviewPanel): void {
    this.panel?.dispose();
    this.panel = panel;
    this.ready = false;
    panel.webview.options = {
      enableScripts: true,
      enableCommandUris: false,
      localResourceRoots: [vscode.Uri.joinPath(this.extension, "dist")],
    };
    const icon = (name: string) => vscode.Uri.joinPath(this.extension, "icons", name);
    panel.iconPath = { light: icon("spec-light.svg"), dark: icon("spec-dark.svg") };
    panel.webview.onDidReceiveMessage((message: FromPage) => this.heard(message));
    panel.onDidChangeViewState(() => this.schedule(0));
    panel.onDidDispose(() => {
      if (this.panel === panel) {
        this.panel = undefined;
        this.asking?.cancel();
        clearTimeout(this.timer);
      }
    });
    panel.webview.html = this.html(panel.webview);
  }

  private follow(editor: vscode.TextEditor | undefined): void {
    if (this.panel === undefined || editor === undefined || !isSpec(editor.document)) {
      return;
    }
    const { uri } = editor.document;
    if (this.at !== undefined && this.at.uri.toString() !== uri.toString()) {
      this.choice = {};
    }
    this.at = { uri, position: editor.selection.active };
    this.schedule(REST);
  }

  private changed(uris: readonly vscode.Uri[]): void {
    const of = this.at?.uri.toString();
    if (uris.some((uri) => uri.toString() === of)) {
      this.schedule(REST);
    }
  }

  private schedule(after: number): void {
    if (this.panel?.visible === true && this.ready) {
      clearTimeout(this.timer);
      this.timer = setTimeout(() => void this.ask(), after);
    }
  }

  private async ask(): Promise<void> {
    const client = this.client();
    if (client === undefined || !client.isRunning()) {
      return this.say({ type: "nothing", why: "The server does not run. {} beside the language tells why." });
    }
    if (this.at === undefined) {
      return this.say({ type: "nothing", why: "Put the cursor into a spec (a file that ends in .shaft)." });
    }
    this.asking?.cancel();
    const asking = new vscode.CancellationTokenSource();
    this.asking = asking;
    const { uri, position } = this.at;
    const params = {
      textDocument: { uri: client.code2ProtocolConverter.asUri(uri) },
      position: client.code2ProtocolConverter.asPosition(position),
      ...this.choice,
    };
    try {
      const answer: unknown = await client.sendRequest(RESULTS, params, asking.token);
      if (!asking.token.isCancellationRequested) {
        this.answered(answer, uri);
      }
    } catch (error) {
      if (!asking.token.isCancellationRequested) {
        this.failed(error);
      }
    } finally {
      asking.dispose();
    }
  }

  private answered(answer: unknown, uri: vscode.Uri): void {
    const spec = vscode.workspace.asRelativePath(uri);
    if (isResults(answer)) {
      this.shown = answer;
      if (this.panel !== undefined) {
        this.panel.title = `Results: ${answer.drive.name}`;
      }
      this.say({ type: "results", results: answer, choice: this.choice, spec });
    } else if (answer === null || answer === undefined) {
      this.say({ type: "nothing", why: `There is no drive in ${spec}.` });
    } else {
      this.say({
        type: "nothing",
        why: "The server answers in a form that this extension does not know. One of the two is too old.",
      });
    }
  }

  private failed(error: unknown): void {
    const code = error instanceof ResponseError ? error.code : undefined;
    if (code === LSPErrorCodes.ContentModified || code === LSPErrorCodes.ServerCancelled) {
      // The text changed meanwhile: what is shown stays until there is something new.
      return this.schedule(AGAIN);
    }
    const why = error instanceof Error ? error.message : String(error);
    this.say({ type: "nothing", why: `The server gave no results: ${why}` });
  }

  private say(message: ToPage): void {
    void this.panel?.webview.postMessage(message);
  }

  private heard(message: FromPage): void {
    if (message.type === "ready") {
      this.ready = true;
      this.refresh();
    } else if (message.type === "choose") {
      this.choice = choiceOf(message.choice);
      this.schedule(0);
    } else if (message.type === "reveal") {
      const of = message.criterion;
      void this.reveal(of === null ? this.shown?.drive.location : this.shown?.criteria[of]?.location);
    }
  }

  private async reveal(location: unknown): Promise<void> {
    const client = this.client();
    if (client === undefined || location === null || location === undefined) {
      return;
    }
    const place = client.protocol2CodeConverter.asLocation(location as Parameters<
      typeof client.protocol2CodeConverter.asLocation
    >[0] & object);
    const beside = vscode.window.visibleTextEditors.find(
      (editor) => editor.document.uri.toString() === place.uri.toString(),
    );
    await vscode.window.showTextDocument(place.uri, {
      viewColumn: beside?.viewColumn ?? vscode.ViewColumn.One,
      selection: new vscode.Range(place.range.start, place.range.start),
    });
  }

  private html(webview: vscode.Webview): string {
    const nonce = randomBytes(16).toString("base64url");
    const file = (name: string) => webview.asWebviewUri(vscode.Uri.joinPath(this.extension, "dist", name)).toString();
    const policy = [
      "default-src 'none'",
      `style-src ${webview.cspSource}`,
      `script-src 'nonce-${nonce}'`,
      "require-trusted-types-for 'script'",
    ].join("; ");
    return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<link rel="stylesheet" href="${file("view.css")}">
<title>Results</title>
</head>
<body>
<main id="page"></main>
<script nonce="${nonce}" src="${file("view.js")}"></script>
</body>
</html>`;
  }
}
