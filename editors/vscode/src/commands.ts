// The commands of the palette.

import * as vscode from "vscode";

import { codeOf, isSpec, SERVER_COMMANDS } from "./client";
import type { Server } from "./extension";
import type { ResultsPanel } from "./panel";

export function registerCommands(
  server: Server,
  panel: ResultsPanel,
  output: vscode.LogOutputChannel,
  context: vscode.ExtensionContext,
): vscode.Disposable[] {
  const command = vscode.commands.registerCommand;
  return [
    command("layshaft.showResults", () => panel.open()),
    command("layshaft.showResultTable", () => showResultTable(server)),
    command("layshaft.explainCode", (code?: unknown) =>
      explain(server, typeof code === "string" ? code : undefined),
    ),
    command("layshaft.newSpec", () => newSpec(context.extensionUri)),
    command("layshaft.restartServer", () => server.restart()),
    command("layshaft.showLog", () => output.show()),
  ];
}

/** The editor with a spec that the user is at; says so where there is none. */
function specEditor(): vscode.TextEditor | undefined {
  const editor = vscode.window.activeTextEditor;
  if (editor !== undefined && isSpec(editor.document)) {
    return editor;
  }
  void vscode.window.showInformationMessage("Open a spec (a file that ends in .shaft) first.");
  return undefined;
}

async function showResultTable(server: Server): Promise<void> {
  const editor = specEditor();
  if (editor === undefined) {
    return;
  }
  const { line, character } = editor.selection.active;
  const before = server.pages.shown;
  const answer = await ask(server, SERVER_COMMANDS.resultTable, editor.document.uri.toString(), { line, character });
  if (answer === null && server.pages.shown === before) {
    void vscode.window.showInformationMessage("Put the cursor on something of a drive first.");
  }
}

/** Asks the server; the client shows the page that comes back. */
async function ask(server: Server, command: string, ...args: unknown[]): Promise<unknown> {
  if (server.client?.isRunning() !== true) {
    void vscode.window.showErrorMessage("Layshaft: the server does not run. {} beside the language tells why.");
    return undefined;
  }
  try {
    return await vscode.commands.executeCommand(command, ...args);
  } catch (error) {
    const why = error instanceof Error ? error.message : String(error);
    void vscode.window.showErrorMessage(`Layshaft: ${why}`);
    return undefined;
  }
}

async function explain(server: Server, code: string | undefined): Promise<void> {
  const wanted = code ?? (await pickCode());
  if (wanted !== undefined) {
    await ask(server, SERVER_COMMANDS.explain, wanted);
  }
}

/** The codes of the spec, those of the line with the cursor first; else one that is typed. */
async function pickCode(): Promise<string | undefined> {
  const editor = vscode.window.activeTextEditor;
  const uri = editor?.document.uri;
  const line = editor?.selection.active.line ?? -1;
  const findings = uri === undefined ? [] : vscode.languages.getDiagnostics(uri);
  const here = (finding: vscode.Diagnostic) =>
    finding.range.start.line <= line && line <= finding.range.end.line ? 0 : 1;
  const sorted = [...findings].sort((a, b) => here(a) - here(b));
  const items = new Map<string, vscode.QuickPickItem>();
  for (const finding of sorted) {
    const found = codeOf(finding);
    if (found !== undefined && !items.has(found)) {
      items.set(found, { label: found, detail: finding.message.split("\n")[0] ?? "" });
    }
  }
  if (items.size === 0) {
    return vscode.window.showInputBox({ prompt: "The code of a finding, such as kind-mismatch" });
  }
  const other: vscode.QuickPickItem = { label: "Another code…" };
  const pick = await vscode.window.showQuickPick([...items.values(), other], { title: "Explain code" });
  return pick === other
    ? vscode.window.showInputBox({ prompt: "The code of a finding, such as kind-mismatch" })
    : pick?.label;
}

/** A spec that is complete and not yet saved. */
async function newSpec(extension: vscode.Uri): Promise<void> {
  const starter = await vscode.workspace.fs.readFile(vscode.Uri.joinPath(extension, "starter.shaft"));
  const content = new TextDecoder().decode(starter).replace('title "NAME"', 'title "New drive"');
  const document = await vscode.workspace.openTextDocument({ language: "shaft", content });
  await vscode.window.showTextDocument(document);
}
