/** The extension in a browser, where the server is a worker. */
import * as vscode from 'vscode';
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from 'vscode-languageclient/browser';
import { start } from './start.ts';

let client: LanguageClient | undefined;

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const script = vscode.Uri.joinPath(context.extensionUri, 'dist', 'server-browser.js');
  await start(context, (options) => {
    client = new LanguageClient(
      'lyate',
      'Lyate',
      async () => {
        // The editor's own kind of worker is no instance of the class that the client looks for, so it is handed its ends.
        const worker = new Worker(script.toString(true));
        return { reader: new BrowserMessageReader(worker), writer: new BrowserMessageWriter(worker) };
      },
      options,
    );
    return client;
  });
}

export async function deactivate(): Promise<void> {
  await client?.stop();
}
