/** Requests that are answered from the lines alone: folding, selections, colours, links. */
import {
  type DocumentLink,
  type FoldingRange,
  type SelectionRange,
  type SemanticTokens,
  SemanticTokensBuilder,
} from 'vscode-languageserver';
import { foldingOf, selectionAt } from '../../answers/folding.ts';
import { linksOf } from '../../answers/links.ts';
import { type TokenType, tokensOf } from '../../route/places.ts';
import { uriOf } from '../places.ts';
import { answering, type Session } from '../session.ts';
import { toFold } from '../to-protocol.ts';

/** Order is the protocol's legend. */
export const TOKEN_TYPES: readonly TokenType[] = [
  'keyword',
  'comment',
  'string',
  'number',
  'operator',
  'variable',
  'type',
  'property',
  'enumMember',
  'function',
  'regexp',
];
export const TOKEN_MODIFIERS = ['definition'] as const;

export function registerFolding(session: Session): void {
  session.connection.onFoldingRanges(
    answering(session, [] as FoldingRange[], ({ analysed }) => foldingOf(analysed.plan.document).map(toFold)),
  );
}

export function registerSelectionRanges(session: Session): void {
  session.connection.onSelectionRanges(
    answering(session, [] as SelectionRange[], ({ analysed }, { positions }) =>
      positions.map((position): SelectionRange => {
        const outermostFirst = selectionAt(analysed.plan.document, position).reverse();
        const empty = { start: position, end: position };
        return (
          outermostFirst.reduce<SelectionRange | undefined>(
            (parent, range) => (parent === undefined ? { range } : { range, parent }),
            undefined,
          ) ?? { range: empty }
        );
      }),
    ),
  );
}

export function registerSemanticTokens(session: Session): void {
  session.connection.languages.semanticTokens.on(
    answering(session, { data: [] } as SemanticTokens, ({ analysed }) => {
      const builder = new SemanticTokensBuilder();
      for (const { block, firstLine } of analysed.plan.document.blocks) {
        for (const [line, tree] of block.lines.entries()) {
          for (const { start, length, type, isDefinition } of tokensOf(tree)) {
            builder.push(firstLine + line, start, length, TOKEN_TYPES.indexOf(type), isDefinition ? 1 : 0);
          }
        }
      }
      return builder.build();
    }),
  );
}

export function registerLinks(session: Session): void {
  session.connection.onDocumentLinks(
    answering(session, [] as DocumentLink[], ({ analysed, root }) =>
      linksOf(analysed.plan.document, analysed.source.file).map((link) => ({
        range: link.range,
        target: link.kind === 'file' ? uriOf(root, link.file) : link.address,
      })),
    ),
  );
}
