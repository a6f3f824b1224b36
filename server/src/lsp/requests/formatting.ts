/** Lays a plan out evenly, whole or in part, touching only lines that differ. */
import type { TextEdit } from 'vscode-languageserver';
import { formatText } from '../../route/format.ts';
import type { Result } from '../plans.ts';
import { answering, type Session } from '../session.ts';

export function registerFormatting(session: Session): void {
  session.connection.onDocumentFormatting(
    answering(session, [] as TextEdit[], (result) => edits(result, 0, Number.POSITIVE_INFINITY)),
  );
  session.connection.onDocumentRangeFormatting(
    answering(session, [] as TextEdit[], (result, { range }) =>
      edits(result, range.start.line, range.end.line),
    ),
  );
}

function edits({ analysed: { source } }: Result, first: number, last: number): TextEdit[] {
  const before = source.text.split(/\r\n|\r|\n/);
  const after = formatText(source.text, source.language).split(/\r\n|\r|\n/);
  return before.flatMap((line, at) => {
    const newText = after[at];
    if (at < first || last < at || newText === undefined || newText === line) return [];
    const range = { start: { line: at, character: 0 }, end: { line: at, character: line.length } };
    return [{ range, newText }];
  });
}
