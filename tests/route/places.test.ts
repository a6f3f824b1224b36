import { describe, expect, it } from 'vitest';
import { lineAt } from '../../server/src/route/document.ts';
import {
  blockRanges,
  labelOccurrencesOf,
  leafAt,
  nameAt,
  occurrencesOf,
  tokensOf,
} from '../../server/src/route/places.ts';
import type { Range } from '../../server/src/route/plan.ts';
import { plan } from './draw.ts';

const TEXT = `compound 1 = CCO
compound "a b" = CCN

step A "first"
  solvent THF/1 2:1
  charge 1 10 mmol
  charge "a b" 1 equiv   // 1
  convert 1 + "a b" to 1
step B continues A
  charge acetic acid 1 g
`;
const { document } = plan(TEXT);
const lines = TEXT.split('\n');
const cut = ({ start, end }: Range) => [start.line, lines[start.line]!.slice(start.character, end.character)];

describe('places', () => {
  it('finds every place of a compound, in quotes and mixtures too', () => {
    expect(occurrencesOf(document, '1').map(cut)).toEqual([
      [0, '1'],
      [4, '1'],
      [5, '1'],
      [7, '1'],
      [7, '1'],
    ]);
    expect(occurrencesOf(document, 'a b').map(cut)).toEqual([
      [1, '"a b"'],
      [6, '"a b"'],
      [7, '"a b"'],
    ]);
  });

  it('finds every place of a label', () => {
    expect(labelOccurrencesOf(document, 'A').map(cut)).toEqual([
      [3, 'A'],
      [8, 'A'],
    ]);
  });

  it('names what stands at a place', () => {
    expect(nameAt(document, { line: 0, character: 9 })).toMatchObject({ kind: 'compound', text: '1' });
    expect(nameAt(document, { line: 4, character: 14 })).toMatchObject({ kind: 'name', text: '1' });
    expect(nameAt(document, { line: 8, character: 17 })).toMatchObject({ kind: 'label', text: 'A' });
    expect(nameAt(document, { line: 9, character: 18 })).toMatchObject({ kind: 'name', text: 'acetic acid' });
    expect(nameAt(document, { line: 2, character: 0 })).toBeNull();
  });

  it('cuts a line into tokens', () => {
    const line = lineAt(document, 6)!;
    expect(
      tokensOf(line).map(({ start, length, type }) => [line.text.slice(start, start + length), type]),
    ).toEqual([
      ['charge', 'keyword'],
      ['"a b"', 'string'],
      ['1', 'number'],
      ['equiv', 'type'],
      ['// 1', 'comment'],
    ]);
    expect(leafAt(line, 8)).toMatchObject({ kind: 'keyword' });
    expect(leafAt(line, 15)).toMatchObject({ kind: 'number' });
  });

  it('folds steps', () => {
    expect(blockRanges(document).map(({ start, end }) => [start.line, end.line])).toEqual([
      [3, 7],
      [8, 9],
    ]);
  });
});
