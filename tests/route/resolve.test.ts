import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { only, plan, problemsOf } from './draw.ts';

const STEP =
  'compound 1 = CCOC(=O)[CH2:1]C(=O)OCC\ncompound 2 = BrCCC\nstep A\n  charge 1 10 mmol\n  deprotonate 1 at :1\n  charge 2 1 equiv\n';
const withLine = (line: string) => `${STEP}  ${line}\n`;
const added = (line: string) =>
  plan(withLine(line)).steps[0]!.statements.at(-1)! as unknown as {
    amount: {
      mol: number;
      equiv: number;
      volume: number;
      mass: number;
      assumed: boolean;
      portions: number;
      carriers: { solvent: { name: string }; volume: number }[];
    };
    substance: { kind: string; name: string };
  };
const near = (value: number) => expect.closeTo(value, 6);

describe('amounts', () => {
  it.each([
    ['base NaOEt 1.05 equiv', { mol: near(0.0105), equiv: near(1.05) }],
    ['base NaOEt 680.5 mg', { mol: expect.closeTo(0.01, 4) }],
    ['base n-BuLi 4.2 mL of 2.5 M in hexanes', { mol: near(0.0105), volume: near(0.0042) }],
    [
      'base n-BuLi 4.2 mL',
      { mol: near(0.0105), carriers: [{ solvent: { name: 'hexanes' }, volume: near(0.0042) }] },
    ],
    ['base n-BuLi 1 equiv 1.6 M in hexanes', { mol: near(0.01), volume: near(0.00625) }],
    ['charge BnBr 1.19 mL', { mol: expect.closeTo(0.01, 4), carriers: [] }],
    ['quench HCl 1 mL', { mol: expect.closeTo((1.18 * 0.37) / 36.46, 4) }],
    [
      'quench sat. NH4Cl 20 mL',
      { mol: near(0.1), carriers: [{ solvent: { name: 'water' }, volume: near(0.02) }] },
    ],
    ['quench "sat. NH4Cl" 20 mL', { mol: near(0.1) }],
    [
      'quench 2 M HCl 10 mL',
      { mol: near(0.02), carriers: [{ solvent: { name: 'water' }, volume: near(0.01) }] },
    ],
    ['quench "2 M HCl" 10 mL', { mol: near(0.02) }],
    [
      'quench NH4Cl 1.5 equiv in water 30 mL',
      { mol: near(0.015), carriers: [{ solvent: { name: 'water' }, volume: near(0.03) }] },
    ],
    ['quench water 18 mL', { mol: expect.closeTo(0.996, 2), volume: near(0.018) }],
    ['charge Pd/C 5 mol%', { mol: near(0.0005), mass: null }],
    ['base Et3N 1.39 mL', { mol: expect.closeTo(0.00997, 4) }],
    ['charge 2 excess', { mol: near(0.05), assumed: true }],
    ['charge 2 catalytic', { mol: near(0.001), assumed: true }],
    ['wash water 2 x 20 mL', { volume: near(0.04), portions: 2 }],
    ['solvent THF 3 vol', { volume: expect.closeTo(0.0048, 4) }],
    ['solvent THF', { volume: near(0.05), assumed: true }],
    [
      'base NaH 1.2 equiv 60 wt% in mineral oil',
      { mol: near(0.012), carriers: [{ solvent: { name: 'mineral oil' } }] },
    ],
    ['base NaH 480 mg 60 wt% in mineral oil', { mol: expect.closeTo(0.012, 4) }],
    [
      'adjust pH 3 with 1 M HCl',
      // Amount and volume stand for the strength; how much is worked out from the pH.
      { assumed: true, mol: near(0.01), volume: near(0.01), carriers: [{ solvent: { name: 'water' } }] },
    ],
  ])('%s', (line, wanted) => {
    const text = withLine(line);
    expect(problemsOf(text, plan(text))).toEqual([]);
    expect(added(line).amount).toMatchObject(wanted);
  });

  it('refer to a compound that is charged after the base', () => {
    const text = 'compound 1 = CC(C)=O\nstep A\n base LDA 1.05 equiv\n charge 1 10 mmol\n';
    expect(problemsOf(text, plan(text))).toEqual([]);
    expect(only('base', plan(text)).amount.mol).toBeCloseTo(0.0105, 9);
  });

  it('refer to a charged reagent where no compound has an amount', () => {
    const text = 'step A\n charge BnBr 11 mmol\n base NaH 1 equiv\n';
    expect(plan(text).steps[0]!.reference?.name).toBe('BnBr');
    expect(only('base', plan(text)).amount.mol).toBeCloseTo(0.011, 9);
  });

  it('refer to the product of the step that goes on', () => {
    const text = `${STEP}  convert 1 to 2 yield 50 %\nstep B continues A organic\n  base NaH 2 equiv\n`;
    const [, step] = plan(text).steps;
    expect(step!.reference?.name).toBe('2');
    expect(step!.statements[0]).toMatchObject({ amount: { mol: near(0.01), equiv: near(2) } });
    expect(problemsOf(text, plan(text))).toEqual([]);
  });

  it('that scale together scale every mol', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 500 }), fc.integer({ min: 1, max: 300 }), (mmol, hundredths) => {
        const text = `compound 1 = CCO\nstep A\n charge 1 ${mmol} mmol\n base NaH ${hundredths / 100} equiv\n`;
        const { mol, equiv } = only('base', plan(text)).amount;
        expect(equiv).toBeCloseTo(hundredths / 100, 9);
        expect(mol).toBeCloseTo((mmol * hundredths) / 1e5, 9);
      }),
      { numRuns: 100 },
    );
  });
});

