/** Molecules and their couples, however they are written or charged, and whatever is thrown at the reader. */
import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Structure } from '../../server/src/chemistry/molecule.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { writeSmiles } from '../../server/src/chemistry/write-smiles.ts';
import { tables } from '../support/tables.ts';

const see = (smiles: string) => perceive(smiles, tables);

/** Couples without their places: kind, group, how many equal atoms, proton held. */
function couplesOf(smiles: string, { held }: { held: boolean } = { held: true }): string[] {
  return see(smiles)
    .couples.map(
      ({ kind, group, equivalents, holdsProton }) =>
        `${kind} ${group} x${equivalents.length}${held ? (holdsProton ? ' H' : ' –') : ''}`,
    )
    .sort();
}

/** The couple of one group; the test fails where there is not exactly one. */
function only(smiles: string, group: string) {
  const found = see(smiles).couples.filter((couple) => couple.group === group);
  expect(found, `${group} in ${smiles}`).toHaveLength(1);
  return found[0]!;
}

test.each([
  ['CCO', '[Na+].CC[O-]', 'alcohol-primary'],
  ['CCO', '[Na]OCC', 'alcohol-primary'],
  ['CC(=O)O', 'CC(=O)[O-]', 'carboxylic-acid'],
  ['CCCC', '[Li]CCCC', 'alkane-ch'],
  ['C#Cc1ccccc1', '[Li]C#Cc1ccccc1', 'alkyne-aryl'],
  ['CC(C)NC(C)C', '[Li+].CC(C)[N-]C(C)C', 'amine-nh-hindered'],
  ['COC(=O)CC(=O)OC', '[Na+].COC(=O)[CH-]C(=O)OC', 'malonate-ch'],
  ['C[P+](C)(C)C', '[CH2-][P+](C)(C)C', 'phosphonium-ch'],
  ['C#N', '[K+].[C-]#N', 'hydrogen-cyanide'],
  ['N=[N+]=[N-]', '[Na+].[N-]=[N+]=[N-]', 'hydrazoic-acid'],
  ['F', '[Cs+].[F-]', 'hydrogen-fluoride'],
  ['O', '[K+].[OH-]', 'water'],
  ['[HH]', '[Na+].[H-]', 'dihydrogen'],
  ['[HH]', '[NaH]', 'dihydrogen'],
  ['O=C1CCCCC1', '[Li]OC1=CCCCC1', 'ketone-ch'],
  ['CCOC(C)=O', '[Na+].CCOC([O-])=C', 'ester-ch'],
  ['OB(O)O', '[Na+].O[B-](O)(O)O', 'boric-acid'],
  ['OB(O)c1ccccc1', '[K+].O[B-](O)(O)c1ccccc1', 'boronic-acid'],
])('%s and %s are one molecule, with and without its proton', (acid, salt, group) => {
  const bare = see(salt).couples.filter((couple) => couple.group === group && !couple.holdsProton);
  expect(bare).toHaveLength(1);
  expect(see(acid).couples.some((couple) => couple.group === group && couple.holdsProton)).toBe(true);
  expect(see(salt).components.map(({ key }) => key)).toContain(see(acid).components[0]!.key);
});

test.each([
  ['CCN', 'CC[NH3+]', 'amine-primary'],
  ['N', '[NH4+]', 'ammonia'],
  ['c1ccncc1', 'c1cc[nH+]cc1', 'pyridine'],
  ['CC(=N)N', 'CC(=[NH2+])N', 'amidine'],
  ['NC(=N)N', 'NC(=[NH2+])N', 'guanidine'],
  ['O', '[OH3+]', 'water-o'],
  ['C1CCC2=NCCCN2CC1', 'C1CCC2=[NH+]CCCN2CC1', 'amidine-bicyclic'],
  ['Cn1ccnc1', 'C[n+]1cc[nH]c1', 'imidazole-n'],
])('%s and %s are one base, without and with its proton', (base, acid, group) => {
  expect(only(base, group).holdsProton).toBe(false);
  expect(only(acid, group).holdsProton).toBe(true);
  expect(see(acid).key).toBe(see(base).key);
});

