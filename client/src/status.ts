/** Says in the status bar whether the server runs; a click opens the log. */
import * as vscode from 'vscode';
import { State } from 'vscode-languageclient';

export interface Status extends vscode.Disposable {
  show(state: State): void;
}

/** A status item beside the language of plans. */
export function createStatus(): Status {
  const item = vscode.languages.createLanguageStatusItem('lyate.server', [
    { language: 'lyate' },
    { language: 'markdown' },
  ]);
  item.name = 'Lyate';
  item.command = { command: 'lyate.showLog', title: 'Log' };
  return {
    show(state) {
      item.busy = state === State.Starting;
      const stopped = state === State.Stopped;
      item.text = stopped ? 'Lyate is stopped' : state === State.Starting ? 'Lyate is starting' : 'Lyate';
      item.severity = stopped
        ? vscode.LanguageStatusSeverity.Error
        : vscode.LanguageStatusSeverity.Information;
      item.command = stopped
        ? { command: 'lyate.restartServer', title: 'Restart' }
        : { command: 'lyate.showLog', title: 'Log' };
    },
    dispose: () => item.dispose(),
  };
}