describe('names', () => {
  it('prefers a declared compound, exact and case-sensitive', () => {
    const text = 'compound lda = CCO\nstep A\n charge lda 1 mmol\n base LDA 1 equiv\n';
    expect(only('charge', plan(text)).substance.kind).toBe('compound');
    expect(only('base', plan(text)).substance.kind).toBe('reagent');
  });

  it('folds case, blanks, hyphens and dots', () => {
    const text = 'step A\n charge ETHYL bromo-acetate 1 mmol\n base nBuLi 1 equiv\n';
    expect(problemsOf(text, plan(text))).toEqual([]);
  });

  it('finds a structure in the tables by its key, solvents included', () => {
    const text = 'step A\n solvent <O1CCCC1> 10 mL\n base <[Li+].CC(C)[N-]C(C)C> 1 mmol\n';
    expect(only('solvent', plan(text)).parts[0]!.substance.solvent?.name).toBe('THF');
    expect(only('base', plan(text)).substance.reagent?.name).toBe('LDA');
  });

  it('splits a mixture only where the whole name is not known', () => {
    const text = 'step A\n solvent THF/water 4:1 50 mL\n charge Pd/C 1 g\n';
    const { parts, amount } = only('solvent', plan(text));
    expect(parts.map(({ substance, share }) => [substance.solvent?.name, share])).toEqual([
      ['THF', 0.8],
      ['water', 0.2],
    ]);
    expect(amount.volume).toBeCloseTo(0.05, 9);
    expect(only('charge', plan(text)).substance.name).toBe('Pd/C');
  });

  it('resolves a substance that is solvent and reagent to both rows', () => {
    const { substance } = only('base', plan('step A\n base Et3N 1 mmol\n'));
    expect([substance.reagent?.name, substance.solvent?.name]).toEqual(['Et3N', 'Et3N']);
  });
});

