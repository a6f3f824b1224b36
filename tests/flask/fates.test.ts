/** Who eats whom, what the solvent suffers, which sites go first; and the phases, rates and couplings behind it. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { coupledSteps } from '../../server/src/flask/carbon-sites.ts';
import {
  firstSites,
  lostToSolvent,
  reagentFates,
  siteOrder,
  solventFate,
} from '../../server/src/flask/fates.ts';
import { judgeTransfer } from '../../server/src/flask/judge.ts';
import { rateOf } from '../../server/src/flask/kinetics.ts';
import { ledgerOf } from '../../server/src/flask/ledger.ts';
import { mediumOf } from '../../server/src/flask/medium.ts';
import { solveContents, solveFlask } from '../../server/src/flask/solve.ts';
import { differenceSd } from '../../server/src/flask/uncertainty.ts';
import {
  constantsIn,
  DCM,
  DMF,
  DMSO,
  ETHANOL,
  flask,
  MECN,
  molecule,
  type Part,
  reagentRow,
  stock,
  THF,
  TOLUENE,
  tables,
  WATER,
} from './kit.ts';

const fates = (contents: ReturnType<typeof flask>) => reagentFates(contents, tables, constantsIn);
const butyl: Part = {
  name: 'n-BuLi',
  molecule: stock.nBuLi(),
  mol: 0.2,
  role: 'base',
  reagent: reagentRow('n-BuLi', ['organometallic']),
};
const lda: Part = {
  name: 'LDA',
  molecule: stock.LDA(),
  mol: 0.2,
  role: 'base',
  reagent: reagentRow('LDA', ['metal-amide']),
};

test('LDA takes the proton of acetonitrile used as solvent', () => {
  const contents = flask([[MECN, 1]], [lda]);
  const [fate] = fates(contents);
  expect(fate).toMatchObject({ ingredient: 1, as: 'base', bySolvent: true, isLevelled: false });
  expect(fate!.share).toBeGreaterThan(0.9);
  expect(solventFate(contents, tables, constantsIn).loses[0]!.mol).toBeCloseTo(0.2, 3);
});

test('a solvent without a constant of its own answers for its structure, unless its protons are dead', () => {
  const inSolvent = (group: string, dmso: number) => {
    const contents = flask([[THF, 1]], [lda]);
    const own = molecule([{ group, family: 'carbon-acid', element: 'C', dmso }], [0], 72);
    const [poured, ...others] = contents.ingredients;
    return fates({ ...contents, ingredients: [{ ...poured!, molecule: own }, ...others] });
  };
  expect(inSolvent('ketone-ch', 26.5)[0]).toMatchObject({ as: 'base', bySolvent: true });
  expect(inSolvent('ether-ch', 30)).toEqual([]);
});

test('LDA meets acetonitrile before the ketone that would take its proton in the end', () => {
  const contents = flask([[MECN, 1]], [lda, { name: 'ketone', molecule: stock.ketone(), mol: 0.2 }]);
  expect(lostToSolvent(contents, tables, constantsIn)[0]).toMatchObject({ ingredient: 1, bySolvent: true });
  expect(lostToSolvent(flask([[THF, 1]], [lda]), tables, constantsIn)).toEqual([]);
});

test('a catalytic base acts, the solvent does not step in for it', () => {
  const contents = flask(
    [[WATER, 1]],
    [
      { name: 'phenol', molecule: stock.phenol(), mol: 0.2 },
      { name: 'Et3N', molecule: stock.Et3N(), mol: 0.004 },
    ],
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [], direction: 'deprotonate' },
    tables,
    constantsIn,
  )!;
  expect(verdict.partner!.ingredient).toBe(2);
});

test('a little of a base that the solvent levels acts through the solvent’s ion', () => {
  const strong = molecule(
    [{ group: 'some-base', family: 'alkoxide', element: 'O', dmso: 37, held: false }],
    [-1, 1],
  );
  const contents = flask(
    [[DMSO, 1]],
    [
      { name: 'phenol', molecule: stock.phenol(), mol: 0.6 },
      { name: 'base', molecule: strong, mol: 0.01 },
    ],
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [], direction: 'deprotonate' },
    tables,
    constantsIn,
  )!;
  expect(verdict.partner!.constant.value).toBe(35.1);
  expect(verdict).toMatchObject({ answer: 'yes', broughtBy: 2 });
});

test('what no correlation reaches is taken over from water, and an aprotic flask goes to the DMSO scale', () => {
  const strong = molecule([{ group: 'hydrogen-chloride', family: 'mineral-acid', element: 'Cl', water: -6 }]);
  const inEthanol = solveFlask(
    flask([[ETHANOL, 1]], [{ name: 'HCl', molecule: strong, mol: 0.1 }]),
    tables,
    constantsIn,
  );
  const chloride = inEthanol.couples.find(({ ingredient }) => ingredient === 1)!;
  expect(chloride.protonated).toBeLessThan(0.1);
  expect(chloride.constant).toMatchObject({ origin: 'carried', scale: 'EtOH' });
  const onlyDmso = { ...MECN, scale: 'MeCN' };
  const known: typeof constantsIn = (one, scale, all) =>
    constantsIn(one, scale === 'MeCN' ? 'nowhere' : scale, all);
  const silent: typeof constantsIn = (one, scale, all) => {
    const answer = known(one, scale, all);
    return scale === 'MeCN'
      ? { couples: answer.couples.map(() => null), steps: answer.steps.map(() => []) }
      : answer;
  };
  const state = solveFlask(
    flask([[onlyDmso, 1]], [{ name: 'ketone', molecule: stock.ketone(), mol: 0.1 }]),
    tables,
    silent,
  );
  expect(state.medium).toMatchObject({ scale: 'DMSO', scaleSd: 1.5 });
});

test('LDA in THF and butyllithium in toluene keep', () => {
  expect(fates(flask([[THF, 1]], [lda]))).toEqual([]);
  expect(fates(flask([[TOLUENE, 1]], [butyl], 233.15))).toEqual([]);
});

test('hydrogen chloride in water and sodium hydride in ethanol: the first is levelled, the second is lost', () => {
  const acid = fates(flask([[WATER, 1]], [{ name: 'HCl', molecule: stock.HCl(), mol: 0.1 }]));
  expect(acid[0]).toMatchObject({ as: 'acid', bySolvent: true, isLevelled: true });
  const hydride = reagentRow('NaH', ['metal-hydride']);
  const lost = fates(
    flask([[ETHANOL, 1]], [{ name: 'NaH', molecule: stock.NaH(), mol: 0.1, reagent: hydride }]),
  );
  expect(lost[0]).toMatchObject({ as: 'base', bySolvent: true, isLevelled: false });
  expect(lost[0]!.share).toBeGreaterThan(0.99);
});

test('butyllithium is eaten by an alcohol but spares a ketone unless the transfer is meant', () => {
  const eaten = fates(flask([[THF, 1]], [butyl, { name: 'alcohol', molecule: stock.alcohol(), mol: 0.1 }]));
  expect(eaten.find(({ as }) => as === 'base')!.share).toBeCloseTo(0.5, 6);
  expect(fates(flask([[THF, 1]], [butyl, { name: 'ketone', molecule: stock.ketone(), mol: 0.2 }]))).toEqual(
    [],
  );
});

test('sodium borohydride keeps in ethanol and in alkaline water, and is eaten by acetic acid', () => {
  const borohydride: Part = {
    name: 'NaBH4',
    molecule: molecule([], [-1, 1]),
    mol: 0.1,
    reagent: reagentRow('NaBH4', ['borohydride']),
  };
  const cyano: Part = { ...borohydride, name: 'NaBH3CN', reagent: reagentRow('NaBH3CN', ['borohydride']) };
  const acid: Part = { name: 'acetic acid', molecule: stock.carboxylicAcid(), mol: 0.4 };
  expect(fates(flask([[ETHANOL, 1]], [borohydride]))).toEqual([]);
  expect(
    fates(flask([[WATER, 1]], [borohydride, { name: 'NaOH', molecule: stock.NaOH(), mol: 0.1 }])),
  ).toEqual([]);
  const share = (part: Part) =>
    fates(flask([[ETHANOL, 1]], [part, acid])).find(({ ingredient }) => ingredient === 1)?.share ?? 0;
  expect(share(borohydride)).toBeGreaterThan(0.8);
  expect(share(cyano)).toBeLessThan(0.2);
  expect(solveFlask(flask([[WATER, 1]], [borohydride, acid]), tables, constantsIn).gases[0]!.name).toBe('H2');
});

test('a lithium aluminium hydride is eaten by alcohol, four protons of it', () => {
  const hydride: Part = {
    name: 'LiAlH4',
    molecule: molecule([], [-1, 1]),
    mol: 0.1,
    reagent: reagentRow('LiAlH4', ['aluminium-hydride']),
  };
  const fate = fates(
    flask([[THF, 1]], [hydride, { name: 'alcohol', molecule: stock.alcohol(), mol: 0.2 }]),
  ).find(({ as }) => as === 'base')!;
  expect(fate.share).toBeCloseTo(0.5, 2);
});

test('what is given equals what is taken, and nobody loses more than all', () => {
  const part = fc.constantFrom(
    'phenol',
    'ketone',
    'amine',
    'NaOEt',
    'carbonate',
    'HCl',
    'Et3N',
    'LDA',
    'thiol',
    'KOtBu',
    'carboxylicAcid',
  );
  fc.assert(
    fc.property(
      fc.array(fc.tuple(part, fc.double({ min: 0.01, max: 1, noNaN: true })), { minLength: 1, maxLength: 6 }),
      (parts) => {
        const contents = flask(
          [[ETHANOL, 1]],
          parts.map(([name, mol]) => ({ name, molecule: stock[name](), mol })),
        );
        const solved = solveContents(contents, tables, constantsIn);
        for (const { mol } of ledgerOf(solved)) expect(mol).toBeGreaterThan(0);
        const lost = new Map<string, number>();
        for (const { ingredient, as, own, share } of fates(contents)) {
          const key = `${ingredient} ${as} ${own.couple.atom}`;
          lost.set(key, (lost.get(key) ?? 0) + share);
        }
        for (const share of lost.values()) expect(share).toBeLessThanOrEqual(1 + 1e-9);
      },
    ),
  );
});

test('the acid goes before the ketone, and the alcohol does not', () => {
  const contents = flask(
    [[THF, 1]],
    [
      { name: 'ketone', molecule: stock.ketone(), mol: 0.2 },
      lda,
      { name: 'acid', molecule: stock.carboxylicAcid(), mol: 0.1 },
      { name: 'alkyne', molecule: stock.alkyne(), mol: 0.1 },
    ],
  );
  const verdict = judgeTransfer(
    contents,
    { ingredient: 1, couples: [], direction: 'deprotonate' },
    tables,
    constantsIn,
  )!;
  const order = siteOrder(contents, verdict, 'deprotonate', tables, constantsIn);
  expect(firstSites(order).map(({ site }) => site.ingredient)).toEqual([3]);
  expect(order[0]!.moved).toBeGreaterThan(0.99);
});

test('water over dichloromethane makes two layers, with tetrahydrofuran one', () => {
  expect(
    mediumOf(
      flask(
        [
          [WATER, 1],
          [DCM, 1],
        ],
        [],
      ),
    ).organic!.names,
  ).toEqual(['CH2Cl2']);
  expect(
    mediumOf(
      flask(
        [
          [WATER, 1],
          [THF, 1],
        ],
        [],
      ),
    ),
  ).toMatchObject({ organic: null, scale: 'water' });
  expect(
    mediumOf(
      flask(
        [
          [WATER, 0.05],
          [THF, 1],
        ],
        [],
      ),
    ).scale,
  ).toBe('DMSO');
  expect(
    mediumOf(
      flask(
        [
          [ETHANOL, 0.3],
          [THF, 0.7],
        ],
        [],
      ),
    ).scale,
  ).toBe('EtOH');
});

test('sodium hydroxide over dichloromethane touches nothing', () => {
  const contents = flask(
    [
      [WATER, 1],
      [DCM, 1],
    ],
    [{ name: 'NaOH', molecule: stock.NaOH(), mol: 0.5 }],
  );
  expect(solventFate(contents, tables, constantsIn).loses).toEqual([]);
});

test('an assumed volume is said to be assumed', () => {
  const contents = flask([[DMF, 1]], [{ name: 'A', molecule: stock.phenol(), mol: 0.1 }]);
  const bare = { ...contents, ingredients: contents.ingredients.map((one) => ({ ...one, volume: null })) };
  expect(mediumOf(bare)).toMatchObject({ assumedVolume: true, volume: 0.5, scale: 'DMSO' });
});

test('bicarbonate gives its carbon dioxide to acid, and the hydride its hydrogen', () => {
  const soda = flask(
    [[WATER, 1]],
    [
      { name: 'NaHCO3', molecule: stock.bicarbonate(), mol: 0.5 },
      { name: 'HCl', molecule: stock.HCl(), mol: 0.5 },
    ],
  );
  const [gas] = solveFlask(soda, tables, constantsIn).gases;
  expect(gas!.name).toBe('CO2');
  expect(gas!.mol).toBeCloseTo(0.5 - 0.033, 2);
});

test('rates: toluene is safe from butyllithium until a diamine comes, arenes from Grignard reagents always', () => {
  const toluene = molecule([{ group: 'benzylic-ch', family: 'carbon-acid', element: 'C', dmso: 43 }])
    .couples[0]!;
  const plain = flask([[THF, 1]], [butyl]);
  const helped = flask(
    [[THF, 1]],
    [butyl, { name: 'TMEDA', molecule: stock.Et3N(), mol: 0.2, reagent: reagentRow('TMEDA', ['ligand']) }],
  );
  expect(rateOf(toluene, 'leaves', plain, tables)).toBe('dead');
  expect(rateOf(toluene, 'leaves', helped, tables)).toBe('instant');
  expect(rateOf(stock.phenol().couples[0]!, 'leaves', plain, tables)).toBe('instant');
});

test('the two sides of a ketone do not lose a proton each', () => {
  const couple = (dmso: number) => ({ group: 'ketone-ch', family: 'carbon-acid', element: 'C', dmso });
  const ketone = molecule([couple(26.5), couple(27)]);
  const { steps } = constantsIn(ketone, 'DMSO', tables);
  expect(coupledSteps(steps[0]!, ketone, null).map(({ constant }) => constant.value)).toEqual([26.5, 40]);
  // Meant on the weaker side: the kinetic enolate, whose rival steps aside.
  expect(coupledSteps(steps[0]!, ketone, ketone.couples[1]!).map(({ constant }) => constant.value)).toEqual([
    27,
  ]);
  const doubled = { ...lda, mol: 0.4 };
  const contents = flask([[THF, 1]], [{ name: 'ketone', molecule: ketone, mol: 0.2 }, doubled]);
  const moved = solveFlask(contents, tables, constantsIn).couples.filter(
    ({ ingredient }) => ingredient === 1,
  );
  expect(moved.reduce((sum, { protonated }) => sum + protonated, 0)).toBeCloseTo(1, 1);
});

test('a wider sd widens a difference; one line for both narrows it', () => {
  const constant = (sd: number, origin: 'measured' | 'carried') => ({
    value: 10,
    sd,
    scale: 'DMSO',
    origin,
    sources: [],
    hops: [{ what: 'phenols, water to DMSO', value: 10, sd, sources: [] }],
  });
  const couple = stock.phenol().couples[0]!;
  const site = (sd: number, origin: 'measured' | 'carried') => ({ couple, constant: constant(sd, origin) });
  expect(differenceSd(site(1, 'measured'), site(1, 'measured'), 0)).toBeCloseTo(Math.SQRT2, 12);
  expect(differenceSd(site(1, 'carried'), site(1, 'carried'), 0)).toBeCloseTo(1, 12);
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 3, noNaN: true }),
      fc.double({ min: 0, max: 3, noNaN: true }),
      fc.double({ min: 0, max: 2, noNaN: true }),
      (a, b, more) => {
        for (const origin of ['measured', 'carried'] as const) {
          expect(differenceSd(site(a + more, origin), site(b, origin), 0.5)).toBeGreaterThanOrEqual(
            differenceSd(site(a, origin), site(b, origin), 0.5) - 1e-12,
          );
        }
      },
    ),
  );
});
