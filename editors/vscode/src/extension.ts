// Starts the language server when there is something for it to do. Everything else is the server's.

import * as vscode from "vscode";
import { LanguageClient } from "vscode-languageclient/node";

let client: LanguageClient | undefined;

export function activate(context: vscode.ExtensionContext): void {
  const consider = (document: vscode.TextDocument) => {
    if (client === undefined && isOurs(document)) {
      client = start();
    }
  };
  vscode.workspace.textDocuments.forEach(consider);
  context.subscriptions.push(
    vscode.workspace.onDidOpenTextDocument(consider),
    vscode.workspace.onDidSaveTextDocument(consider),
  );
}

export function deactivate(): Thenable<void> | undefined {
  return client?.stop();
}

/** A script or a notebook's cell; a Markdown file only if it holds Tussock code. */
function isOurs(document: vscode.TextDocument): boolean {
  if (document.languageId === "tussock") {
    return true;
  }
  return document.languageId === "markdown" && /^\s*(```+|~~~+)\s*\{?tussock/m.test(document.getText());
}

function start(): LanguageClient {
  const command = vscode.workspace.getConfiguration("tussock").get<string>("program", "tussock");
  const server = { command, args: ["server"] };
  const started = new LanguageClient("tussock", "Tussock", server, {
    documentSelector: [{ language: "tussock" }, { language: "markdown" }],
  });
  started.start().catch((reason: unknown) => {
    vscode.window.showErrorMessage(
      `Tussock's language server did not start (${String(reason)}). ` +
        "Is `tussock` on the path? Otherwise set `tussock.program`.",
    );
  });
  return started;
}