describe('problems', () => {
  it.each([
    ['base Nonsensium 1 equiv', 'unknown-name', 'Nonsensium', 'error'],
    ['solvent THFF 20 mL', 'unknown-name', 'THFF', 'error'],
    ['solvent THF/wasser 1:1', 'unknown-name', 'wasser', 'error'],
    ['charge Foo bar 1 equiv', 'unknown-name', 'Foo bar', 'warning'],
    ['base NaH pellets 1 equiv', 'unreadable-line', 'pellets', undefined],
    ['base NaH', 'missing-amount', 'NaH', undefined],
    ['charge 2', 'missing-amount', '2', undefined],
    ['charge 2 3 mL', 'missing-amount', '3 mL', undefined],
    ['charge 2 5 mmol 2 g', 'amounts-disagree', '5 mmol 2 g', undefined],
    ['deprotonate 1 at :7', 'site-not-found', ':7', undefined],
    ['charge <CC(C> 1 mmol', 'unreadable-structure', '(', undefined],
    ['charge <CC(C)(C)(C)C> 1 mmol', 'impossible-valence', 'C', undefined],
    ['charge 2 1e400 mmol', 'bad-unit', '1e400', undefined],
    ['quench Nonsensium 1 equiv', 'unknown-name', 'Nonsensium', 'warning'],
  ])('%s', (line, check, text, severity) => {
    const source = withLine(line);
    const resolved = plan(source);
    expect(problemsOf(source, resolved)).toEqual([{ check, text, line: 6 }]);
    expect(resolved.steps[0]!.problems[0]!.severity).toBe(severity);
    expect(resolved.steps[0]!.statements).toHaveLength(4);
  });

  it.each(['inert Nonsensium', 'inert Celite 5 g', 'wash water', 'quench water', 'extract 2 into EtOAc'])(
    'none: %s',
    (line) => {
      const source = withLine(line);
      expect(problemsOf(source, plan(source))).toEqual([]);
    },
  );

  it('takes words that JavaScript knows for names like any other', () => {
    const text = 'step constructor\n charge __proto__ 1 mmol\n toString 1\n charge LDA 5 constructor\n';
    expect(problemsOf(text, plan(text)).map(({ check, text: at }) => [check, at])).toEqual([
      ['unknown-name', '__proto__'],
      ['unreadable-line', 'toString'],
      ['bad-unit', 'constructor'],
    ]);
  });

  it('offers the nearest names', () => {
    expect(plan('step A\n base LDAA 1 mmol\n').steps[0]!.problems[0]!.message).toContain('LDA');
  });

  it('are at the definition for a compound', () => {
    const text =
      'compound 1 = C1CC\ncompound 2 = C[N](C)(C)(C)C\nstep A\n charge 1 1 mmol\n charge 2 1 mmol\n';
    expect(problemsOf(text, plan(text)).map(({ check, line }) => [check, line])).toEqual([
      ['unreadable-structure', 0],
      ['impossible-valence', 1],
    ]);
  });

  it('say at both that two compounds or steps share a name', () => {
    const text = 'compound 1 = CCO\ncompound 1 = CCN\nstep A\n charge 1 1 mmol\nstep A\n charge 1 1 mmol\n';
    expect(problemsOf(text, plan(text)).map(({ check, text: at, line }) => [check, at, line])).toEqual([
      ['defined-twice', '1', 0],
      ['defined-twice', '1', 1],
      ['defined-twice', 'A', 2],
      ['defined-twice', 'A', 4],
    ]);
    expect(plan('compound 1 = CCO\ncompound 1 = OCC\n').problems).toEqual([]);
  });

  it('say it once at the first of many', () => {
    const text = 'step A\nstep A\nstep A\n';
    expect(problemsOf(text, plan(text)).map(({ line }) => line)).toEqual([0, 1, 2]);
  });

  it('say one thing about a bracket that is not closed', () => {
    const text = 'step A\n charge <C(C 1 mmol\n';
    expect(problemsOf(text, plan(text))).toEqual([{ check: 'unreadable-line', text: '<', line: 1 }]);
  });

  it('name a compound that no step mentions, unless there is no step', () => {
    const text = 'compound 1 = CCO\ncompound 2 = CCN\nstep A\n charge 1 1 mmol\n';
    expect(problemsOf(text, plan(text))).toEqual([{ check: 'unused-compound', text: '2', line: 1 }]);
    expect(plan('compound 1 = CCO\n').problems).toEqual([]);
  });

  it('name a step to go on from that is not above', () => {
    const text = 'step B continues A\nstep A\n';
    expect(problemsOf(text, plan(text))).toEqual([{ check: 'unknown-name', text: 'A', line: 0 }]);
  });

  it('name statements outside a step and measured values without a compound', () => {
    const text = 'charge 1 1 mmol\nmeasured pKa 3 in water\n';
    expect(problemsOf(text, plan(text)).map(({ text: at }) => at)).toEqual([
      'charge',
      'measured pKa 3 in water',
    ]);
  });

  it('stand at the right place behind wide characters, in every kind of line break', () => {
    for (const br of ['\n', '\r\n', '\r']) {
      const text = ['\uFEFFplan "µ😀"', 'step A "😀µ"', '  note "😀"', '  base "😀µ" 1 mmol'].join(br);
      expect(problemsOf(text, plan(text))).toEqual([{ check: 'unknown-name', text: '"😀µ"', line: 3 }]);
    }
  });

  it('are one for NUL bytes and for a line of 5 MB, the rest resolved', () => {
    const text = `step A\n  \u0000\n  note "${'x'.repeat(5_000_000)}"\n  rt\n`;
    expect(problemsOf(text, plan(text)).map(({ check, line }) => [check, line])).toEqual([
      ['unreadable-line', 1],
      ['unreadable-line', 2],
    ]);
    expect(plan(text).steps[0]!.statements).toHaveLength(1);
  });
});

