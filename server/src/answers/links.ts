/**
 * Places in a plan that lead elsewhere: files that `use` brings in, and addresses inside quotes and remarks.
 *
 * Knows: documents.  Must not know: disks, the protocol.
 */
import type { RouteDocument } from '../route/document.ts';
import type { Range } from '../route/plan.ts';
import type { LineTree } from '../route/tree.ts';
import { joinPath } from '../route/use.ts';
import { inLine } from './ranges.ts';

export type Link =
  | { readonly kind: 'file'; readonly range: Range; readonly file: string }
  | { readonly kind: 'web'; readonly range: Range; readonly address: string };

/** `file` is the plan's own path in the workspace, which relative paths start from. */
export function linksOf(document: RouteDocument, file: string): Link[] {
  return document.blocks.flatMap(({ block, firstLine }) =>
    block.lines.flatMap((tree, line) => [
      ...usedFile(tree, firstLine + line, file),
      ...addresses(tree, firstLine + line),
    ]),
  );
}

function usedFile({ syntax }: LineTree, line: number, file: string): Link[] {
  if (syntax?.keyword !== 'use') return [];
  const place = joinPath(file, syntax.path);
  return place === null ? [] : [{ kind: 'file', range: inLine(line, syntax.pathSpan), file: place }];
}

function addresses({ text, leaves }: LineTree, line: number): Link[] {
  return leaves
    .filter(({ kind }) => kind === 'string' || kind === 'comment')
    .flatMap(({ start, end }) =>
      [...text.slice(start, end).matchAll(/https:\/\/[^\s"<>]+|\b10\.\d{4,9}\/[^\s"<>]+/g)].map(
        (match): Link => {
          const found = match[0].replace(/[.,;)]$/, '');
          const from = start + match.index;
          const address = found.startsWith('https:') ? found : `https://doi.org/${found}`;
          return { kind: 'web', range: inLine(line, { start: from, end: from + found.length }), address };
        },
      ),
    );
}
