import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { KEYWORDS, LONGEST_LINE, parseLine } from '../../server/src/route/parse.ts';
import { tokensOf } from '../../server/src/route/places.ts';

const read = (line: string) => parseLine(line).syntax;
const faults = (line: string) =>
  parseLine(line).problems.map(({ check, start, end }) => [check, line.slice(start, end)]);

const pieces = fc.constantFrom(
  ...KEYWORDS,
  ...[
    '1',
    '10',
    'mmol',
    'in',
    'at',
    ':1',
    ':',
    ',',
    '=',
    '+',
    'to',
    'yield',
    '85',
    '%',
    'x',
    '2',
    '40mL',
    '−3',
    '1e400',
  ],
  ...[
    '"',
    '"a b"',
    '<',
    '<CCO>',
    '//',
    '// note',
    'THF/water',
    '4:1',
    'sat.',
    '1 M',
    '°C',
    'µL',
    '😀',
    '\u0000',
    '\t',
    ' ',
  ],
);
const lines = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 60 }).map((text) => text.replace(/[\r\n]/g, ' ')),
  fc.array(pieces, { maxLength: 12 }).map((parts) => parts.join(' ')),
  fc.array(pieces, { maxLength: 12 }).map((parts) => parts.join('')),
);

describe('any line', () => {
  it('gives leaves that join to the line, and problems and tokens inside it', () => {
    fc.assert(
      fc.property(lines, (line) => {
        const tree = parseLine(line);
        expect(tree.leaves.map(({ start, end }) => line.slice(start, end)).join('')).toBe(line);
        let at = 0;
        for (const { start, end } of tree.leaves) {
          expect(start).toBe(at);
          expect(start).toBeLessThan(end);
          at = end;
        }
        for (const { start, end } of [...tree.problems, ...tree.names]) {
          expect(0 <= start && start <= end && end <= line.length).toBe(true);
        }
        for (const { start, length } of tokensOf(tree))
          expect(start + length).toBeLessThanOrEqual(line.length);
        expect(tree.problems.length).toBeLessThanOrEqual(1);
      }),
      { numRuns: 3000 },
    );
  });

  it('costs time in proportion to its length', () => {
    const long = `charge ${'a '.repeat(LONGEST_LINE / 2 - 10)}`;
    expect(parseLine(long).problems).toEqual([]);
    expect(faults('x'.repeat(5_000_000))).toHaveLength(1);
  });
});

