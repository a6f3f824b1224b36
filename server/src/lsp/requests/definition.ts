/** Where the thing under the cursor is defined. */
import type { Location } from 'vscode-languageserver';
import { linksOf } from '../../answers/links.ts';
import { definitionAt } from '../../answers/names-at.ts';
import { touches } from '../../answers/ranges.ts';
import { uriOf } from '../places.ts';
import { answering, type Session } from '../session.ts';

const START = { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } };

export function registerDefinition(session: Session): void {
  session.connection.onDefinition(
    answering(session, null as Location | null, ({ analysed, root, uri }, { position }) => {
      const found = definitionAt(analysed, position);
      if (found !== null) {
        return { uri: found.file === undefined ? uri : uriOf(root, found.file), range: found.range };
      }
      const link = linksOf(analysed.plan.document, analysed.source.file).find(({ range }) =>
        touches(range, position),
      );
      return link?.kind === 'file' ? { uri: uriOf(root, link.file), range: START } : null;
    }),
  );
}
