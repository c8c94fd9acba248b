// The language client: how the server is started and what is asked of it beyond the protocol.

import * as vscode from "vscode";
import {
  LanguageClient,
  RevealOutputChannelOn,
  type LanguageClientOptions,
  type ServerOptions,
} from "vscode-languageclient/node";

import { SCHEME, type Pages } from "./pages";

/** The language of specs. */
export const LANGUAGE = "shaft";
/** The section of the settings. */
export const SECTION = "layshaft";
/** Commands that the server runs; each shows a page. */
export const SERVER_COMMANDS = { explain: "layshaft.explain", resultTable: "layshaft.resultTable" } as const;

/** A client for a program; not started yet. */
export function newClient(program: string, output: vscode.LogOutputChannel, pages: Pages): LanguageClient {
  const server: ServerOptions = { command: program, args: ["lsp"] };
  const client: LanguageClientOptions = {
    documentSelector: [
      { scheme: "file", language: LANGUAGE },
      { scheme: "untitled", language: LANGUAGE },
      // The old side of a comparison: hovers and hints, no findings.
      { scheme: "git", language: LANGUAGE },
    ],
    outputChannel: output,
    revealOutputChannelOn: RevealOutputChannelOn.Never,
    initializationOptions: initializationOptions(),
    // What the server sends is Markdown without HTML and without commands.
    markdown: { isTrusted: false, supportHtml: false },
    middleware: {
      provideDiagnostics: async (document, previous, token, next) => {
        const uri = document instanceof vscode.Uri ? document : document.uri;
        if (uri.scheme === "git") {
          return undefined;
        }
        return next(document, previous, token);
      },
      window: {
        showDocument: async (params, token, next) => {
          const uri = vscode.Uri.parse(params.uri);
          if (uri.scheme !== SCHEME) {
            return next(params, token);
          }
          await pages.show(uri);
          return { success: true };
        },
      },
    },
  };
  return new LanguageClient(SECTION, "Layshaft", server, client);
}

/** What the server is told at once: that its pages can be opened, and the settings, so that charts come in hovers. */
export function initializationOptions(): Record<string, unknown> {
  const of = vscode.workspace.getConfiguration(SECTION);
  return {
    documents: true,
    charts: of.get<boolean>("charts", true),
    lenses: of.get<boolean>("lenses", false),
    hints: of.get<Record<string, boolean>>("hints", {}),
  };
}

/** The code of a finding of this server. */
export function codeOf(finding: vscode.Diagnostic): string | undefined {
  if (finding.source !== SECTION) {
    return undefined;
  }
  const code = typeof finding.code === "object" ? finding.code.value : finding.code;
  return typeof code === "string" ? code : undefined;
}

/** Whether a document is a spec. */
export function isSpec(document: vscode.TextDocument): boolean {
  return document.languageId === LANGUAGE;
}
