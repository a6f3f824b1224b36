/** The extension in a browser, where the server is a worker. */
import * as vscode from 'vscode';
import { LanguageClient } from 'vscode-languageclient/browser';
import { start } from './start.ts';

let client: LanguageClient | undefined;

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const script = vscode.Uri.joinPath(context.extensionUri, 'dist', 'server-browser.js');
  await start(context, (options) => {
    client = new LanguageClient('lyate', 'Lyate', async () => new Worker(script.toString(true)), options);
    return client;
  });
}

export async function deactivate(): Promise<void> {
  await client?.stop();
}
