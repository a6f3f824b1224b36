/** Figures between the words of a plan, and a summary above each step. */
import type { CodeLens, InlayHint } from 'vscode-languageserver';
import { hintsIn } from '../../answers/hints.ts';
import { lensesOf } from '../../answers/lenses.ts';
import { answering, type Session } from '../session.ts';
import { toHint } from '../to-protocol.ts';

/** The client's command that shows the flask of a line. */
export const OPEN_FLASK_VIEW = 'lyate.openFlaskView';

export function registerHints(session: Session): void {
  session.connection.languages.inlayHint.on(
    answering(session, [] as InlayHint[], ({ analysed, settings }, { range }) =>
      hintsIn(analysed, { first: range.start.line, last: range.end.line }, settings.hints).map(toHint),
    ),
  );
}

export function registerLenses(session: Session): void {
  session.connection.onCodeLens(
    answering(session, [] as CodeLens[], ({ analysed, settings, uri }) =>
      settings.lenses
        ? lensesOf(analysed).map(({ range, title }) => ({
            range,
            command: { title, command: OPEN_FLASK_VIEW, arguments: [uri, range.start.line] },
          }))
        : [],
    ),
  );
}
