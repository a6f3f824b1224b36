import { join } from 'node:path';
import { expect, test } from 'vitest';
import { buildGraph } from '../../server/src/chemistry/build-graph.ts';
import { readSmiles } from '../../server/src/chemistry/smiles.ts';
import { readSubstituents } from '../../server/src/chemistry/substituents.ts';
import { readSubstituentRows } from '../../server/tools/rule-sites.ts';

const rows = readSubstituentRows(join(import.meta.dirname, '../../data/substituents.csv'));
const { sigmaOf } = readSubstituents(rows);

/** Constants of the branch on the marked atom. */
function at(smiles: string) {
  const graph = buildGraph(readSmiles(smiles).structure!).graph!;
  const from = graph.atoms.findIndex(({ mapNumber }) => mapNumber === 1);
  return sigmaOf(graph, graph.atoms[from]!.neighbours[0]!, from);
}

test('a published substituent has its published constants, whatever it hangs on', () => {
  for (const row of rows) {
    const sigma = at(row.smiles);
    // Rings of five and six members look alike from their first three atoms.
    expect.soft(Math.abs(sigma.m - row.sigmaM), row.name).toBeLessThan(0.006);
    expect.soft(Math.abs(sigma.p - row.sigmaP), row.name).toBeLessThan(0.006);
  }
  expect(at('[cH:1]1ccccc1').name).toBeNull();
  expect(at('O=[N+]([O-])[c:1]1ccccc1')).toBeDefined();
});

test('a guess never goes beyond the range of the published values', () => {
  const highest = Math.max(...rows.map(({ sigmaP }) => sigmaP));
  const lowest = Math.min(...rows.map(({ sigmaP }) => sigmaP));
  for (const smiles of [
    '[CH3:1]C(F)(Cl)C#N',
    '[CH3:1]SC(=O)c1ccccc1',
    '[CH3:1]C(C#N)(C#N)C#N',
    '[CH3:1]OS(=O)(=O)C',
    '[CH3:1][Ge](C)(C)C',
  ]) {
    const { p } = at(smiles);
    expect(p).toBeLessThanOrEqual(highest);
    expect(p).toBeGreaterThanOrEqual(lowest);
  }
});

test('a longer chain weakens a substituent', () => {
  expect(at('[CH3:1]CCC#N').p).toBeLessThan(at('[CH3:1]CC#N').p);
});
