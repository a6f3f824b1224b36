import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readDocument } from '../../server/src/route/document.ts';
import { createPlanReader } from '../../server/src/route/resolve.ts';
import { plan } from './draw.ts';
import { SMALL_TABLES } from './small-tables.ts';

const line = fc.constantFrom(
  'step A',
  'step B continues A organic',
  'step C continues B',
  'compound 1 = CCO',
  'compound 1 = [CH3:1]C(C)=O',
  'compound 2 = CCN',
  'measured pKa 10 in water',
  'charge 1 1 mmol',
  'charge 1 2 g',
  'charge 2 1.2 equiv',
  'base LDA 1 equiv',
  'deprotonate 1 at :1',
  'convert 1 + 2 to 1 yield 50 %',
  'solvent THF/1 1:1',
  'frob',
  'compound "x y" = CC',
  'charge "x y" 1 mmol',
  'charge "1 M 2" 1 mL',
  'solvent "THF/2" 1:1',
  'extract 1 into 2/"x y"',
  'use "other.lyate"',
  'step A',
  '',
);
const OTHER = { 'other.lyate': 'compound 2 = CCS\ncompound 3 = CCO\n' };
type Edit = readonly [at: number, remove: number, insert: readonly string[]];
const edits: fc.Arbitrary<Edit[]> = fc.array(
  fc.tuple(fc.nat(20), fc.nat(3), fc.array(line, { maxLength: 3 })),
  { maxLength: 8 },
);

describe('a reader that has seen other versions', () => {
  it('gives the plan of a fresh one', () => {
    fc.assert(
      fc.property(fc.array(line, { maxLength: 20 }), edits, (start, changes) => {
        const reader = createPlanReader(SMALL_TABLES);
        const files = new Map(Object.entries(OTHER));
        const lines: string[] = [...start];
        const look = () => {
          const text = lines.join('\n');
          expect(reader.resolve({ file: 'plan.lyate', text, language: 'lyate' }, files)).toEqual(
            plan(text, { files: OTHER }),
          );
        };
        look();
        for (const [at, remove, insert] of changes) {
          lines.splice(at, remove, ...insert);
          look();
        }
      }),
      { numRuns: 300 },
    );
  });

  it('gives steps of one content key that differ in their first line alone', () => {
    fc.assert(
      fc.property(fc.array(line, { maxLength: 30 }), (lines) => {
        const byKey = new Map<string, unknown>();
        for (const { firstLine: _, ...step } of plan(lines.join('\n')).steps) {
          const known = byKey.get(step.contentKey);
          if (known !== undefined) expect(step).toEqual(known);
          byKey.set(step.contentKey, step);
        }
      }),
      { numRuns: 300 },
    );
  });
});

describe('blocks', () => {
  it('joined in order give back the text, with and without an earlier version', () => {
    fc.assert(
      fc.property(fc.array(line, { maxLength: 20 }), fc.array(line, { maxLength: 20 }), (before, now) => {
        const text = now.join('\n');
        const earlier = readDocument(before.join('\n'), 'lyate');
        for (const document of [readDocument(text, 'lyate'), readDocument(text, 'lyate', earlier)]) {
          expect(document.blocks.map(({ raw }) => raw).join('')).toBe(text);
          for (const { firstLine, block } of document.blocks) {
            expect(block.lines.map((tree) => tree.text)).toEqual(
              now.slice(firstLine, firstLine + block.lines.length),
            );
          }
        }
      }),
      { numRuns: 300 },
    );
  });
});

describe('content keys', () => {
  const base = 'compound 1 = CCO\nstep A\n charge 1 1 mmol\nstep B continues A\n base LDA 1 equiv\n';
  const keys = (text: string) => plan(text).steps.map(({ contentKey }) => contentKey);
  it('stay when lines are inserted above', () => {
    expect(keys(`// new\n\n${base}`)).toEqual(keys(base));
  });
  it('change with a definition and with the step gone on from', () => {
    const [a, b] = keys(base);
    expect(keys(base.replace('CCO', 'CCN'))[0]).not.toBe(a);
    expect(keys(base.replace('1 mmol', '2 mmol'))[1]).not.toBe(b);
  });
});

describe('a file of 2,000 steps', () => {
  it('is resolved anew after an edit without reading the rest again', () => {
    const step = (at: number, amount: number) =>
      `compound p${at} = CCOC(=O)[CH2:1]CCCC${'C'.repeat(at % 7)}\nstep S${at} "no ${at}"\n  solvent THF 20 mL\n  charge p${at} ${amount} mmol\n  base LDA 1.05 equiv\n  deprotonate p${at} at :1\n  charge BnBr 1.1 equiv\n  temperature 20 °C\n  quench sat. NH4Cl 10 mL\n  isolate p${at} as neutral\n`;
    const steps = Array.from({ length: 2000 }, (_, at) => step(at, 10));
    const reader = createPlanReader(SMALL_TABLES);
    const resolve = () => reader.resolve({ file: 'plan.lyate', text: steps.join(''), language: 'lyate' });
    const first = resolve();
    expect(first.steps).toHaveLength(2000);
    const times: number[] = [];
    for (let round = 0; round < 20; round++) {
      steps[1000] = step(1000, 11 + round);
      const text = steps.join('');
      const start = performance.now();
      const next = reader.resolve({ file: 'plan.lyate', text, language: 'lyate' });
      times.push(performance.now() - start);
      expect(next.steps[1500]!.contentKey).toBe(first.steps[1500]!.contentKey);
      expect(next.steps[1000]!.referenceMol).toBeCloseTo((11 + round) / 1000, 9);
    }
    times.sort((a, b) => a - b);
    process.stdout.write(`re-resolving 2,000 steps after an edit: median ${times[10]!.toFixed(1)} ms\n`);
    // Generous for busy machines: reading all of it anew takes some hundred milliseconds.
    expect(times[10]).toBeLessThan(60);
  });
});
