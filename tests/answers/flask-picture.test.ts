/** The numbers of the Flask view are those of the flask. */
import { beforeAll, describe, expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { type FlaskPicture, flaskPictureAt } from '../../server/src/answers/flask-picture.ts';
import type { Analysed } from '../../server/src/answers/types.ts';
import { builtTables } from '../../server/src/host/tables.ts';

const PLAN = `compound phosphate = [Na+].OP(=O)(O)[O-]
compound ketone = O=C([CH3:1])c1ccccc1
step A
  solvent water 1 L
  charge phosphate 50 mmol
  base NaOH 25 mmol

step B
  solvent THF 30 mL
  charge ketone 10 mmol
  base LDA 1.05 equiv
  deprotonate ketone at :1
`;
let analysed: Analysed;
beforeAll(() => {
  analysed = analyseNow(createAnalyser(builtTables()), { file: 'plan.lyate', text: PLAN, language: 'lyate' });
});
const at = (line: number) => flaskPictureAt(analysed, line) as FlaskPicture;

describe('a picture', () => {
  it('is that of the line, and of the whole step on the step’s own line', () => {
    expect(at(4).line).toBe(4);
    expect(at(2)).toEqual(at(5));
    expect(flaskPictureAt(analysed, 0)).toBeNull();
    expect(flaskPictureAt(analysed, 900)).toBeNull();
  });

  it('holds the pH of a phosphate buffer half way', () => {
    expect(at(5).pH).toBeGreaterThan(6.6);
    expect(at(5).pH).toBeLessThan(7.3);
  });

  it('draws curves that fall, and that cross one half at the constant of a lone couple', () => {
    const { curves, pHs, rungs } = at(5);
    for (const { shares } of curves) {
      for (let point = 1; point < shares.length; point++) {
        expect(shares[point]!).toBeLessThanOrEqual(shares[point - 1]! + 1e-12);
      }
    }
    const water = rungs.findIndex(({ pKa }) => 15 < pKa && pKa < 16.5);
    const crossing = pHs.find((_, point) => curves[water]!.shares[point]! < 0.5)!;
    expect(Math.abs(crossing - rungs[water]!.pKa)).toBeLessThan(0.5);
  });

  it('points from the acid to the base once a transfer is meant', () => {
    expect(at(10).arrows).toEqual([]);
    const { arrows, rungs } = at(11);
    const [arrow] = arrows;
    expect(arrow?.answer).toBe('yes');
    expect(rungs.find(({ id }) => id === arrow!.from)?.substance).toBe('ketone');
    expect(rungs.find(({ id }) => id === arrow!.to)?.substance).toBe('LDA');
    expect(arrow!.logK).toBeGreaterThan(5);
  });

  it('points to the step of a base that acts, not to its first', () => {
    const text = `compound salt = Cl.CN(C)CCOc1ccccc1
step A
  solvent water 60 mL
  charge salt 30 mmol
  base K2CO3 1.5 equiv
  deprotonate salt
`;
    const plan = analyseNow(createAnalyser(builtTables()), { file: 'x.lyate', text, language: 'lyate' });
    const { arrows, rungs } = flaskPictureAt(plan, 5) as FlaskPicture;
    expect(rungs.find(({ id }) => id === arrows[0]!.to)?.pKa).toBeCloseTo(10.3, 0);
  });

  it('puts the solvents of the flask first', () => {
    expect(at(5).solvents[0]).toMatchObject({ solvent: 'water', inFlask: true, low: 0 });
    expect(at(5).solvents.length).toBeGreaterThan(5);
  });
});
