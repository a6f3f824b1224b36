/** The extension where the server is a process of its own. */
import * as vscode from 'vscode';
import { LanguageClient, TransportKind } from 'vscode-languageclient/node';
import { start } from './start.ts';

let client: LanguageClient | undefined;

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const module = vscode.Uri.joinPath(context.extensionUri, 'dist', 'server.cjs').fsPath;
  await start(context, (options) => {
    client = new LanguageClient('lyate', 'Lyate', { module, transport: TransportKind.ipc }, options);
    return client;
  });
}

export async function deactivate(): Promise<void> {
  await client?.stop();
}
