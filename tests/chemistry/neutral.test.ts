import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { type NeutralForm, neutralForm } from '../../server/src/chemistry/neutral.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { canonicalKey } from '../../server/src/chemistry/toolkit.ts';
import { changedStructures, STRUCTURES } from './structures.ts';

function graphOf(smiles: string): Graph | null {
  const { structure } = readSmiles(smiles);
  return structure === undefined ? null : (buildGraph(structure).graph ?? null);
}

function formOf(smiles: string): NeutralForm {
  return neutralForm(graphOf(smiles)!);
}

/** Keys of all parts that hold more than an absorbed hydrogen, in order. */
function keyOf(smiles: string): string {
  const { graph, absorbed } = formOf(smiles);
  return graph.fragments
    .filter((atoms) => !atoms.every((atom) => absorbed.has(atom)))
    .map((atoms) => canonicalKey(graph, atoms))
    .sort()
    .join(' ');
}

/** Protons added, as "atom: count". */
function addedOf(smiles: string): Record<number, number> {
  return Object.fromEntries(
    formOf(smiles)
      .added.map((count, atom) => [atom, count] as const)
      .filter(([, count]) => count !== 0),
  );
}

test.each([
  ['CC(=O)[O-]', 'CC(=O)O', { 3: 1 }],
  ['CC(=O)O[Na]', '[Na+].CC(=O)O', { 3: 1 }],
  ['[NH3+]CC(=O)[O-]', 'NCC(=O)O', { 0: -1, 4: 1 }],
  ['[NH4+].[Cl-]', 'N.Cl', { 0: -1, 1: 1 }],
  ['C[NH+](C)C', 'CN(C)C', { 1: -1 }],
  ['[Li]CCCC', '[Li+].CCCC', { 1: 1 }],
  ['C[Mg]Br', 'C.[Mg+2].Br', { 0: 1, 2: 1 }],
  ['C[Zn]C', 'C.[Zn+2].C', { 0: 1, 2: 1 }],
  ['C[Al](C)C', 'C.C.C.[Al+3]', { 0: 1, 2: 1, 3: 1 }],
  ['CC(C)[N-]C(C)C.[Li+]', 'CC(C)NC(C)C.[Li+]', { 3: 1 }],
  ['CC(C)N([Li])C(C)C', 'CC(C)NC(C)C.[Li+]', { 3: 1 }],
  ['[Na]OCC', '[Na+].OCC', { 1: 1 }],
  ['[H-].[Na+]', '[H][H].[Na+]', { 0: 1 }],
  ['[OH-].[K+]', 'O.[K+]', { 0: 1 }],
  ['[OH3+]', 'O', { 0: -1 }],
  ['[NH2-]', 'N', { 0: 1 }],
  ['[F-]', 'F', { 0: 1 }],
  ['[H+].[Cl-]', 'Cl', {}],
  ['[O-2]', 'O', { 0: 2 }],
  ['[C-]#N', 'C#N', { 0: 1 }],
  ['[Na]C#N', '[Na+].C#N', { 1: 1 }],
  ['[C-]#C', 'C#C', { 0: 1 }],
  ['[N-]=[N+]=[N-]', 'N=[N+]=[N-]', { 2: 1 }],
  ['[CH2-]C(C)=O', 'CC(C)=O', { 0: 1 }],
  ['[CH-](C#N)C#N', 'C(C#N)C#N', { 0: 1 }],
  ['[CH2-][N+](=O)[O-]', 'C[N+](=O)[O-]', { 0: 1 }],
  ['C=[N+]([O-])[O-]', 'C[N+](=O)[O-]', { 0: 1 }],
  ['CP(C)(C)=C', 'C[P+](C)(C)C', { 4: 1 }],
  ['C[P+](C)(C)[CH2-]', 'C[P+](C)(C)C', { 4: 1 }],
  ['C[S+](C)(=O)[CH2-]', 'C[S+](C)(=O)C', { 4: 1 }],
  ['[cH-]1cccc1', 'C1C=CC=C1', { 0: 1 }],
  ['[n-]1cccc1', '[nH]1cccc1', { 0: 1 }],
  ['c1nn[n-]n1', 'c1nn[nH]n1', { 3: 1 }],
  ['[nH+]1cc[nH]c1', 'n1cc[nH]c1', { 0: -1 }],
  ['Cn1cc[nH+]c1', 'Cn1ccnc1', { 4: -1 }],
  ['C[n+]1cc[nH]c1', 'Cn1ccnc1', { 4: -1 }],
  ['NC(N)=[NH2+]', 'NC(N)=N', { 3: -1 }],
  ['CN(C)C(=[N+](C)C)N', 'CN(C)C(=N)N(C)C', { 7: -1 }],
  ['CC(C)=[OH+]', 'CC(C)=O', { 3: -1 }],
  ['O[n+]1ccccc1', '[O-][n+]1ccccc1', { 0: -1 }],
  ['C[N+](C)(C)O', 'C[N+](C)(C)[O-]', { 4: -1 }],
  ['O[Cl+3]([O-])([O-])[O-]', 'OCl(=O)(=O)=O', {}],
  ['[O-]P(=O)([O-])[O-]', 'OP(=O)(O)O', { 0: 1, 3: 1, 4: 1 }],
  ['C[Si](C)(C)[N-][Si](C)(C)C', 'C[Si](C)(C)N[Si](C)(C)C', { 4: 1 }],
  ['CC(=O)[CH-]C(C)=O', 'CC(=O)CC(C)=O', { 3: 1 }],
])('%s has the reference form %s', (drawn, reference, added) => {
  expect(keyOf(drawn)).toBe(keyOf(reference));
  expect(addedOf(drawn)).toEqual(added);
  expect(addedOf(reference)).toEqual({});
});

