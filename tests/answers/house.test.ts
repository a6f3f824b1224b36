/** House files: their rows beat the tables, their faults are named at their lines. */
import { describe, expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { readRows } from '../../server/src/answers/csv-rows.ts';
import { type HouseFile, readHouse } from '../../server/src/answers/house.ts';
import { hoverAt } from '../../server/src/answers/hover.ts';
import { sitesOfCompound } from '../../server/src/answers/site-table.ts';
import { constantsIn } from '../../server/src/chemistry/constants.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { lookUpName } from '../../server/src/tables/names.ts';
import { withHouseRows } from '../../server/src/tables/tables.ts';
import { tables } from '../support/tables.ts';

const values = (text: string): HouseFile => ({ kind: 'values', file: 'house/pka.csv', text });
const own = (files: readonly HouseFile[]) => withHouseRows(tables, readHouse(files, tables).rows, 'test');
const faults = (file: HouseFile) =>
  readHouse([file], tables)
    .problems.get(file.file)!
    .map(({ range, message }) => `${range.start.line + 1} ${message}`);

const PHENOL = 'name,smiles,direction,scale,value,sd\nphenol,[OH:1]c1ccccc1,acid,water,9.50,0.02\n';

describe('a house value', () => {
  it('beats the measured value of the tables, on its scale and carried to others', () => {
    const molecule = perceive('c1ccccc1O', tables);
    const value = (set: typeof tables, scale: string) =>
      constantsIn(molecule, scale, set).couples[
        molecule.couples.findIndex(({ element }) => element === 'O')
      ]!;
    const house = own([values(PHENOL)]);
    expect(value(tables, 'water').origin).toBe('measured');
    expect(value(house, 'water')).toMatchObject({
      value: 9.5,
      sd: 0.02,
      origin: 'house',
      sources: ['house/pka.csv'],
    });
    expect(value(house, 'water').hops[0]!.what).toContain('from the house file');
    expect(value(house, 'MeOH').hops[0]!.what).toContain('from the house file');
    expect(value(tables, 'water').origin).toBe('measured');
  });

  it('gives way to what the plan itself says', () => {
    const house = own([values(PHENOL)]);
    const plan =
      'compound 1 = [OH:1]c1ccccc1\n  measured pKa 9.7 at :1 in water\nstep A\n  solvent water 10 mL\n  charge 1 1 mmol\n';
    const analysed = analyseNow(createAnalyser(house), { file: 'a.lyate', text: plan, language: 'lyate' });
    const acid = sitesOfCompound(analysed, '1')!.couples.find(({ couple }) => couple.kind === 'acid');
    expect(acid!.constant).toMatchObject({
      value: 9.7,
      origin: 'plan',
    });
  });

  it('is shown as such in the hover', () => {
    const plan = 'compound 1 = [OH:1]c1ccccc1\nstep A\n  solvent water 10 mL\n  charge 1 1 mmol\n';
    const analysed = analyseNow(createAnalyser(own([values(PHENOL)])), {
      file: 'a.lyate',
      text: plan,
      language: 'lyate',
    });
    expect(hoverAt(analysed, { line: 0, character: 9 })!.markdown).toContain(
      '9.5 ± 0.0 | water | house, house/pka',
    );
  });

  it('replaces one step of an acid with several', () => {
    const malonic = values(
      'name,smiles,direction,scale,step,value,sd\nmalonic acid,[OH:1]C(=O)CC(=O)[OH:1],acid,water,2,5.9,0.05\n',
    );
    const molecule = perceive('OC(=O)CC(=O)O', tables);
    const steps = (set: typeof tables) =>
      constantsIn(molecule, 'water', set)
        .steps[0]!.filter(({ couple }) => couple.kind === 'acid' && couple.element === 'O')
        .map(({ constant }) => constant.value);
    const [first] = steps(tables);
    expect(steps(own([malonic]))).toEqual([first, 5.9]);
  });
});

describe('house reagents and solvents', () => {
  const reagents: HouseFile = {
    kind: 'reagents',
    file: 'house/reagents.csv',
    text: 'name,smiles,roles,synonyms,stock_molarity,stock_solvent\nZap base,CC(C)N(C)C(C)C,amine-base,ZB;zap,2,THF\nNaHCO3,[Na+].OC(=O)[O-],carbonate,,9,water\n',
  };
  const solvents: HouseFile = {
    kind: 'solvents',
    file: 'house/solvents.csv',
    text: 'name,smiles,kind,water_miscibility,scale,protic,density\n4-Methyl-THP,CC1CCOCC1,ether,no,DMSO,no,0.857\n',
  };

  it('are known by name, worked out as those of the tables, and come first', () => {
    const house = own([reagents, solvents]);
    const zap = lookUpName(house, ['zap'])!.reagent!;
    expect(zap).toMatchObject({ name: 'Zap base', stockMolarity: 2, sources: ['house/reagents.csv'] });
    expect(zap.molarMass).toBeCloseTo(115.2, 1);
    expect(house.reagentByKey.get(zap.key!)).toBe(zap);
    expect(lookUpName(house, ['NaHCO3'])!.reagent!.stockMolarity).toBe(9);
    expect(lookUpName(house, ['4-methyl', 'thp'])!.solvent!.density).toBe(0.857);
    const plan =
      'compound 1 = CC(=O)[OH:1]\nstep A\n  solvent 4-Methyl-THP 10 mL\n  charge 1 1 mmol\n  base zap 1.1 equiv\n';
    const { findings } = analyseNow(createAnalyser(house), {
      file: 'a.lyate',
      text: plan,
      language: 'lyate',
    });
    expect(findings.filter(({ check }) => check === 'unknown-name')).toEqual([]);
    const without = analyseNow(createAnalyser(tables), { file: 'a.lyate', text: plan, language: 'lyate' });
    expect(without.findings.filter(({ check }) => check === 'unknown-name').length).toBe(2);
  });
});

describe('a fault in a house file', () => {
  it('is named at its line, and the other lines hold', () => {
    const file = values(
      [
        'name,smiles,direction,scale,value',
        'phenol,[OH:1]c1ccccc1,acid,water,9.5',
        'broken,C(C,acid,water,9',
        'unmarked,CC(=O)O,acid,water,4.8',
        'far,[OH:1]C,acid,water,99',
        'odd,[OH:1]C,sour,water,15',
        'where,[OH:1]C,acid,mercury,15',
        'short,[OH:1]C,acid',
        'text,[OH:1]C,acid,water,"about 15"',
        ',[OH:1]C,acid,water,15',
      ].join('\n'),
    );
    const found = faults(file);
    expect(found.map((line) => Number.parseInt(line, 10))).toEqual([3, 4, 5, 6, 7, 8, 8, 8, 9, 10]);
    expect(found[1]).toContain('marks no site with :1');
    expect(found[2]).toContain('is above 70');
    expect(found[4]).toContain('scale "mercury" is not known; possible are DMAc, DMF, DMSO');
    expect(readHouse([file], tables).rows.measured.map(({ name }) => name)).toEqual(['phenol']);
  });

  it('in the head is one fault and brings nothing', () => {
    expect(faults(values('name,smiles,direction,scale,pKa\nx,[OH:1]C,acid,water,15\n'))).toEqual([
      expect.stringMatching(/^1 .*there is no column "pKa"/),
      expect.stringMatching(/^1 .*the column value is missing/),
    ]);
    expect(faults(values('')).length).toBeGreaterThan(0);
    expect(faults(values('name,smiles\n"open,C\n')).length).toBe(1);
  });

  it('is a name that stands twice, however it is spelt', () => {
    const file: HouseFile = {
      kind: 'reagents',
      file: 'r.csv',
      text: 'name,smiles,roles\nn-BuX,CCCC,salt\nnbux,CCC,salt\n',
    };
    expect(faults(file)).toEqual([expect.stringMatching(/^3 .*one name to a reader/)]);
  });
});

describe('rows of CSV', () => {
  const schema = {
    about: '',
    columns: { name: { type: 'text', about: '', required: true }, value: { type: 'number', about: '' } },
  } as const;
  it('keep their order of columns where told so', () => {
    expect(readRows('value,name\n1,a\n', schema, 'exact').faults.length).toBe(1);
    expect(readRows('value,name\n1,a\n', schema, 'named').rows).toEqual([
      { line: 2, cells: { name: 'a', value: 1 } },
    ]);
    expect(readRows('\ufeffname\r\na\r\n', schema, 'named').rows).toEqual([
      { line: 2, cells: { name: 'a', value: null } },
    ]);
  });
});
