// Pages of the server as documents: Markdown that nobody can edit, shown by the editor's own preview. The address of a
// page says what it answers, so that a page which is not kept any more, or a tab of yesterday, is asked for again.

import * as vscode from "vscode";

/** The scheme of the addresses; the manifest sends it to the preview. */
export const SCHEME = "layshaft-page";
/** Pages kept. */
const MOST = 32;

/** Asks the server: a command and its arguments, answered with Markdown or nothing. */
export type Ask = (command: string, args: readonly unknown[]) => Promise<unknown>;

/** The pages shown so far. */
export class Pages implements vscode.TextDocumentContentProvider, vscode.Disposable {
  private readonly texts = new Map<string, string>();
  private readonly changed = new vscode.EventEmitter<vscode.Uri>();
  private readonly registration = vscode.workspace.registerTextDocumentContentProvider(SCHEME, this);
  readonly onDidChange = this.changed.event;

  constructor(private readonly ask: Ask) {}

  async provideTextDocumentContent(uri: vscode.Uri): Promise<string> {
    const kept = this.texts.get(uri.toString());
    if (kept !== undefined) {
      return kept;
    }
    const question = questionOf(uri);
    try {
      const answer = question === undefined ? undefined : await this.ask(question.command, question.args);
      return typeof answer === "string" ? answer : "There is nothing to tell.\n";
    } catch (error) {
      return `The server gave no answer: ${error instanceof Error ? error.message : String(error)}\n`;
    }
  }

  /** Shows the answer of a command of the server. */
  async show(command: string, args: readonly unknown[], markdown: string): Promise<void> {
    const uri = pageUri(command, args);
    this.texts.delete(uri.toString());
    this.texts.set(uri.toString(), markdown);
    for (const oldest of [...this.texts.keys()].slice(0, -MOST)) {
      this.texts.delete(oldest);
    }
    this.changed.fire(uri);
    await vscode.commands.executeCommand("vscode.open", uri, { viewColumn: vscode.ViewColumn.Beside, preview: true });
  }

  dispose(): void {
    this.registration.dispose();
    this.changed.dispose();
  }
}

/** The address of the answer to a command. */
export function pageUri(command: string, args: readonly unknown[]): vscode.Uri {
  const first = typeof args[0] === "string" ? args[0] : "page";
  const last = first.split("/").pop() ?? first;
  const title = last.replace(/[^\p{L}\p{N}._-]/gu, "_").replace(/\.shaft$/, "") || "page";
  return vscode.Uri.from({ scheme: SCHEME, path: `/${command}/${title}.md`, query: JSON.stringify(args) });
}

function questionOf(uri: vscode.Uri): { command: string; args: unknown[] } | undefined {
  const command = uri.path.split("/")[1];
  try {
    const args: unknown = JSON.parse(uri.query);
    return command !== undefined && Array.isArray(args) ? { command, args } : undefined;
  } catch {
    return undefined;
  }
}
