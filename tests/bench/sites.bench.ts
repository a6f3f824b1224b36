/**
 * What finding and estimating every site of a molecule costs, beside the matching of the same rules alone, ours and RDKit's.
 *
 * Run: `npx vitest bench --run --config tests/vitest.config.ts tests/bench/sites.bench.ts`. All three read each molecule anew from its text.
 */
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { bench, describe } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import { constantsIn } from '../../server/src/chemistry/constants.ts';
import { matchSites } from '../../server/src/chemistry/match.ts';
import { neutralForm } from '../../server/src/chemistry/neutral.ts';
import { perceive } from '../../server/src/chemistry/perceive.ts';
import type { Pattern } from '../../server/src/chemistry/smarts.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { loadRDKit } from '../chemistry/rdkit.ts';
import { tables } from '../support/tables.ts';

/** Drugs and their like from the project's own tables, of 14 to 40 atoms. */
const molecules = [...new Set(tables.measured.map(({ smiles }) => smiles.replaceAll(':1]', ']')))]
  .filter((smiles) => {
    const atoms = perceive(smiles, tables).graph?.atoms.length ?? 0;
    return 14 <= atoms && atoms <= 40;
  })
  .slice(0, 300);
const rules = parse(readFileSync('data/groups.csv', 'utf8'), { columns: true }) as { smarts: string }[];
const rdkit = await loadRDKit();
const patterns = rules.map(({ smarts }) => rdkit.get_qmol(smarts)!);
const versions = { ...tables };
let round = 0;

describe(`${molecules.length} molecules, ${rules.length} rules`, () => {
  bench('perceive and estimate every site', () => {
    // A new version of the tables empties the memory of molecules, not that of rules and terms.
    versions.version = `round ${++round}`;
    for (const smiles of molecules) {
      const molecule = perceive(smiles, versions);
      constantsIn(molecule, 'water', versions, { estimateOnly: true });
    }
  });
  bench('read and match the rules', () => {
    for (const smiles of molecules) {
      const { graph } = neutralForm(buildGraph(readSmiles(smiles).structure!).graph!);
      for (const { pattern } of tables.groups) matchSites(graph, pattern as Pattern);
    }
  });
  bench('read and match the rules, RDKit', () => {
    for (const smiles of molecules) {
      const molecule = rdkit.get_mol(smiles)!;
      for (const pattern of patterns) molecule.get_substruct_matches(pattern);
      molecule.delete();
    }
  });
});
