/**
 * Balances an intended conversion: which atoms of the product have a source, and what leaves.
 *
 * Knows: graphs of neutral forms, what is in the flask.  Must not know: plans' text, mechanisms.
 * Invariants: a product made of its reactants' atoms misses nothing; by-products add up to what is left over or are not named.
 *   (tests/flask/convert.test.ts)
 * Absent on purpose: hydrogen is never missing, since every flask and work-up has protons; metals and counter-ions are not
 * followed.
 */
import type { Perceived } from '../chemistry/couple.ts';
import type { Graph } from '../chemistry/graph.ts';
import { neutralForm } from '../chemistry/neutral.ts';
import type { ReagentRole } from '../tables/rows.ts';
import { unmatchedAtoms } from './atom-sources.ts';
import { LEAVING, type Leaving } from './leaving.ts';
import type { Ingredient } from './state.ts';

export interface Counted {
  readonly molecule: Perceived;
  readonly count: number;
}

/** Atoms of one product that nothing in the flask can have brought. */
export interface MissingAtoms {
  /** Index among the products. */
  readonly product: number;
  readonly element: string;
  /** How many of that element have no source. */
  readonly count: number;
  /** Atoms of the product, in the order of its SMILES, that no reactant explains. */
  readonly atoms: readonly number[];
}

export interface ByProduct extends Leaving {
  /** mol for each mol of the conversion. */
  readonly count: number;
}

export interface Conversion {
  readonly missing: readonly MissingAtoms[];
  readonly byProducts: readonly ByProduct[];
  /** Elements that left in a way that no common by-product explains, without hydrogen. */
  readonly unexplained: ReadonlyMap<string, number>;
  /** Ingredients besides the reactants that must have brought atoms. */
  readonly donors: readonly number[];
  /** mol of strong acid that the conversion sets free, for each mol of it. */
  readonly acidReleased: number;
}

/** Elements of counter-ions and reagents that a product formula need not account for. */
const SPECTATORS = new Set([
  'Li',
  'Na',
  'K',
  'Rb',
  'Cs',
  'Mg',
  'Ca',
  'Ba',
  'Zn',
  'Al',
  'Cu',
  'Ag',
  'Pd',
  'Ti',
  'Sn',
  'Mn',
  'Cr',
  'Fe',
]);
/** Reagents that never leave carbon in a product: bases, hydrides, catalysts, things to dry with. */
const NO_CARBON: ReadonlySet<ReagentRole> = new Set([
  'amine-base',
  'metal-amide',
  'hydroxide',
  'mineral-acid',
  'catalyst',
  'ligand',
  'salt',
  'drying-agent',
  'metal-hydride',
  'borohydride',
  'aluminium-hydride',
  'solid-base',
  'quench',
  'fluoride',
]);
/** Solvents whose carbon nobody counts on. */
const INERT_SOLVENTS = new Set([
  'ether',
  'alkane',
  'halogenated',
  'aromatic',
  'sulfoxide',
  'phosphoramide',
  'urea',
]);

/**
 * Balances reactants against products; `around` is all else in the flask and what a later quench brings.
 */
export function balanceConversion(
  from: readonly Counted[],
  to: readonly Counted[],
  around: readonly Ingredient[],
): Conversion {
  const reactants = total(from);
  const products = total(to);
  const missing: MissingAtoms[] = [];
  const donors = new Set<number>();
  const surplus = new Map<string, number>();
  for (const element of new Set([...reactants.keys(), ...products.keys()])) {
    const left = (reactants.get(element) ?? 0) - (products.get(element) ?? 0);
    if (0 < left) surplus.set(element, left);
    if (0 <= left || element === 'H') continue;
    const sources = around.filter((one) => brings(one, element));
    for (const { id } of sources) donors.add(id);
    if (sources.length === 0) missing.push(...locate(element, -left, from, to));
  }
  const net = (reactants.get('H') ?? 0) - (products.get('H') ?? 0);
  const { byProducts, rest } = donors.size === 0 ? explain(surplus, net) : explainLoosely(surplus);
  return {
    missing,
    byProducts,
    unexplained: rest,
    donors: [...donors],
    acidReleased: byProducts.reduce((sum, { count, isStrongAcid }) => sum + (isStrongAcid ? count : 0), 0),
  };
}

/** Counts of all elements of the neutral forms, spectators left out. */
function total(list: readonly Counted[]): Map<string, number> {
  const sum = new Map<string, number>();
  for (const { molecule, count } of list) {
    for (const [element, number] of counts(molecule))
      sum.set(element, (sum.get(element) ?? 0) + count * number);
  }
  return sum;
}

function counts({ graph }: Perceived): Map<string, number> {
  const found = new Map<string, number>();
  if (graph === null) return found;
  const neutral = neutralForm(graph);
  const add = (element: string, number: number) => {
    if (number !== 0 && !SPECTATORS.has(element)) found.set(element, (found.get(element) ?? 0) + number);
  };
  for (const { index, element, hydrogens } of neutral.graph.atoms) {
    if (neutral.absorbed.has(index)) continue;
    add(element, 1);
    add('H', hydrogens);
  }
  return found;
}

