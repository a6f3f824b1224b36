/** Places that name the same thing: in all plans, in this one to be highlighted, and in this one to be edited together. */
import {
  type DocumentHighlight,
  DocumentHighlightKind,
  type LinkedEditingRanges,
  type Location,
} from 'vscode-languageserver';
import { compoundNamed, placesOf, targetAt } from '../../answers/names-at.ts';
import { compare } from '../../answers/ranges.ts';
import { answering, type Session } from '../session.ts';
import { placesAcross } from './across-files.ts';

export function registerReferences(session: Session): void {
  session.connection.onReferences(
    answering(session, [] as Location[], async (result, { position, context }) => {
      const target = targetAt(result.analysed, position);
      if (target === null) return [];
      const all = await placesAcross(session, result, target);
      return all.flatMap(({ uri, ranges, result: { analysed } }) => {
        const own = compoundNamed(analysed, target.name);
        const definition = own?.file === undefined ? own?.nameRange : undefined;
        return ranges
          .filter(
            (range) =>
              context.includeDeclaration ||
              definition === undefined ||
              compare(range.start, definition.start) !== 0,
          )
          .map((range) => ({ uri, range }));
      });
    }),
  );
}

export function registerHighlights(session: Session): void {
  session.connection.onDocumentHighlight(
    answering(session, null as DocumentHighlight[] | null, ({ analysed }, { position }) => {
      const target = targetAt(analysed, position);
      if (target === null) return null;
      const definition = target.kind === 'compound' ? compoundNamed(analysed, target.name) : null;
      return placesOf(analysed.plan.document, target).map((range) => ({
        range,
        kind:
          definition?.file === undefined && definition?.nameRange.start.line === range.start.line
            ? DocumentHighlightKind.Write
            : DocumentHighlightKind.Read,
      }));
    }),
  );
}

export function registerLinkedEditing(session: Session): void {
  session.connection.languages.onLinkedEditingRange(
    answering(session, null as LinkedEditingRanges | null, ({ analysed }, { position }) => {
      const target = targetAt(analysed, position);
      if (target === null || target.file !== undefined) return null;
      return { ranges: placesOf(analysed.plan.document, target), wordPattern: '[^\\s"<>=/+,]+' };
    }),
  );
}
