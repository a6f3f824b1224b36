import fc from 'fast-check';
import { expect, test } from 'vitest';
import { parseSmarts, SmartsError } from '../../server/src/chemistry/smarts.ts';

test('a pattern is plain data that survives JSON', () => {
  const pattern = parseSmarts('[NX3;H1,H2;!$(N-C=[O,S])]~[#6;r5]1:c!@C-,=[C:7]1');
  expect(JSON.parse(JSON.stringify(pattern))).toEqual(pattern);
});

test('reads atoms and bonds in the order of the text', () => {
  expect(parseSmarts('[OX2H1]-c1a=[#7]1')).toEqual({
    atoms: [
      ['and', ['and', ['number', 8], ['aliphatic', 0]], ['connections', 2], ['hydrogens', 1]],
      ['and', ['number', 6], ['aromatic', 0]],
      ['aromatic', 0],
      ['number', 7],
    ],
    bonds: [
      { from: 0, to: 1, query: ['order', 1] },
      { from: 1, to: 2, query: ['usual'] },
      { from: 2, to: 3, query: ['order', 2] },
      { from: 1, to: 3, query: ['usual'] },
    ],
  });
});

test.each([
  [
    '[N;H2,H1]',
    ['and', ['and', ['number', 7], ['aliphatic', 0]], ['or', ['hydrogens', 2], ['hydrogens', 1]]],
  ],
  ['[!#6!#1]', ['and', ['not', ['number', 6]], ['not', ['number', 1]]]],
  ['[R0]', ['not', ['ring', 0]]],
  ['[H+]', ['and', ['number', 1], ['charge', 1]]],
  ['[*H]', ['and', ['any', 0], ['hydrogens', 1]]],
  ['[++]', ['charge', 2]],
  ['[-2]', ['charge', -2]],
])('reads %s with its order of precedence', (text, query) => {
  expect(parseSmarts(text).atoms[0]).toEqual(query);
});

test.each([
  ['', 0, 'no atom'],
  ['[C', 2, 'bracket is left open'],
  ['[$(C]', 4, 'unexpected ]'],
  ['[$(C', 4, '$( is left open'],
  ['[', 1, 'unexpected end'],
  ['C.', 2, 'dot leads nowhere'],
  ['C11', 3, 'joins an atom to itself'],
  ['C(C', 3, 'branch is left open'],
  ['C1CC', 4, 'ring bond is left open'],
  ['C)', 1, 'unexpected )'],
  ['(C)', 0, 'needs an atom before it'],
  ['[#]', 2, 'number is missing'],
  ['[R2]', 3, 'R with a number'],
  ['[C;]', 3, 'unexpected ]'],
  ['C-;C', 3, 'bond is missing'],
  ['C%1C', 1, 'ring number'],
  ['[C:x]', 2, 'map number is missing'],
  ['CQ', 1, 'unexpected Q'],
  ['C=', 2, 'bond leads nowhere'],
  ['C=(C)', 2, 'bond leads nowhere'],
  ['=C', 0, 'needs an atom before it'],
  ['1CC1', 0, 'needs an atom before it'],
])('says where %s cannot be read', (text, position, message) => {
  let found: unknown;
  try {
    parseSmarts(text);
  } catch (error) {
    found = error;
  }
  expect(found).toBeInstanceOf(SmartsError);
  expect((found as SmartsError).position).toBe(position);
  expect((found as SmartsError).message).toContain(message);
});

test('any text gives a pattern or a SmartsError inside the text', () => {
  const signs = fc.string({ unit: fc.constantFrom(...'CNcno[]()$#=~:@!,;&-+HXDRrxv1234%.*aA') });
  fc.assert(
    fc.property(signs, (text) => {
      try {
        expect(parseSmarts(text).atoms.length).toBeGreaterThan(0);
      } catch (error) {
        expect(error).toBeInstanceOf(SmartsError);
        expect((error as SmartsError).position).toBeLessThanOrEqual(text.length);
      }
    }),
    { numRuns: 3000 },
  );
});
