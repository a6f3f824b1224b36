import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Perceived } from '../../server/src/chemistry/couple.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { elementCounts } from '../../server/src/chemistry/toolkit.ts';
import { balanceConversion, protonsWanted } from '../../server/src/flask/convert.ts';
import { LEAVING } from '../../server/src/flask/leaving.ts';
import type { Ingredient } from '../../server/src/flask/state.ts';
import type { ReagentRole, SolventRow } from '../../server/src/tables/rows.ts';
import { tables } from '../support/tables.ts';
import { DMF, reagentRow, THF } from './kit.ts';

function read(smiles: string): Perceived {
  const { structure } = readSmiles(smiles);
  const built = buildGraph(structure!);
  return {
    smiles,
    key: smiles,
    problem: null,
    graph: built.graph!,
    components: [],
    couples: [],
    uncovered: [],
    molarMass: null,
  };
}
const counted = (...smiles: string[]) => smiles.map((one) => ({ molecule: read(one), count: 1 }));
let next = 0;
function around(
  smiles: string,
  roles: readonly ReagentRole[] | null = null,
  solvent: SolventRow | null = null,
): Ingredient {
  return {
    id: next++,
    name: smiles,
    molecule: read(smiles),
    mol: 1,
    volume: null,
    role: solvent ? 'solvent' : 'reagent',
    reagent: roles ? reagentRow(smiles, roles) : null,
    solvent,
    assumed: false,
    qualifier: null,
  };
}

test('the formula of each leaving molecule is that of its SMILES', () => {
  for (const { name, smiles, atoms } of LEAVING) {
    expect([name, [...elementCounts(read(smiles).graph!)].sort()]).toEqual([name, [...atoms].sort()]);
  }
});

test('the ion of each strong acid is the acid without one proton', () => {
  for (const { name, smiles, ion, isStrongAcid } of LEAVING) {
    expect([name, ion !== null]).toEqual([name, isStrongAcid]);
    if (ion === null) continue;
    const acid = new Map(elementCounts(read(smiles).graph!));
    acid.set('H', acid.get('H')! - 1);
    const left = [...acid].filter(([, count]) => 0 < count).sort();
    expect([name, [...elementCounts(read(ion).graph!)].sort()]).toEqual([name, left]);
  }
});

test.each([
  ['[Na+].[N-]=[N+]=[N-]', 1],
  ['[Na+].[O-]CC', 1],
  ['Cl.NCc1ccccc1', 0],
  ['[Cl-].[NH3+]Cc1ccccc1', 0],
  ['CC(=O)O', 0],
])('%s wants %i protons', (smiles, wanted) => {
  expect(protonsWanted(perceive(smiles, tables))).toBe(wanted);
});

test.each([
  ['alkylation', ['CCOC(=O)CC(=O)OCC', 'BrCCCc1ccccc1'], ['CCOC(=O)C(CCCc1ccccc1)C(=O)OCC'], ['HBr']],
  ['acylation', ['NCc1ccccc1', 'CC(=O)Cl'], ['CC(=O)NCc1ccccc1'], ['HCl']],
  ['tosylation', ['OCC1CC1', 'Cc1ccc(cc1)S(=O)(=O)Cl'], ['Cc1ccc(cc1)S(=O)(=O)OCC1CC1'], ['HCl']],
  [
    'displacement of a tosylate',
    ['Cc1ccc(cc1)S(=O)(=O)OCC1CC1', 'C1CCNCC1'],
    ['C1CCN(CC1)CC1CC1'],
    ['p-toluenesulfonic acid'],
  ],
  ['amide', ['OC(=O)c1ccccc1', 'NCC'], ['CCNC(=O)c1ccccc1'], ['water']],
  ['condensation', ['O=Cc1ccccc1', 'CC(=O)c1ccccc1'], ['O=C(C=Cc1ccccc1)c1ccccc1'], ['water']],
  ['loss of Boc', ['CC(C)(C)OC(=O)N1CCCC1'], ['C1CCNC1'], ['CO2', 'isobutene']],
  ['decarboxylation', ['OC(=O)CC(=O)c1ccccc1'], ['CC(=O)c1ccccc1'], ['CO2']],
  ['Claisen', ['CCOC(C)=O', 'CCOC(C)=O'], ['CCOC(=O)CC(C)=O'], ['ethanol']],
  ['salt and base', ['Cl.NCC(=O)OC', 'OC(=O)C'], ['COC(=O)CNC(C)=O'], ['HCl', 'water']],
  ['addition', ['C=CC(C)=O', 'C1CCNCC1'], ['CC(=O)CCN1CCCCC1'], []],
])('%s sets free what the trade says', (_, from, to, leaving) => {
  const conversion = balanceConversion(counted(...from), counted(...to), []);
  expect(conversion.missing).toEqual([]);
  expect(conversion.byProducts.map(({ name }) => name).sort()).toEqual([...leaving].sort());
  expect(conversion.unexplained.size).toBe(0);
});

test('acid set free is counted', () => {
  expect(balanceConversion(counted('NCC', 'CC(=O)Cl'), counted('CCNC(C)=O'), []).acidReleased).toBe(1);
  expect(balanceConversion(counted('NCC', 'CC(=O)O'), counted('CCNC(C)=O'), []).acidReleased).toBe(0);
});

test('an atom without a source is named', () => {
  const product = 'Brc1ccc(OC)cc1';
  const bare = balanceConversion(counted('COc1ccccc1'), counted(product), [around('C1CCOC1', null, THF)]);
  expect(bare.missing).toEqual([{ product: 0, element: 'Br', count: 1, atoms: [0] }]);
  const fed = balanceConversion(counted('COc1ccccc1'), counted(product), [
    around('O=C1CCC(=O)N1Br', ['halogenating']),
  ]);
  expect(fed.missing).toEqual([]);
});

test('carbon does not come from tetrahydrofuran or an amine base, but may come from DMF or a Grignard reagent', () => {
  const [from, to] = [counted('c1cc[nH]c1'), counted('O=Cc1ccc[nH]1')];
  const carbon = (...list: Ingredient[]) =>
    balanceConversion(from, to, list).missing.filter(({ element }) => element === 'C');
  expect(carbon(around('C1CCOC1', null, THF), around('CCN(CC)CC', ['amine-base']))).toHaveLength(1);
  expect(carbon(around('CN(C)C=O', null, DMF))).toEqual([]);
  expect(carbon(around('C[Mg]Br', ['organometallic']))).toEqual([]);
});

test('charges and counter-ions are not missed', () => {
  const conversion = balanceConversion(counted('[Na+].[O-]c1ccccc1', 'CI'), counted('COc1ccccc1'), []);
  expect(conversion.missing).toEqual([]);
  expect(conversion.byProducts.map(({ name }) => name)).toEqual(['HI']);
});

test('a structure that could not be read stops nothing', () => {
  const unread: Perceived = { ...read('C'), graph: null };
  expect(
    balanceConversion([{ molecule: unread, count: 1 }], counted('CO'), []).missing.length,
  ).toBeGreaterThan(0);
});
