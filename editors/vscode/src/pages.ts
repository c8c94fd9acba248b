// Pages of the server as documents: Markdown that nobody can edit, shown by the editor's own preview. The name of a page
// says what it answers; its text is asked for when it is opened.

import * as vscode from "vscode";

/** The scheme of the names; the manifest sends it to the preview. */
export const SCHEME = "layshaft";
const REQUEST = "layshaft/document";

/** Asks the server. */
export type Ask = (method: string, params: object) => Promise<unknown>;

/** The pages of the server. */
export class Pages implements vscode.TextDocumentContentProvider, vscode.Disposable {
  /** How often a page was shown. */
  shown = 0;
  private readonly changed = new vscode.EventEmitter<vscode.Uri>();
  private readonly registration = vscode.workspace.registerTextDocumentContentProvider(SCHEME, this);
  readonly onDidChange = this.changed.event;

  constructor(private readonly ask: Ask) {}

  async provideTextDocumentContent(uri: vscode.Uri): Promise<string> {
    try {
      const answer = await this.ask(REQUEST, { uri: nameOf(uri) });
      const text = (answer as { text?: unknown } | null)?.text;
      return typeof text === "string" ? text : "There is nothing to tell.\n";
    } catch (error) {
      return `The server gave no answer: ${error instanceof Error ? error.message : String(error)}\n`;
    }
  }

  /** Shows a page beside the text, as it is now. */
  async show(uri: vscode.Uri): Promise<void> {
    this.shown += 1;
    this.changed.fire(uri);
    await vscode.commands.executeCommand("vscode.open", uri, { viewColumn: vscode.ViewColumn.Beside, preview: true });
  }

  dispose(): void {
    this.registration.dispose();
    this.changed.dispose();
  }
}

/** The name as the server wrote it: the editor's own way of writing it hides what parts the questions in it. */
function nameOf(uri: vscode.Uri): string {
  const query = encodeURIComponent(uri.query).replace(/%3D/g, "=").replace(/%26/g, "&");
  return uri.with({ query: "" }).toString() + (query === "" ? "" : `?${query}`);
}