test('a hydride written as one atom gives as many hydride ions as it has hydrogens', () => {
  for (const [drawn, count] of [
    ['[LiH]', 1],
    ['[NaH]', 1],
    ['[CaH2]', 2],
  ] as const) {
    const { couples, graph } = see(drawn);
    const hydrides = couples.filter(({ group, holdsProton }) => group === 'dihydrogen' && !holdsProton);
    expect(hydrides.flatMap(({ equivalents }) => equivalents).length, drawn).toBe(count);
    expect(graph!.atoms[0]!.charge).toBe(count);
  }
});

test('a boric acid gives one proton for each boron, and a mark chooses among its hydroxyl groups', () => {
  expect(only('OB(O)O', 'boric-acid').equivalents).toHaveLength(1);
  expect(only('OB(O)c1ccc(cc1)B(O)O', 'boronic-acid').equivalents).toHaveLength(2);
  expect(only('OB([OH:1])c1ccccc1', 'boronic-acid').atom).toBe(2);
});

test('a zwitterion has the couples of its neutral drawing, with the proton elsewhere', () => {
  expect(couplesOf('[NH3+]CC(=O)[O-]', { held: false })).toEqual(couplesOf('NCC(=O)O', { held: false }));
  expect(only('[NH3+]CC(=O)[O-]', 'amine-primary').holdsProton).toBe(true);
  expect(only('[NH3+]CC(=O)[O-]', 'amino-acid').holdsProton).toBe(false);
});

test('charges add up: a component without any couple’s proton has the bare charge', () => {
  for (const [smiles, charge, bare] of [
    ['[NH4+]', 1, -1],
    ['OP(=O)(O)O', 0, -3],
    ['[O-]C(=O)C(=O)O', -1, -2],
    ['C[N+](C)(C)C', 1, -3],
  ] as const) {
    const [component] = see(smiles).components;
    expect(component!.charge, smiles).toBe(charge);
    expect(component!.bareCharge, smiles).toBe(bare);
  }
});

test('counterions are spectators, and each part of a mixture has its own couples', () => {
  const salt = see('[Na+].F[P-](F)(F)(F)(F)F.CCO');
  expect(salt.components.map(({ spectator }) => spectator)).toEqual([true, true, false]);
  const { couples } = see('Cl.NCC');
  expect(couples.find(({ group }) => group === 'hydrogen-chloride')!.component).toBe(0);
  expect(couples.find(({ group }) => group === 'amine-primary')!.component).toBe(1);
});

test('equal atoms are one couple; those that a drawing treats differently are two', () => {
  expect(only('OC(=O)CC(=O)O', 'carboxylic-acid').equivalents).toEqual([0, 6]);
  const half = see('[O-]C(=O)CC(=O)O').couples.filter(({ group }) => group === 'carboxylic-acid');
  expect(half.map(({ atom, holdsProton }) => [atom, holdsProton])).toEqual([
    [0, false],
    [6, true],
  ]);
  expect(only('OP(=O)(O)O', 'phosphoric-acid').equivalents).toHaveLength(3);
  expect(only('COC(=O)CC(=O)OC', 'malonate-ch').equivalents).toHaveLength(1);
  expect(only('S', 'hydrogen-sulfide').equivalents).toHaveLength(1);
});

test('an N–H is acid and base at once', () => {
  const couples = see('CCNCC').couples.filter(({ atom }) => atom === 2);
  expect(couples.map(({ kind, holdsProton }) => [kind, holdsProton])).toEqual([
    ['acid', true],
    ['base', false],
  ]);
});

test('isotopes, explicit hydrogens, map numbers and stereo marks change no couple', () => {
  expect(couplesOf('[2H]OC')).toEqual(couplesOf('CO'));
  expect(couplesOf('[13CH3][18OH]')).toEqual(couplesOf('CO'));
  expect(couplesOf('[H]N([H])C')).toEqual(couplesOf('NC'));
  expect(couplesOf('C[C@H](N)C(=O)[OH:7]')).toEqual(couplesOf('CC(N)C(=O)O'));
  expect(couplesOf('C/C=C/C(=O)O')).toEqual(couplesOf('CC=CC(=O)O'));
});

/** Small repeatable random numbers. */
function randomFrom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
}

