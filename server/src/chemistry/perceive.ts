/**
 * Reads a SMILES into a molecule with its couples: every proton that can come or go, and whether the drawing holds it.
 *
 * Knows: graphs and the rules of `groups`.  Must not know: constants, flasks, plans.
 * Invariants:
 *  1. Couples depend on the molecule, not on how it is written or charged.   (tests/chemistry/perceive.test.ts)
 *  2. A heteroatom with a proton, or with a lone pair that takes one, has a couple or stands in `uncovered`.   (same; tests/chemistry/coverage.test.ts)
 *  3. Work is bounded by the size of the text; larger molecules get a problem instead of couples.   (same)
 */
import { boundedCache } from '../tables/cache.ts';
import type { GroupRow } from '../tables/rows.ts';
import { countedSites } from './boron.ts';
import { buildGraph } from './build-graph.ts';
import type { Component, Couple, Perceived } from './couple.ts';
import type { Graph } from './graph.ts';
import { spellOutHydrides } from './hydrides.ts';
import { matchSites } from './match.ts';
import { type NeutralForm, neutralForm } from './neutral.ts';
import type { Pattern } from './smarts.ts';
import { readSmiles } from './smiles.ts';
import { canonicalKey, molarMass, symmetryClasses } from './toolkit.ts';

export interface PerceptionTables {
  readonly version: string;
  readonly groups: readonly GroupRow[];
}

/** Molecules of more atoms are not looked at for couples. */
const MOST_ATOMS = 1200;
const REMEMBERED = 4000;
const remembered = boundedCache<string, Perceived>(REMEMBERED);

/** The molecule of a SMILES; a text that cannot be read gives a problem and no couples. */
export function perceive(smiles: string, tables: PerceptionTables): Perceived {
  const key = `${tables.version}\0${smiles}`;
  let found = remembered.get(key);
  if (found === undefined) {
    found = perceiveAnew(smiles, tables);
    remembered.set(key, found);
  }
  return found;
}

function perceiveAnew(smiles: string, { groups }: PerceptionTables): Perceived {
  const nothing = {
    smiles,
    key: null,
    graph: null,
    components: [],
    couples: [],
    uncovered: [],
    molarMass: null,
  };
  const { structure, problem } = readSmiles(smiles);
  if (structure === undefined) return { ...nothing, problem: { check: 'unreadable-structure', ...problem } };
  if (MOST_ATOMS < structure.atoms.length) {
    const message = `A molecule of ${structure.atoms.length} atoms is not searched for acidic and basic sites; ${MOST_ATOMS} are the most.`;
    return {
      ...nothing,
      problem: { check: 'budget-reached', message, span: { start: 0, end: smiles.length } },
    };
  }
  const built = buildGraph(spellOutHydrides(structure));
  if (built.graph === undefined) return { ...nothing, problem: built.problem };
  return describe(smiles, built.graph, groups);
}

function describe(smiles: string, graph: Graph, groups: readonly GroupRow[]): Perceived {
  const neutral = neutralForm(graph);
  const fragments = neutral.graph.fragments.filter(
    (atoms) => !atoms.every((atom) => neutral.absorbed.has(atom)),
  );
  const rules = bestRules(neutral.graph, groups);
  const couples: Couple[] = [];
  const components: Component[] = [];
  const keys = fragments.map((atoms) => canonicalKey(neutral.graph, atoms) ?? '?');
  fragments.forEach((atoms, index) => {
    const own = couplesOf(atoms, index, neutral, rules);
    couples.push(...own);
    const charge = atoms.reduce((sum, atom) => sum + graph.atoms[atom]!.charge, 0);
    const held = own.reduce(
      (sum, { holdsProton, equivalents }) => sum + (holdsProton ? equivalents.length : 0),
      0,
    );
    components.push({
      index,
      atoms,
      charge,
      bareCharge: charge - held,
      spectator: own.length === 0,
      key: keys[index]!,
    });
  });
  return {
    smiles,
    key: [...keys].sort().join(' '),
    problem: null,
    graph,
    components,
    couples: couples.sort((a, b) => a.atom - b.atom || (a.kind < b.kind ? -1 : 1)),
    uncovered: uncoveredAtoms(neutral, rules),
    molarMass: molarMass(graph),
  };
}

interface BestRules {
  readonly acid: ReadonlyMap<number, GroupRow>;
  readonly base: ReadonlyMap<number, GroupRow>;
}

/** For each atom the most specific rule of each kind. */
function bestRules(graph: Graph, groups: readonly GroupRow[]): BestRules {
  const best = { acid: new Map<number, GroupRow>(), base: new Map<number, GroupRow>() };
  for (const group of groups) {
    const found = best[group.kind];
    for (const atom of matchSites(graph, group.pattern as Pattern)) {
      const known = found.get(atom);
      if (known === undefined || known.priority < group.priority) found.set(atom, group);
    }
  }
  return best;
}

/** One couple for each class of equivalent atoms that the drawing treats alike. */
function couplesOf(
  atoms: readonly number[],
  component: number,
  neutral: NeutralForm,
  rules: BestRules,
): Couple[] {
  const classes = symmetryClasses(neutral.graph, atoms);
  const grouped = new Map<string, { group: GroupRow; atoms: number[]; holds: boolean }>();
  for (const kind of ['acid', 'base'] as const) {
    const sites = countedSites(
      neutral.graph,
      atoms.filter((atom) => rules[kind].has(atom)),
      (atom) => rules[kind].get(atom)!.family,
      (atom) => 0 < neutral.added[atom]!,
    );
    for (const atom of sites) {
      const group = rules[kind].get(atom)!;
      const added = neutral.added[atom]!;
      const holds = kind === 'acid' ? added <= 0 : added < 0;
      const key = `${kind} ${classes.get(atom)} ${holds}`;
      const known = grouped.get(key);
      if (known === undefined) grouped.set(key, { group, atoms: [atom], holds });
      else known.atoms.push(atom);
    }
  }
  return [...grouped.values()].map(({ group, atoms: equivalents, holds }) => ({
    atom: equivalents[0]!,
    element: neutral.graph.atoms[equivalents[0]!]!.element,
    group: group.id,
    groupName: group.name,
    kind: group.kind,
    family: group.family,
    holdsProton: holds,
    equivalents,
    component,
    symmetry: classes.get(equivalents[0]!) ?? -1,
  }));
}

const PROTIC = new Set(['N', 'O', 'S', 'P', 'Se', 'F', 'Cl', 'Br', 'I']);

function uncoveredAtoms({ graph, absorbed }: NeutralForm, { acid, base }: BestRules): number[] {
  return graph.atoms
    .filter(({ index, element, hydrogens, charge }) => {
      if (absorbed.has(index) || acid.has(index) || base.has(index)) return false;
      if (PROTIC.has(element) && 0 < hydrogens) return true;
      return element === 'N' && charge === 0 && hasFreePair(graph, index);
    })
    .map(({ index }) => index);
}

/** A lone pair that no neighbour draws away: pyridine-like, or an amine on saturated carbon only. */
function hasFreePair({ atoms, bonds }: Graph, atom: number): boolean {
  const { aromatic, neighbours, bonds: around } = atoms[atom]!;
  if (aromatic) return neighbours.length === 2;
  if (around.some((bond) => bonds[bond]!.order !== 1)) return false;
  return neighbours.every(
    (other) =>
      atoms[other]!.element === 'C' &&
      atoms[other]!.bonds.every((bond) => bonds[bond]!.order === 1 && !bonds[bond]!.aromatic),
  );
}
