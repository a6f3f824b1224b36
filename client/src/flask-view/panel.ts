/**
 * The panel beside the editor that follows the cursor and shows the flask of its line.
 *
 * Knows: the editor, the client.  Must not know: how the flask is drawn.
 */
import * as vscode from 'vscode';
import type { BaseLanguageClient } from 'vscode-languageclient';
import type { FlaskPicture } from '../../../server/src/answers/flask-picture.ts';
import type { FromPage, ToPage } from './messages.ts';
import { STYLES } from './styles.ts';

/** ms between a move of the cursor or a change of the text and the question what the flask is now. */
const PATIENCE = 80;

export interface FlaskView extends vscode.Disposable {
  /** Opens the panel for a line of a document, or for the cursor. */
  open(address?: unknown, line?: unknown): Promise<void>;
}

export function createFlaskView(context: vscode.ExtensionContext, client: BaseLanguageClient): FlaskView {
  let panel: vscode.WebviewPanel | undefined;
  let place: { readonly uri: vscode.Uri; readonly line: number } | undefined;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let asked = 0;

  const send = (message: ToPage) => void panel?.webview.postMessage(message);
  const ask = async () => {
    if (panel === undefined || place === undefined) return;
    const ticket = ++asked;
    const { uri, line } = place;
    const params = {
      textDocument: { uri: client.code2ProtocolConverter.asUri(uri) },
      position: { line, character: 0 },
    };
    try {
      const picture = await client.sendRequest<FlaskPicture | null>('lyate/flaskAt', params);
      if (ticket !== asked) return;
      if (picture === null)
        send({ kind: 'nothing', why: 'Put the cursor into a step that charges something.' });
      else send({ kind: 'picture', picture, file: vscode.workspace.asRelativePath(uri) });
    } catch (error) {
      if (ticket === asked)
        send({ kind: 'nothing', why: error instanceof Error ? error.message : String(error) });
    }
  };
  const soon = () => {
    clearTimeout(timer);
    timer = setTimeout(ask, PATIENCE);
  };
  const follow = (editor: vscode.TextEditor | undefined) => {
    if (editor === undefined || !['lyate', 'markdown'].includes(editor.document.languageId)) return;
    place = { uri: editor.document.uri, line: editor.selection.active.line };
    soon();
  };
  const listeners = [
    vscode.window.onDidChangeTextEditorSelection(({ textEditor }) => follow(textEditor)),
    vscode.window.onDidChangeActiveTextEditor(follow),
    vscode.workspace.onDidChangeTextDocument(({ document }) => {
      if (document.uri.toString() === place?.uri.toString()) soon();
    }),
  ];
  const hear = async (message: FromPage) => {
    if (message.kind === 'ready') await ask();
    else if (message.kind === 'copy') {
      await vscode.env.clipboard.writeText(message.text);
      vscode.window.setStatusBarMessage(`${message.what} is in the clipboard.`, 3000);
    } else if (place !== undefined) {
      const range = new vscode.Range(message.line, 0, message.line, 0);
      await vscode.window.showTextDocument(place.uri, {
        selection: range,
        viewColumn: vscode.ViewColumn.One,
      });
    }
  };

  return {
    async open(address, line) {
      if (typeof address === 'string' && typeof line === 'number') {
        place = { uri: client.protocol2CodeConverter.asUri(address), line };
      } else {
        follow(vscode.window.activeTextEditor);
      }
      if (panel === undefined) {
        const dist = vscode.Uri.joinPath(context.extensionUri, 'dist');
        panel = vscode.window.createWebviewPanel(
          'lyate.flask',
          'Flask',
          { viewColumn: vscode.ViewColumn.Beside, preserveFocus: true },
          { enableScripts: true, localResourceRoots: [dist] },
        );
        panel.iconPath = vscode.Uri.joinPath(context.extensionUri, 'client', 'images', 'lyate.png');
        panel.webview.onDidReceiveMessage(hear);
        panel.onDidDispose(() => {
          panel = undefined;
        });
        panel.webview.html = pageOf(panel.webview, vscode.Uri.joinPath(dist, 'flask-view.js'));
        return;
      }
      panel.reveal(undefined, true);
      await ask();
    },
    dispose() {
      clearTimeout(timer);
      for (const listener of listeners) listener.dispose();
      panel?.dispose();
    },
  };
}

function pageOf(webview: vscode.Webview, script: vscode.Uri): string {
  const nonce = crypto.randomUUID().replaceAll('-', '');
  const policy = `default-src 'none'; img-src data: ${webview.cspSource}; style-src 'nonce-${nonce}'; script-src 'nonce-${nonce}'`;
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy}">
<title>Flask</title>
<style nonce="${nonce}">${STYLES}</style>
</head>
<body><script nonce="${nonce}" src="${webview.asWebviewUri(script)}"></script></body>
</html>`;
}
