/**
 * Wires a language client to the editor: log, status, commands, and the files a server without a disk asks for.
 *
 * Knows: the editor, the client.  Must not know: whether the server is a process or a worker; each entry hands one in.
 */
import * as vscode from 'vscode';
import {
  type BaseLanguageClient,
  CloseAction,
  ErrorAction,
  type LanguageClientOptions,
  State,
} from 'vscode-languageclient';
import { showExplanation } from './commands/show-explanation.ts';
import { findPlans, readFile } from './files.ts';
import { createFlaskView } from './flask-view/panel.ts';
import { createStatus } from './status.ts';

/** The server is given up on after this many ends within `ENDS_WITHIN`. */
const MOST_ENDS = 5;
/** ms */
const ENDS_WITHIN = 3 * 60_000;

/** Starts the client and keeps it running until the extension ends. */
export async function start(
  context: vscode.ExtensionContext,
  create: (options: LanguageClientOptions) => BaseLanguageClient,
): Promise<BaseLanguageClient> {
  const log = vscode.window.createOutputChannel('Lyate', { log: true });
  const ends: number[] = [];
  const client = create({
    documentSelector: [{ language: 'lyate' }, { language: 'markdown' }],
    outputChannel: log,
    initializationOptions: { readsFiles: true },
    markdown: { isTrusted: false, supportHtml: false },
    errorHandler: {
      error: () => ({ action: ErrorAction.Continue }),
      closed: () => {
        const now = Date.now();
        ends.push(now);
        while (ends[0] !== undefined && ends[0] < now - ENDS_WITHIN) ends.shift();
        if (ends.length < MOST_ENDS) return { action: CloseAction.Restart };
        return {
          action: CloseAction.DoNotRestart,
          message:
            'The Lyate server ended five times within three minutes; “Lyate: Restart Server” starts it again.',
        };
      },
    },
  });
  const status = createStatus();
  const flaskView = createFlaskView(context, client);
  context.subscriptions.push(
    log,
    status,
    flaskView,
    client.onDidChangeState(({ newState }) => status.show(newState)),
    client.onRequest('lyate/readFile', ({ uri }: { uri: string }) => readFile(uri)),
    client.onRequest('lyate/findPlans', ({ root }: { root: string }) => findPlans(root)),
    vscode.commands.registerCommand('lyate.showLog', () => log.show(true)),
    vscode.commands.registerCommand('lyate.showExplanation', showExplanation),
    vscode.commands.registerCommand('lyate.openFlaskView', flaskView.open),
    vscode.commands.registerCommand('lyate.restartServer', async () => {
      ends.length = 0;
      if (client.state === State.Running) await client.stop();
      await client.start();
    }),
  );
  status.show(client.state);
  await client.start();
  return client;
}
