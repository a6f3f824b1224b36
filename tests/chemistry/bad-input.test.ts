/** Odd and bad structures: each gives couples with their constants, or one clear word, in bounded time. */
import { describe, expect, test } from 'vitest';
import { constantsIn } from '../../server/src/chemistry/constants.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { tables } from '../support/tables.ts';

function sitesOf(smiles: string) {
  const molecule = perceive(smiles, tables);
  const { couples, steps } = constantsIn(molecule, 'water', tables, { estimateOnly: true });
  return { molecule, couples, steps };
}

/** The constant of the only couple of a group. */
function constantOf(smiles: string, group: string): number {
  const { molecule, couples } = sitesOf(smiles);
  const places = molecule.couples.flatMap((couple, place) => (couple.group === group ? [place] : []));
  expect(places, `${group} in ${smiles}`).toHaveLength(1);
  return couples[places[0]!]!.value;
}

test.each([
  ['a radical', 'C[CH]CC(=O)O', 'carboxylic-acid'],
  ['an oxyl radical', 'CC1(C)CC(O)CC(C)(C)N1[O]', 'alcohol-secondary'],
  ['a complex', 'CC(=O)O[Pd]OC(C)=O', null],
  ['a metal carbonyl', '[Fe](=C=O)(=C=O)=C=O', null],
  ['a noble metal beside a ligand', '[Pt+2].NCCN.[Cl-].[Cl-]', 'amine-primary'],
  ['isotopes', '[13CH3][13C](=O)[18OH]', 'carboxylic-acid'],
  ['heavy water', '[2H]O[2H]', 'water'],
  ['a mixture of salts', '[Na+].[K+].CC(=O)[O-].[O-]c1ccccc1.[Cl-]', 'phenol'],
  ['a double salt of a base', 'Cl.OS(=O)(=O)O.CCN(CC)CC', 'amine-tertiary'],
  ['a cation twice charged', '[NH3+]CC[NH3+]', 'amine-primary'],
  ['a zwitterion', '[NH3+]CC(=O)[O-]', 'amino-acid'],
  ['an acylium ion', 'CC#[O+]', null],
  ['a carbocation', 'C[C+](C)C', null],
  ['a carbene', 'CN1C=CN(C)[C]1', null],
  ['bare atoms', '[Zn].[S].[P]', null],
])(
  '%s (%s) is read, and every couple has a constant or none, never a number that is not one',
  (_, smiles, group) => {
    const { molecule, couples } = sitesOf(smiles);
    expect(molecule.problem).toBeNull();
    for (const constant of couples) {
      if (constant === null) continue;
      expect(Number.isFinite(constant.value)).toBe(true);
      expect(constant.sd).toBeGreaterThan(0);
      expect(constant.sd).toBeLessThan(12);
    }
    if (group !== null) expect(molecule.couples.map((couple) => couple.group)).toContain(group);
  },
);

test.each([
  ['a query atom', 'C*C', 'unreadable-structure'],
  ['a list of elements', '[C,N]C', 'unreadable-structure'],
  ['a ring that does not close', 'C1CC', 'unreadable-structure'],
  ['no Kekulé form', 'c1ccccn1C', 'unreadable-structure'],
  ['five bonds on carbon', 'CC(C)(C)(C)C', 'impossible-valence'],
  ['a polymer', 'C'.repeat(2000), 'budget-reached'],
])('%s gets one clear word', (_, smiles, check) => {
  const { problem, couples } = perceive(smiles, tables);
  expect(problem?.check).toBe(check);
  expect(problem!.message).toMatch(/^[A-Z].*\.$/);
  expect(problem!.span.end).toBeGreaterThan(problem!.span.start);
  expect(couples).toEqual([]);
});

describe('molecules of 500 atoms', () => {
  test.each([
    ['a peptide', `N${'CC(=O)N'.repeat(124)}CC(=O)O`],
    ['a polyamine', `N${'CCN'.repeat(166)}`],
    ['a polyacid', `C(C(=O)O)${'C(C(=O)O)'.repeat(100)}C`],
    ['a chain of arenes', 'c1ccc(cc1)'.repeat(62).replace(/$/, 'O')],
    ['a hydrocarbon', 'C'.repeat(500)],
  ])('%s is done in seconds, on a busy machine too', (_, smiles) => {
    const start = performance.now();
    const { molecule, couples } = sitesOf(smiles);
    expect(performance.now() - start).toBeLessThan(4000);
    expect(molecule.problem).toBeNull();
    expect(couples.some((constant) => constant !== null)).toBe(true);
  });
});

test.each([
  ['carboxylic-acid', ['CC(=O)O', 'CC(=O)[O-]', 'CC(=O)O[Na]', '[Na+].CC([O-])=O', 'CC(=O)O[K]']],
  ['amine-secondary', ['CCNCC', 'CC[NH2+]CC', 'Cl.CCNCC', '[Cl-].CC[NH2+]CC', 'CCN([H])CC']],
  ['phenol', ['Oc1ccccc1', '[O-]c1ccccc1', '[Na]Oc1ccccc1', '[K+].[O-]C1=CC=CC=C1', '[2H]Oc1ccccc1']],
  ['pyridine', ['c1ccncc1', 'c1cc[nH+]cc1', 'Cl.c1ccncc1', 'C1=CC=NC=C1']],
  ['nitro-ch', ['C[N+](=O)[O-]', '[CH2-][N+](=O)[O-]', 'C=[N+]([O-])[O-]', '[Na+].C=[N+]([O-])[O-]']],
])('%s has one constant however it is charged', (group, texts) => {
  const [first, ...others] = texts.map((smiles) => constantOf(smiles, group));
  for (const other of others) expect(other).toBeCloseTo(first!, 9);
});
