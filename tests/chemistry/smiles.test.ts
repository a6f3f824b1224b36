import initRDKit from '@rdkit/rdkit';
import fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';

/** Sound structures that the trade writes; the stems of the mutations below. */
const SOUND = [
  'CCO',
  'CC(=O)O',
  'c1ccccc1O',
  'C#Cc1ccccc1',
  'CC(C)[N-]C(C)C.[Li+]',
  '[Li]CCCC',
  'C[Mg]Br',
  '[H-].[Na+]',
  '[BH4-].[Na+]',
  'CC[O-].[Na+]',
  'O=C([O-])[O-].[K+].[K+]',
  'CCOC(=O)[CH2:1]C(=O)OCC',
  'N[C@@H](Cc1ccccc1)C(=O)O',
  'C/C=C/C(=O)OC',
  'F/C=C\\F',
  'c1ccc2[nH]ccc2c1',
  'C%12CCCCC%12',
  'CS(=O)(=O)Cl',
  'CN(C)C=O',
  'C[N+](=O)[O-]',
  '[13CH3]C#N',
  'O=S(=O)(c1ccccc1)Nc1nccs1',
  'C1CC2CCC1CC2',
  'CC(C)(C)OC(=O)N1CCC(O)CC1',
  'CCP(=O)(OCC)OCC',
  'c1c[nH]cn1',
  'BrCCCc1ccccc1',
];
const ALPHABET = 'CNOSPFBcnosp[]()=#:/\\123%+-@HClBr.? µ0';

/** A small seeded generator, so that a failing mutation can be met again. */
function randomFrom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

function mutate(text: string, random: () => number): string {
  const at = Math.floor(random() * (text.length + 1));
  const character = ALPHABET[Math.floor(random() * ALPHABET.length)]!;
  const kind = random();
  if (kind < 0.4) return text.slice(0, at) + text.slice(at + 1);
  if (kind < 0.7) return text.slice(0, at) + character + text.slice(at);
  return text.slice(0, at) + character + text.slice(at + 1);
}

let rdkit: Awaited<ReturnType<typeof initRDKit>>;
beforeAll(async () => {
  rdkit = await initRDKit({ logLevel: 'critical' } as never);
});

/** Number of atoms that RDKit reads, without its judgement of valence; undefined where it refuses. */
function atomsInRDKit(smiles: string): number | undefined {
  const molecule = rdkit.get_mol(smiles, JSON.stringify({ sanitize: false, removeHs: false }));
  if (!molecule) return undefined;
  const atoms = JSON.parse(molecule.get_json()).molecules[0].atoms.length;
  molecule.delete();
  return atoms;
}

test.each(SOUND)('reads %s with as many atoms as RDKit', (smiles) => {
  const { structure } = readSmiles(smiles);
  expect(structure?.atoms.length).toBe(atomsInRDKit(smiles));
});

test('accepts nothing that RDKit rejects, over 3,000 mutations', () => {
  const random = randomFrom(20261201);
  const disagreements: string[] = [];
  let accepted = 0;
  for (let run = 0; run < 3000; run++) {
    let smiles = SOUND[run % SOUND.length]!;
    for (let change = 0; change <= run % 3; change++) smiles = mutate(smiles, random);
    const { structure } = readSmiles(smiles);
    if (!structure) continue;
    accepted++;
    if (atomsInRDKit(smiles) !== structure.atoms.length) disagreements.push(smiles);
  }
  expect(disagreements).toEqual([]);
  expect(accepted).toBeGreaterThan(300);
});

test('any string gives a structure or one problem inside the text', () => {
  fc.assert(
    fc.property(fc.oneof(fc.string(), fc.string({ unit: 'binary' })), (text) => {
      const { structure, problem } = readSmiles(text);
      expect(structure === undefined).not.toBe(problem === undefined);
      const spans = problem ? [problem.span] : structure!.atoms.map((atom) => atom.span);
      for (const { start, end } of spans) {
        expect(start).toBeGreaterThanOrEqual(0);
        expect(end).toBeLessThanOrEqual(text.length);
        expect(start).toBeLessThanOrEqual(end);
      }
    }),
  );
});

test.each([
  ['C1CC', 1, 2, 'ring is not closed'],
  ['CC(C', 2, 3, 'branch is not closed'],
  ['C()C', 1, 3, 'branch is empty'],
  ['C==C', 1, 3, 'Two bonds'],
  ['CC=', 2, 3, 'leads nowhere'],
  ['C..C', 2, 3, 'dot needs'],
  ['C1C1', 3, 4, 'already joined'],
  ['[NA]', 0, 4, 'does not describe an atom'],
  ['[Xy]', 0, 4, 'no element'],
  ['C(.C)C', 2, 3, 'dot needs'],
  ['C(1)CC1', 2, 3, 'begins with an atom'],
  ['C[CH3', 1, 2, 'bracket is not closed'],
  ['CCµC', 2, 3, 'no meaning'],
  ['CC😀C', 2, 4, 'no meaning'],
])('underlines the fault in %s', (smiles, start, end, message) => {
  const { problem } = readSmiles(smiles);
  expect(problem?.span).toEqual({ start, end });
  expect(problem?.message).toContain(message);
});

test('keeps charge, hydrogens, isotope and map number', () => {
  expect(readSmiles('[13CH2-:7]').structure?.atoms[0]).toMatchObject({
    element: 'C',
    isotope: 13,
    charge: -1,
    writtenHydrogens: 2,
    mapNumber: 7,
  });
});

test('every bond has its place: a symbol where written, else the seam before the atom, a ring digit where it closes', () => {
  const { structure } = readSmiles('C1=CC1');
  expect(
    structure?.bonds.map(({ from, to, symbol, span }) => [from, to, symbol, span.start, span.end]),
  ).toEqual([
    [0, 1, '=', 2, 3],
    [1, 2, undefined, 4, 4],
    [0, 2, undefined, 5, 6],
  ]);
});

test('rejects nothing that both OpenSMILES and RDKit accept, over 3,000 mutations', () => {
  const random = randomFrom(7);
  const tooStrict: string[] = [];
  for (let run = 0; run < 3000; run++) {
    const smiles = mutate(SOUND[run % SOUND.length]!, random);
    // RDKit goes beyond OpenSMILES here: text after a blank, wildcards, stray µ, two-digit hydrogen counts.
    if (/[\s*?µ]|->|H\d\d/.test(smiles)) continue;
    if (!readSmiles(smiles).structure && atomsInRDKit(smiles) !== undefined) tooStrict.push(smiles);
  }
  expect(tooStrict).toEqual([]);
});

test('tells the number of a long chirality mark from the hydrogens behind it', () => {
  expect(readSmiles('[C@TH1H](F)(Cl)Br').structure?.atoms[0]?.writtenHydrogens).toBe(1);
  expect(readSmiles('[C@TH1](F)(Cl)(Br)I').structure?.atoms[0]?.writtenHydrogens).toBe(0);
  // RDKit lets the number be left out; OpenSMILES does not.
  expect(readSmiles('[C@THH](F)(Cl)Br').problem?.span).toEqual({ start: 0, end: 7 });
});