describe('measured values', () => {
  it('belong to the compound above, with the scale of the solvent', () => {
    const text = 'compound 1 = CC[OH:1]\n  measured pKa 13.3 ± 0.1 at :1 in water source "book"\n';
    expect(plan(text).compounds[0]!.measured).toEqual([
      { origin: 'plan', value: 13.3, sd: 0.1, atoms: [2], scale: 'water', source: 'book' },
    ]);
  });

  it('complain about an unknown solvent or site', () => {
    const text = 'compound 1 = CC[OH:1]\n measured pKa 1 at :2 in water\n measured pKa 1 in wasser\n';
    expect(problemsOf(text, plan(text)).map(({ check }) => check)).toEqual([
      'site-not-found',
      'unknown-name',
    ]);
  });
});

describe('any text', () => {
  const word = fc.constantFrom(
    ...'step A|step B continues A|compound 1 = CCO|compound 1 = C1|charge 1 1 mmol|base LDA 1 equiv|solvent THF/water 1:1:1|use "x"|rt|frob'.split(
      '|',
    ),
    ...'measured pKa 1 in water|accept levelled "x"|charge <C 1 g|convert 1 to 1|deprotonate 1 at :1|extract 1 into <CCO>|wash / 1 mL|solvent / 2:1'.split(
      '|',
    ),
  );
  it('gives a plan whose ranges lie inside the text', () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(word, fc.string()), { maxLength: 12 }), (parts) => {
        const text = parts.join('\n');
        const lines = text.split(/\r\n|\r|\n/);
        const resolved = plan(text);
        const inside = (
          {
            start,
            end,
          }: { start: { line: number; character: number }; end: { line: number; character: number } },
          first: number,
        ) => {
          const line = lines[first + start.line];
          expect(line).toBeDefined();
          expect(start.line).toBe(end.line);
          expect(
            0 <= start.character && start.character <= end.character && end.character <= line!.length,
          ).toBe(true);
        };
        for (const { range } of resolved.problems) inside(range, 0);
        for (const { firstLine, problems, statements, labelRange } of resolved.steps) {
          inside(labelRange, firstLine);
          for (const { range } of [...problems, ...statements]) inside(range, firstLine);
        }
      }),
      { numRuns: 500 },
    );
  });
});
