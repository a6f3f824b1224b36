import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { beforeAll, expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import type { Graph } from '../../server/src/chemistry/graph.ts';
import { matchAll, matchesAt, matchSites } from '../../server/src/chemistry/match.ts';
import { neutralForm } from '../../server/src/chemistry/neutral.ts';
import { parseSmarts } from '../../server/src/chemistry/smarts.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { writeSmiles } from '../../server/src/chemistry/write-smiles.ts';
import { loadRDKit, matcherOf, type RDKit, readByRDKit } from './rdkit.ts';
import { grid, STRUCTURES } from './structures.ts';

/** Patterns of the kinds that rules use, and a few that only the grammar allows. */
const PATTERNS: readonly string[] = `
C c N n O o [#6] [#7] [#8] * A a [*] [A] [a] [!#6] [!#1] [C,N] [c,n] [O,S;H1] [C;!H0] [N&H2] [N;H2,H1;!$(NC=O)] [CX4] [CX4H3] [CX3]=O [CX3H1]=O
[NX3] [NX3;H2] [NX3H2,NX3H1] [nX2] [nX3] [nH] [nH1] [OX1] [OX2H1] [OX2H1]c [OX2H1][CX4] [SX2H1] [#6H] [D1] [D2] [D3] [D4] [X1] [X2] [X3] [X4] [v2] [v3] [v4] [v5] [v6] [vD1]
[R] [!R] [R0] [r] [r3] [r4] [r5] [r6] [r7] [x] [x0] [x2] [x3] [C;R] [C;!R] [c;r5] [C;r6] [N;R0] [CR] [NR0] [+] [-] [+1] [-1] [+0] [N+] [O-] [n+] [C-] [++] [--] [+2] [-2] [!+0] [#7+] [#6-]
C=C C#C C-C C~C C:C c:c c-c c~c c!:c C=O C-O C=N C#N C@C C!@C C=!@C C-,=C C=,#C C-;!@C C~;@C [#6]=,:[#7] C/C=C/C F/C=C\\F
CC(=O)O CC(=O)[OH] C(=O)[O-] [OX2H1]C(=O) [CX3](=O)[OX2H1] [CX3](=O)[OX2][#6] C(=O)N [NX3H1]C(=O) [NX3;H1](C(=O))C(=O) S(=O)(=O)N [NX3;H1,H2]S(=O)(=O) P(=O)O [#15](=O)[OX2H1] c1ccccc1 c1ccncc1 c1cc[nH]c1 [OX2H1]c1ccccc1
[OX2H1]c1[c,n]aaaa1 [nH]1cccc1 [nH]1cncc1 [nH]1nccc1 n1ccccc1 [nX2]1ccccc1 [nX2]1aaaaa1 [nX2]1aa[nH]a1 [NX3;!$(N-C=[O,S,N]);!$(N-S=O);!$(N-a)] [NX3;$(N-a);!$(N-C=O)] [$([NX3H2]),$([NX3H1])] [$(C=O)] [!$(C=O)] [C;!$(C=O)] [C;$(C(=O)O),$(C#N)] [$([CX4]);$(C-C=O)]
[CX4;!H0;$(CC(=O));$(CC(=O)[#6])] [CX4;!H0]([CX3](=O))[CX3](=O) [CX4;!H0]C#N [CX4;!H0][NX3+](=O)[O-] [CX4;!H0][SX4](=O)(=O) [CX4;!H0][#15] [C;H1,H2,H3;$(C-[!#6])] [CX2H1]#C [CX2]#[CX2H1] [cH1]:[nX3] [c;H1]1nccs1 [CX4H2]1SCCCS1 [CX4;!H0]c1ccccc1 [CX4;!H0](c)c
[#6;!H0]~[#7+] [#6]-[Cl,Br,I] [F,Cl,Br,I] [#9,#17] [!#6;!#1;!H0] [O;H1;!$(O-C=O)] [O;X2;H0] [OX2;r3] [OX2]1[CX4][CX4]1 [O;$([OX2]([CX4])[CX4])] [#16X2] [#16;X3](=O) [SX3]=O [S;X4](=O)(=O) [S;D2] [Si] [B] [b] [se] [Se] [#34] [P;X4] [P+] [PX4+] [S+] [SX3+] [N;X4] [NX4+] [n;X3;+]
C.C O.N [Na+] [Na+].[O-] CC.O [C:1]=[O:2] [CH3:1][OH:2] C1CC1 C1CCC1 C1CCCCC1 C1=CC=CC=C1 C%10CC%10 C1CC2CCC1CC2 C12CC1C2 *~*~*~* a:a:a [!C;!N;!O;!#6] [C;D3;H1] [C;D2;H2;R] [C&!R&H2] [C,N&H1] [N,O;!H0;!$(*-C=O)] [#6;$(*~[#8])] [$([#8]=[#6]-[#8;H1])]
[$([NX3;H2]-[CX4;H2]-[CX3]=O)] [N;$(N=C(N)N)] [NX2]=[CX3]([NX3])[NX3] [NX2;$(N=C-N)] [NX2]=C1NCCC1 [N;H1;$(N1C(=O)CCC1=O)] [NX3H1]1C(=O)[#6]~[#6]C1=O [#7;H1]1~[#6](=O)~[#6]~[#6]~[#6]~1 [nH]1c(=O)cccc1 O=c1cc[nH]cc1 [OX1]=c1aaaaa1 [#8]=,-[#6]1~[#7]~*~*~*~*~1 [N-]=[N+]=N N=[N+]=[N-] [N+](=O)[O-] [NX3+](=O)[O-] [n+][O-] [N+]-[O-]
[H] [#1] [2H] [CH4] [CH3-] [CH2]=[CH] [OH2] [NH3] [OH] [O&H0&-] [O;H0;-] [C&$(C-O)&$(C-N)] [C;!$(C~[#7]);!$(C~[#8])] [c;!$(c-O)] [c;$(c1ccccc1)] [c;$(c:n)] [$(c1cc(O)ccc1),$(c1cccc(O)c1)] [$(a1aaaa1)] [a;r5;!$(c)] [n;r6] [n;r5;H1] [#6;a] [#6;A] [#7;a;H0] [C;v4] [N;v5] [S;v4] [S;v6] [P;v5] [#6,#7;!H0] [C]=[!#8] [#6]=[O,S,Se] [C;R]=[C;R] [C;R]=!@[*] [*;!R]@* *!@* *=* *#* *:* [*;+]~[*;-] [*;H1;!#6] [B;X3] [B-] [b-]
`
  .trim()
  .split(/\s+/)
  // Isotopes and R<n> are no part of our rules.
  .filter((smarts) => !['[2H]', '[vD1]'].includes(smarts));

let rdkit: RDKit;
beforeAll(async () => {
  rdkit = await loadRDKit();
});

function graphOf(smiles: string): Graph | null {
  const { structure } = readSmiles(smiles);
  return structure === undefined ? null : (buildGraph(structure).graph ?? null);
}

/** Structures in which RDKit sees the same atoms, bonds and hydrogens; perchlorates and their like it rewrites. */
function shared(): { smiles: string; graph: Graph }[] {
  return STRUCTURES.flatMap((smiles) => {
    const graph = graphOf(smiles);
    const theirs = readByRDKit(rdkit, smiles);
    if (graph === null || theirs === null) return [];
    return graph.atoms.every(({ index, charge }) => charge === theirs.charges[index])
      ? [{ smiles, graph }]
      : [];
  });
}

test('a corpus of patterns finds the atoms that RDKit finds', () => {
  const molecules = shared();
  const byRDKit = matcherOf(rdkit);
  expect(PATTERNS.length).toBeGreaterThan(250);
  expect(molecules.length).toBeGreaterThan(380);
  const wrong: string[] = [];
  let fits = 0;
  for (const smarts of PATTERNS) {
    const pattern = parseSmarts(smarts);
    for (const { smiles, graph } of molecules) {
      const theirs = byRDKit(smarts, smiles);
      const ours = matchAll(graph, pattern, 100_000)
        .map((atoms) => [...atoms].sort((a, b) => a - b).join(' '))
        .sort();
      if (ours.length !== 0) fits += 1;
      if (theirs?.join() !== ours.join()) wrong.push(`${smarts} in ${smiles}: ${ours} / ${theirs}`);
    }
  }
  expect(wrong.slice(0, 40)).toEqual([]);
  expect(fits).toBeGreaterThan(5000);
});

interface Rule {
  readonly id: string;
  readonly smarts: string;
  readonly example: string;
}

const GROUPS = new URL('../../data/groups.csv', import.meta.url);

test('every rule finds the sites that RDKit finds, in all examples of the rules and all structures above', () => {
  const rules = parse(readFileSync(GROUPS, 'utf8'), { columns: true, bom: true }) as Rule[];
  const byRDKit = matcherOf(rdkit);
  const texts = new Set([...rules.map(({ example }) => example), ...STRUCTURES]);
  const molecules = [...texts].flatMap((smiles) => {
    const drawn = graphOf(smiles);
    if (drawn === null) return [];
    // Rules are written for the reference form; RDKit gets it as text and back as the same graph.
    const { text } = writeSmiles(neutralForm(drawn).graph);
    const graph = graphOf(text)!;
    const theirs = readByRDKit(rdkit, text);
    const same = graph.atoms.every(({ index, charge }) => charge === theirs?.charges[index]);
    return same ? [{ text, graph }] : [];
  });
  expect(molecules.length).toBeGreaterThan(700);
  const wrong = rules.flatMap(({ id, smarts }) => {
    const pattern = parseSmarts(smarts);
    return molecules.flatMap(({ text, graph }) => {
      const ours = matchSites(graph, pattern).map(String).sort().join();
      const theirs = byRDKit(`[$(${smarts})]`, text)?.join();
      return ours === theirs ? [] : [`${id} in ${text}: ${ours} / ${theirs}`];
    });
  });
  expect(wrong).toEqual([]);
});

test('answers with the atoms in the order of the pattern, and each set once', () => {
  const graph = graphOf('CC(=O)OC')!;
  expect(matchAll(graph, parseSmarts('O=C-O'))).toEqual([[2, 1, 3]]);
  expect(matchAll(graphOf('c1ccccc1')!, parseSmarts('c1ccccc1'))).toHaveLength(1);
  expect(matchAll(graphOf('CCC')!, parseSmarts('C'), 2)).toHaveLength(2);
});

test('names every site of a symmetric molecule, and tells about a single one', () => {
  const graph = graphOf('OC(=O)CC(=O)O')!;
  const acid = parseSmarts('[OX2H1][CX3]=O');
  expect(matchSites(graph, acid)).toEqual([0, 6]);
  expect(matchesAt(graph, acid, 6)).toBe(true);
  expect(matchesAt(graph, acid, 2)).toBe(false);
});

test('counts explicit hydrogens like implied ones', () => {
  for (const [drawn, bare] of [
    ['[H]OC', 'OC'],
    ['[H]N([H])C', 'NC'],
  ] as const) {
    for (const smarts of ['[OX2H1]', '[NX3H2]', '[!#1;H1]', '[!#1;H2]']) {
      const find = (text: string) =>
        matchSites(graphOf(text)!, parseSmarts(smarts)).map((atom) => graphOf(text)!.atoms[atom]!.element);
      expect(find(drawn)).toEqual(find(bare));
    }
  }
});

test('a search with far too many ways stops after a fixed amount of work', () => {
  const cage = buildGraph(grid(20, 20)).graph!;
  const path = parseSmarts(`${'*~'.repeat(24)}[#92]`);
  const start = performance.now();
  expect(matchSites(cage, path)).toEqual([]);
  expect(matchAll(cage, parseSmarts(`[$(${'*~'.repeat(24)}[#92])]`), 10)).toEqual([]);
  expect(performance.now() - start).toBeLessThan(5000);
});
