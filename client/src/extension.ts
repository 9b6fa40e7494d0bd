import * as vscode from 'vscode';
import { LanguageClient, TransportKind } from 'vscode-languageclient/node';
import { linkToDocs, showFindingDocs } from './docs';

let client: LanguageClient | undefined;

/** Starts the language server; called by the editor when the first file in the language is opened. */
export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const server = { module: context.asAbsolutePath('dist/server.js'), transport: TransportKind.ipc };
  client = new LanguageClient('tare', 'Tare', server, {
    documentSelector: [{ language: 'tare' }],
    initializationOptions: { images: true, settings: vscode.workspace.getConfiguration('tare') },
    middleware: {
      handleDiagnostics: (uri, diagnostics, next) => next(uri, diagnostics.map(linkToDocs)),
    },
  });
  context.subscriptions.push(
    vscode.commands.registerCommand('tare.showFindingDocs', (code: unknown) => showFindingDocs(context.extensionUri, String(code))),
  );
  await client.start();
}

export async function deactivate(): Promise<void> {
  await client?.stop();
}
