// How the server does, beside the language in the status bar.

import * as vscode from "vscode";

import { LANGUAGE } from "./client";

/** The item in the status bar. */
export class Status implements vscode.Disposable {
  private readonly item = vscode.languages.createLanguageStatusItem("layshaft.server", { language: LANGUAGE });

  constructor() {
    this.item.name = "Layshaft server";
    this.starts();
  }

  starts(): void {
    this.say("Layshaft starts", "", vscode.LanguageStatusSeverity.Information);
    this.item.busy = true;
  }

  runs(version: string, program: string): void {
    this.say(`Layshaft ${version}`.trim(), program, vscode.LanguageStatusSeverity.Information);
    this.item.command = { command: "layshaft.showLog", title: "Log" };
  }

  stopped(why: string, short = "has stopped"): void {
    this.say(`Layshaft: server ${short}`, why, vscode.LanguageStatusSeverity.Error);
    this.item.command = { command: "layshaft.restartServer", title: "Restart" };
  }

  private say(text: string, detail: string, severity: vscode.LanguageStatusSeverity): void {
    this.item.busy = false;
    this.item.text = text;
    this.item.detail = detail;
    this.item.severity = severity;
  }

  dispose(): void {
    this.item.dispose();
  }
}