describe('statements', () => {
  it.each([
    ['plan "Side \\"chain\\""', { keyword: 'plan', title: 'Side "chain"' }],
    ['use "a/b.lyate" // brings 1', { keyword: 'use', path: 'a/b.lyate' }],
    ['compound 1 = CCO // alcohol', { keyword: 'compound', name: '1', smiles: 'CCO' }],
    ['compound "a b"=C[OH:1]', { keyword: 'compound', name: 'a b', smiles: 'C[OH:1]' }],
    ['\uFEFFcompound 12a = CC', { keyword: 'compound', name: '12a', smiles: 'CC' }],
    ['step A "Do it"', { keyword: 'step', label: 'A', title: 'Do it', continues: null }],
    [
      'step B continues A organic "Next"',
      { label: 'B', title: 'Next', continues: { label: 'A', layer: 'organic' } },
    ],
    [
      'measured pKa −1.5 ± 0.2 at :1 in water source "n"',
      { value: -1.5, sd: 0.2, source: 'n', sites: [{ map: 1 }] },
    ],
    ['rt', { keyword: 'temperature', from: 298.15, to: 298.15 }],
    ['temperature −78 °C to reflux', { from: 195.15, to: 'reflux' }],
    ['temperature -78 to 0 degC', { from: 195.15, to: 273.15 }],
    ['temperature 20°C', { from: 293.15, to: 293.15 }],
    ['temperature 300 K', { from: 300 }],
    ['deprotonate 1 at :1, :2', { sites: [{ map: 1 }, { map: 2 }] }],
    ['deprotonate 1 at :1,:2', { sites: [{ map: 1 }, { map: 2 }] }],
    [
      'convert 1 + 2 x 3 to 4 + 5 yield 85 %',
      { from: [{ count: 1 }, { count: 2 }], to: [{}, {}], yield: 0.85 },
    ],
    ['adjust pH 3.5 with 1 M HCl', { pH: 3.5, name: { text: 'HCl', strength: { quantity: { value: 1 } } } }],
    [
      'extract 3 into EtOAc 2 x 40 mL',
      { into: { text: 'EtOAc' }, amounts: [{ portions: 2, quantity: { value: 0.04 } }] },
    ],
    ['keep 3 in aqueous', { layer: 'aqueous' }],
    ['isolate 3 as zwitterion', { state: 'zwitterion' }],
    ['accept levelled "known"', { check: 'levelled', reason: 'known' }],
    ['note "stir // overnight"', { text: 'stir // overnight' }],
  ])('%s', (line, wanted) => {
    expect(parseLine(line).problems).toEqual([]);
    expect(read(line)).toMatchObject(wanted);
  });

  it.each([
    ['charge 1 10 mmol', '1', [{ quantity: { dimension: 'substance', value: 0.01 } }]],
    ['charge acetic acid 2.3 g', 'acetic acid', [{ quantity: { dimension: 'mass', value: 2.3 } }]],
    ['charge 1 500 mg', '1', [{ quantity: { dimension: 'mass', value: 0.5 } }]],
    ['charge 1 5 µL', '1', [{ quantity: { dimension: 'volume', value: 5e-6 } }]],
    ['charge 1 5 μmol', '1', [{ quantity: { dimension: 'substance', value: 5e-6 } }]],
    ['base NaOEt 1.05 equiv', 'NaOEt', [{ quantity: { dimension: 'equiv', value: 1.05 } }]],
    [
      'base n-BuLi 4.2 mL of 2.5 M in hexanes',
      'n-BuLi',
      [{}, { quantity: { value: 2.5 } }, { kind: 'carrier' }],
    ],
    [
      'base NaH 1 equiv 60 wt% in mineral oil',
      'NaH',
      [{}, { quantity: { value: 0.6 } }, { name: { text: 'mineral oil' } }],
    ],
    ['inert DMAP 5 mol%', 'DMAP', [{ quantity: { dimension: 'mol-share', value: 0.05 } }]],
    ['charge Aliquat 336 5 g', 'Aliquat 336', [{ quantity: { value: 5 } }]],
    ['charge 2,6-lutidine 3 equiv', '2,6-lutidine', [{}]],
    ['charge H2 excess', 'H2', [{ kind: 'excess' }]],
    ['charge DMAP cat.', 'DMAP', [{ kind: 'catalytic' }]],
    ['quench NH4Cl sat. 20 mL', 'NH4Cl', [{ kind: 'saturated' }, {}]],
    ['charge 1 10mmol, 2.3 g', '1', [{ quantity: { value: 0.01 } }, { quantity: { value: 2.3 } }]],
    ['charge 1 3 vol', '1', [{ quantity: { dimension: 'relative-volume', value: 3 } }]],
    ['wash water 2x 20 mL', 'water', [{ portions: 2, quantity: { value: 0.02 } }]],
  ])('%s', (line, name, amounts) => {
    expect(parseLine(line).problems).toEqual([]);
    expect(read(line)).toMatchObject({ name: { text: name }, amounts });
  });

  it('keeps a strength in front of a name apart from a compound called 1', () => {
    expect(read('quench 1 M HCl 20 mL')).toMatchObject({
      name: { text: 'HCl', strength: { quantity: { value: 1 } } },
    });
    expect(read('quench sat. aq. NH4Cl 20 mL')).toMatchObject({
      name: { text: 'NH4Cl', strength: { saturated: true } },
    });
    expect(read('charge 1 1 M in THF')).toMatchObject({ name: { text: '1', strength: null } });
  });
});

describe('bad lines', () => {
  it.each([
    ['frob 1', 'unreadable-line', 'frob'],
    ['Charge 1 1 mmol', 'unreadable-line', 'Charge'],
    ['charge', 'unreadable-line', 'charge'],
    ['charge 1 −3 mmol', 'bad-unit', '−3'],
    ['charge 1 0 g', 'bad-unit', '0'],
    ['charge 1 1e400 mmol', 'bad-unit', '1e400'],
    ['charge 1 10', 'bad-unit', '10'],
    ['charge 1 10 mmoll', 'bad-unit', 'mmoll'],
    ['charge 1 10 bar', 'bad-unit', '10 bar'],
    ['charge 1 10 °C', 'bad-unit', '10 °C'],
    ['charge 1 1.5 mmol stirring', 'unreadable-line', 'stirring'],
    ['temperature −300 °C', 'bad-unit', '−300'],
    ['temperature 5 mL', 'bad-unit', '5 mL'],
    ['convert 1 to 2 yield 120 %', 'bad-unit', '120'],
    ['convert 1 2', 'unreadable-line', '2'],
    ['isolate 1 as crystals', 'unreadable-line', 'crystals'],
    ['accept levelled', 'unreadable-line', 'levelled'],
    ['note "open', 'unreadable-line', '"'],
    ['compound 1', 'unreadable-line', '1'],
    ['compound 1 =', 'unreadable-line', '='],
    ['compound 1 = CCO and more', 'unreadable-line', 'and more'],
    ['deprotonate 1 at 1', 'unreadable-line', '1'],
    ['use shared.lyate', 'unreadable-line', 'shared.lyate'],
  ])('%s', (line, check, text) => {
    expect(faults(line)).toEqual([[check, text]]);
  });
});