test.each([
  'C[N+](C)(C)C',
  'C[n+]1ccccc1',
  'C[N+](=O)[O-]',
  '[O-][n+]1ccccc1',
  'C[S+](C)C',
  'c1ccccc1[N+]#N',
  'C[N+]#[C-]',
  '[C-]#[O+]',
  'C=[N+]=[N-]',
  'F[P-](F)(F)(F)(F)F',
  'F[B-](F)(F)F',
  '[BH4-].[Na+]',
  '[AlH4-].[Li+]',
  '[NaH]',
  'CCO[Ti](OCC)(OCC)OCC',
  'C[Sn](C)(C)C',
  'CB(O)O',
  'C[SiH](C)C',
  '[Pd](Cl)Cl',
  'Cn1cc[n+](C)c1',
])('%s stays as it is drawn', (drawn) => {
  const graph = graphOf(drawn)!;
  expect(neutralForm(graph)).toMatchObject({ graph, added: graph.atoms.map(() => 0) });
});

test.each([
  ['CC([O-])=CC.[Li+]', 'CC(=O)CC', 3],
  ['[Na+].CCOC([O-])=C', 'CCOC(C)=O', 6],
  ['CC([O-])=CC(C)=O', 'CC(=O)CC(C)=O', 3],
  ['C=C([O-])N(C)C', 'CC(=O)N(C)C', 0],
  ['[Li]OC1=CCCCC1', 'O=C1CCCCC1', 3],
  ['[O-]C1=CC(=O)CC(C)(C)C1', 'O=C1CC(=O)CC(C)(C)C1', 2],
  ['[O-]C=Cc1ccccc1', 'O=CCc1ccccc1', 2],
])('the enolate %s is the anion of %s, its proton missing on carbon', (enolate, acid, carbon) => {
  expect(keyOf(enolate).split(' ')).toContain(keyOf(acid));
  expect(addedOf(enolate)).toEqual({ [carbon]: 1 });
});

test.each([
  ['[O-]C1=C(O)C(=O)OC1CO', 'OC1=C(O)C(=O)OC1CO'],
  ['[O-]C1=CC(=O)OC1', 'OC1=CC(=O)OC1'],
  ['CC1=C([O-])C(=O)CC1', 'CC1=C(O)C(=O)CC1'],
  ['[O-]c1ccccc1', 'Oc1ccccc1'],
  ['CC([O-])=O', 'CC(O)=O'],
])('%s is the anion of the hydroxyl group of %s', (anion, acid) => {
  expect(keyOf(anion)).toBe(keyOf(acid));
});

test('a borate is its boric acid with one proton less, and water', () => {
  expect(keyOf('[Na+].[B-](O)(O)(O)O').split(' ').sort()).toEqual(keyOf('[Na+].OB(O)O.O').split(' ').sort());
  expect(addedOf('[B-](O)(O)(O)c1ccccc1')).toEqual({ 2: 1 });
  expect(addedOf('F[B-](F)(F)c1ccccc1')).toEqual({});
});

test('explicit hydrogens make no difference, and their atoms stay behind', () => {
  for (const [drawn, bare, atoms] of [
    ['[H]O[H]', 'O', [0, 2]],
    ['[H][N+]([H])([H])C', '[NH3+]C', [0, 2, 3]],
    ['[H]OC(C)=O', 'OC(C)=O', [0]],
    ['[2H]C([2H])([2H])O', 'CO', [0, 2, 3]],
  ] as const) {
    expect(keyOf(drawn)).toBe(keyOf(bare));
    expect([...formOf(drawn).absorbed]).toEqual(atoms);
  }
});

const CHARGE = (graph: Graph) => graph.atoms.reduce((sum, { charge }) => sum + charge, 0);

test('charge is kept account of, atoms keep their places, and the reference form is its own', () => {
  const graphs = [...STRUCTURES, ...changedStructures(3000, 3)].flatMap((text) => graphOf(text) ?? []);
  expect(graphs.length).toBeGreaterThan(1500);
  for (const source of graphs) {
    const { graph, added, absorbed } = neutralForm(source);
    expect(graph.atoms.map(({ element }) => element)).toEqual(source.atoms.map(({ element }) => element));
    const protons = added.reduce((sum, count) => sum + count, 0);
    expect(CHARGE(graph) - CHARGE(source)).toBe(protons);
    const again = neutralForm(graph);
    expect(again.added.every((count) => count === 0)).toBe(true);
    expect(again.graph.atoms.map(({ charge, hydrogens }) => [charge, hydrogens])).toEqual(
      graph.atoms.map(({ charge, hydrogens }) => [charge, hydrogens]),
    );
    for (const atom of absorbed) expect(graph.atoms[atom]!.number).toBe(1);
  }
});