function brings({ molecule, reagent, solvent, role }: Ingredient, element: string): boolean {
  // Without a structure nothing can be said against it.
  if (molecule?.graph == null) return role !== 'solvent' && role !== 'inert';
  if (!molecule.graph.atoms.some((atom) => atom.element === element)) return false;
  if (element !== 'C') return true;
  if (role === 'solvent' && solvent !== null) return !INERT_SOLVENTS.has(solvent.kind);
  if (reagent === null) return true;
  return reagent.roles.some((what) => !NO_CARBON.has(what));
}

/** The atoms of the products that no reactant explains, at least as many as are missing where they can be told apart. */
function locate(
  element: string,
  count: number,
  from: readonly Counted[],
  to: readonly Counted[],
): MissingAtoms[] {
  const graphs = from.map(({ molecule, count: times }) => ({ graph: molecule.graph, count: times }));
  const open = to.flatMap(({ molecule }, product) => {
    if (molecule.graph === null) return [];
    const atoms = unmatchedAtoms(molecule.graph, graphs, element);
    return atoms.length === 0 ? [] : [{ product, element, count: Math.min(count, atoms.length), atoms }];
  });
  if (open.length !== 0) return open;
  const holder = to.findIndex(({ molecule }) => hasElement(molecule.graph, element));
  return [{ product: Math.max(holder, 0), element, count, atoms: [] }];
}

function hasElement(graph: Graph | null, element: string): boolean {
  return graph?.atoms.some((atom) => atom.element === element) ?? false;
}

/** How many by-products at most are put together. */
const MOST_PARTS = 4;

/** The fewest common by-products whose atoms add up exactly to what is left over. */
function explain(
  surplus: ReadonlyMap<string, number>,
  hydrogens: number,
): { byProducts: ByProduct[]; rest: Map<string, number> } {
  const want = new Map(surplus);
  want.delete('H');
  if (want.size === 0 && hydrogens === 0) return { byProducts: [], rest: new Map() };
  const fitting = LEAVING.filter(({ atoms }) =>
    [...atoms].every(([element, count]) => count <= (element === 'H' ? hydrogens : (want.get(element) ?? 0))),
  );
  for (let parts = 1; parts <= MOST_PARTS; parts++) {
    const found = combine(want, hydrogens, parts, fitting);
    if (found !== null) return { byProducts: gather(found), rest: new Map() };
  }
  return explainLoosely(surplus);
}

/** Halides are told apart even where oxidants, reductants or coupling agents took part and hydrogen does not add up. */
function explainLoosely(surplus: ReadonlyMap<string, number>): {
  byProducts: ByProduct[];
  rest: Map<string, number>;
} {
  const rest = new Map(surplus);
  rest.delete('H');
  const byProducts: ByProduct[] = [];
  for (const leaving of LEAVING) {
    const only = [...leaving.atoms.keys()].filter((element) => element !== 'H');
    if (!leaving.isStrongAcid || only.length !== 1 || leaving.atoms.get(only[0]!) !== 1) continue;
    const count = rest.get(only[0]!) ?? 0;
    if (count === 0) continue;
    byProducts.push({ ...leaving, count });
    rest.delete(only[0]!);
  }
  return { byProducts, rest };
}

function combine(
  want: ReadonlyMap<string, number>,
  hydrogens: number,
  parts: number,
  fitting: readonly Leaving[],
): Leaving[] | null {
  const isDone = hydrogens === 0 && [...want.values()].every((count) => count === 0);
  if (isDone) return [];
  if (parts === 0) return null;
  for (const [place, leaving] of fitting.entries()) {
    const next = new Map(want);
    let fits = true;
    for (const [element, count] of leaving.atoms) {
      if (element === 'H') continue;
      const left = (next.get(element) ?? 0) - count;
      if (left < 0) fits = false;
      next.set(element, left);
    }
    const left = hydrogens - (leaving.atoms.get('H') ?? 0);
    if (!fits || left < 0) continue;
    const others = combine(next, left, parts - 1, fitting.slice(place));
    if (others !== null) return [leaving, ...others];
  }
  return null;
}

function gather(list: readonly Leaving[]): ByProduct[] {
  const byName = new Map<string, ByProduct>();
  for (const leaving of list) {
    byName.set(leaving.name, { ...leaving, count: (byName.get(leaving.name)?.count ?? 0) + 1 });
  }
  return [...byName.values()];
}

/**
 * Protons that a salt of an anion wants, for each mol of it: 1 for sodium azide, 0 for benzylamine hydrochloride.
 *
 * A salt that is used up hands its counterion to what leaves, so an acid set free beside it leaves as its salt.
 */
export function protonsWanted({ couples }: Perceived): number {
  const wanted = couples.reduce((sum, { kind, holdsProton }) => {
    if (kind === 'acid') return sum + (holdsProton ? 0 : 1);
    return sum - (holdsProton ? 1 : 0);
  }, 0);
  return Math.max(0, wanted);
}