/** The same structure with its atoms in another order. */
function shuffled({ atoms, bonds }: Structure, random: () => number): Structure {
  const order = atoms.map(({ index }) => ({ index, rank: random() })).sort((a, b) => a.rank - b.rank);
  const place = new Map(order.map(({ index }, at) => [index, at]));
  return {
    atoms: order.map(({ index }, at) => ({ ...atoms[index]!, index: at })),
    bonds: bonds.map((bond) => ({ ...bond, from: place.get(bond.from)!, to: place.get(bond.to)! })),
  };
}

test('the order of atoms and the Kekulé form written change no couple, over all examples of the rules', () => {
  const random = randomFrom(20);
  const wrong: string[] = [];
  let compared = 0;
  for (const smiles of new Set(tables.groups.map(({ example }) => example))) {
    const { structure } = readSmiles(smiles);
    const { graph } = buildGraph(shuffled(structure!, random));
    if (graph === undefined) continue;
    const other = writeSmiles(graph).text;
    compared += 1;
    if (couplesOf(other).join() !== couplesOf(smiles).join()) wrong.push(`${smiles} / ${other}`);
  }
  expect(wrong).toEqual([]);
  expect(compared).toBeGreaterThan(250);
});

test('no heteroatom of an example is left without a rule', () => {
  const left = tables.groups.filter(({ example }) => see(example).uncovered.length !== 0);
  expect(left.map(({ id, example }) => `${id} ${example}`)).toEqual([]);
});

test('without rules every proton on a heteroatom and every basic nitrogen is uncovered', () => {
  const bare = { version: 'none', groups: [] };
  expect(perceive('CCO', bare).uncovered).toEqual([2]);
  expect(perceive('CCN(C)C', bare).uncovered).toEqual([2]);
  expect(perceive('c1ccncc1', bare).uncovered).toEqual([3]);
  expect(perceive('CS', bare).uncovered).toEqual([1]);
  expect(perceive('CP', bare).uncovered).toEqual([1]);
  expect(perceive('CC(=O)N(C)C', bare).uncovered).toEqual([]);
  expect(perceive('Cn1cccc1', bare).uncovered).toEqual([]);
  expect(perceive('C[N+](C)(C)C', bare).uncovered).toEqual([]);
});

test.each([
  ['C1CC', 'unreadable-structure'],
  ['', 'unreadable-structure'],
  ['*CO', 'unreadable-structure'],
  ['C\0C', 'unreadable-structure'],
  ['c1cccc1', 'unreadable-structure'],
  ['C(C)(C)(C)(C)C', 'impossible-valence'],
  ['C'.repeat(2000), 'budget-reached'],
])('%j gives one problem in place of couples', (smiles, check) => {
  const { problem, couples, components, key } = see(smiles);
  expect(problem?.check).toBe(check);
  expect(problem!.message.length).toBeGreaterThan(10);
  expect(problem!.span.end).toBeLessThanOrEqual(Math.max(1, smiles.length));
  expect([couples, components, key]).toEqual([[], [], null]);
});

test.each([
  ['a radical', '[O]N1C(C)(C)CCCC1(C)C'],
  ['a bare proton', '[H+]'],
  ['a metal complex', 'CC(=O)O[Pd]OC(C)=O'],
  ['a carbene', 'CN1C=CN(C)[C]1'],
  ['a cluster of metals', '[Fe+3].[Fe-4](C#N)(C#N)(C#N)(C#N)(C#N)C#N'],
  ['a long peptide', `${'NCC(=O)'.repeat(150)}O`],
  ['a dendrimer of amines', 'N(CCN(CCN)CCN)(CCN(CCN)CCN)CCN(CCN)CCN'],
  ['a hundred salts', Array(100).fill('[Na+].[O-]C').join('.')],
])('%s is read in bounded time', (_, smiles) => {
  const start = performance.now();
  const { problem, molarMass } = see(smiles);
  expect(problem).toBeNull();
  expect(molarMass).toBeGreaterThan(1);
  expect(performance.now() - start).toBeLessThan(5000);
});

test('the same tables give the same object back, other tables are asked anew', () => {
  expect(see('CCO')).toBe(see('CCO'));
  const acids = { version: 'acids', groups: tables.groups.filter(({ kind }) => kind === 'acid') };
  expect(perceive('CCN', acids).couples.every(({ kind }) => kind === 'acid')).toBe(true);
  expect(see('CCN').couples.some(({ kind }) => kind === 'base')).toBe(true);
});
