import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatText } from '../../server/src/route/format.ts';
import type { Plan } from '../../server/src/route/plan.ts';
import { plan } from './draw.ts';

const BEFORE = `plan   "Side chain"
compound 1=CCOC(=O)[CH2:1]C(=O)OCC // atom maps
compound  2a = BrCCC
 measured pKa 13.3±0.2 in water

// the first
step A   "Alkylate"
solvent EtOH 50   mL
      // slowly
charge 1   10 mmol // reference
    base NaOEt 1.05 equiv  // fresh
 frob   it
convert 1 + 2a to 1   yield 85 %
rt
`;
const AFTER = `plan "Side chain"
compound 1  = CCOC(=O)[CH2:1]C(=O)OCC  // atom maps
compound 2a = BrCCC
 measured pKa 13.3±0.2 in water

// the first
step A "Alkylate"
  solvent     EtOH 50 mL
  // slowly
  charge      1 10 mmol         // reference
  base        NaOEt 1.05 equiv  // fresh
 frob   it
  convert     1 + 2a to 1 yield 85 %
  rt
`;

const part = fc.constantFrom(
  ...'step A|compound 1 = CCO|compound "long name"=C[N+](C)(C)C|charge 1 10 mmol|charge 1 10mmol, 2 g|base LDA 1 equiv 2 M in THF|frob'.split(
    '|',
  ),
  ...'// c|deprotonate 1 at :1, :2|deprotonate 1 at :1,:2|solvent THF / water 4:1 v/v 5 mL|note "a  //  b"|quench sat. aq. NH4Cl 2 x 5 mL|temperature −78 to 0 °C'.split(
    '|',
  ),
  ...'rt|measured pKa 3 ± 1 in water|accept levelled "x  y"|charge 1 −3 g|base <CC[O-]> 1 equiv|keep 1 in organic| |note "open'.split(
    '|',
  ),
);
const text = fc
  .array(
    fc.tuple(
      fc.constantFrom('', ' ', '\t', '    '),
      part,
      fc.constantFrom('', '  ', ' // why', '   //  why '),
    ),
    { maxLength: 14 },
  )
  .map((lines) => lines.map((each) => each.join('')).join('\n'));

/** What a plan says, without where it says it. */
function meaning({ title, compounds, steps, accepts, problems, needs }: Plan): unknown {
  const saying = JSON.stringify({ title, compounds, steps, accepts, problems, needs }, (key, value) =>
    key === 'range' || key.endsWith('Range') || key === 'contentKey' ? undefined : value,
  );
  return JSON.parse(saying);
}

describe('the formatter', () => {
  it('aligns what follows the keywords, signs and comments', () => {
    expect(formatText(BEFORE, 'lyate')).toBe(AFTER);
  });

  it('gives the same again', () => {
    fc.assert(
      fc.property(text, (source) => {
        const once = formatText(source, 'lyate');
        expect(formatText(once, 'lyate')).toBe(once);
      }),
      { numRuns: 500 },
    );
  });

  it('changes nothing but blanks outside quotes, and no meaning', () => {
    fc.assert(
      fc.property(text, (source) => {
        const once = formatText(source, 'lyate');
        expect(once.replace(/\s/g, '')).toBe(source.replace(/\s/g, ''));
        expect(once.split('\n')).toHaveLength(source.split('\n').length);
        expect(meaning(plan(once))).toEqual(meaning(plan(source)));
      }),
      { numRuns: 500 },
    );
  });

  it('takes any text', () => {
    fc.assert(
      fc.property(
        fc.string({ unit: 'binary' }),
        (source) => typeof formatText(source, 'markdown') === 'string',
      ),
    );
  });

  it('keeps line breaks, the byte order mark, and Markdown outside the fences', () => {
    expect(formatText('\uFEFFstep   A\r\nrt\r\n', 'lyate')).toBe('\uFEFFstep A\r\n  rt\r\n');
    expect(formatText('a   b\n\n  ```lyate\n  step   A\n  rt\n  ```\n x   y\n', 'markdown')).toBe(
      'a   b\n\n  ```lyate\n  step A\n    rt\n  ```\n x   y\n',
    );
  });
});
