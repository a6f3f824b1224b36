/**
 * The charge-blind reference form of a molecule: every charge that a proton can take away is taken away.
 *
 * Rules are written for this form, so that an acid, its salt and its organometallic are one molecule with one couple.
 * Knows: graphs.  Must not know: rules, acidity.
 * Invariants:
 *  1. Atoms keep their indices; explicit hydrogens become counts and stay behind as lone atoms.   (tests/chemistry/neutral.test.ts)
 *  2. `added` is the number of protons that the reference form has more than the drawing, atom by atom.
 *  3. Bonds to the metals of groups 1 and 2, to zinc, and of carbon to aluminium are split; charges that no proton can
 *     mend stay.
 *  4. An enolate is the anion of its carbonyl compound, on whichever atom the charge is drawn.
 */
import { buildGraph } from './build-graph.ts';
import type { Graph } from './graph.ts';
import type { Atom, Bond, BondSymbol } from './molecule.ts';
import { type Draft, neighboursOf, redraw } from './redraw.ts';

export interface NeutralForm {
  readonly graph: Graph;
  /** Protons added (+) or taken away (−) at each atom. */
  readonly added: readonly number[];
  /** Explicit hydrogens that became counts of their neighbours. */
  readonly absorbed: ReadonlySet<number>;
}

const SPLIT = new Set(['Li', 'Na', 'K', 'Rb', 'Cs', 'Be', 'Mg', 'Ca', 'Sr', 'Ba', 'Zn']);
/** Elements whose negative charge a proton takes away. */
const PROTONATED = new Set(['C', 'N', 'O', 'S', 'Se', 'Te', 'P', 'As', 'F', 'Cl', 'Br', 'I', 'H', 'Si']);
const HALOGENS = new Set(['F', 'Cl', 'Br', 'I']);
const HYPERVALENT = new Set(['P', 'As', 'Si']);
/** Elements whose positive charge leaves with a proton. */
const ONIUM = new Set(['N', 'O', 'S', 'P', 'Se']);
const SYMBOLS: readonly BondSymbol[] = ['-', '-', '=', '#', '$'];

/** Reference forms already built, which die with their graphs. */
const known = new WeakMap<Graph, NeutralForm>();

/** The reference form of a graph; the graph itself where no other form can be built. */
export function neutralForm(source: Graph): NeutralForm {
  let form = known.get(source);
  if (form === undefined) {
    form = makeForm(source);
    known.set(source, form);
  }
  return form;
}

function makeForm(source: Graph): NeutralForm {
  const draft: Draft = {
    source,
    charges: source.atoms.map(({ charge }) => charge),
    hydrogens: source.atoms.map(({ hydrogens }) => hydrogens),
    orders: source.bonds.map(({ order }) => order),
    added: source.atoms.map(() => 0),
    absorbed: new Set(),
    replace: false,
  };
  absorbHydrogens(draft);
  splitMetals(draft);
  redraw(draft);
  protonateAnions(draft, pairedAnions(draft));
  spreadCarbocations(draft);
  deprotonateCations(draft);
  shiftCations(draft);
  deprotonateOxides(draft);
  giveFreeProtons(draft);
  const graph = isUnchanged(draft) ? source : rebuild(draft);
  return graph === null
    ? { graph: source, added: source.atoms.map(() => 0), absorbed: new Set() }
    : { graph, added: draft.added, absorbed: draft.absorbed };
}

function absorbHydrogens(draft: Draft): void {
  for (const { index, number, charge, neighbours, bonds } of draft.source.atoms) {
    if (number !== 1 || charge !== 0 || neighbours.length !== 1) continue;
    const heavy = draft.source.atoms[neighbours[0]!]!;
    if (heavy.number === 1 && (draft.absorbed.has(heavy.index) || heavy.neighbours.length !== 1)) continue;
    if (SPLIT.has(heavy.element)) continue;
    draft.orders[bonds[0]!] = 0;
    draft.hydrogens[heavy.index]! += 1;
    draft.absorbed.add(index);
  }
}

function splitMetals(draft: Draft): void {
  draft.source.bonds.forEach(({ from, to }, bond) => {
    const [a, b] = [draft.source.atoms[from]!.element, draft.source.atoms[to]!.element];
    const first = SPLIT.has(a) || (a === 'Al' && b === 'C');
    const second = SPLIT.has(b) || (b === 'Al' && a === 'C');
    if (draft.orders[bond] === 0 || first === second) return;
    const [metal, partner] = first ? [from, to] : [to, from];
    const order = draft.orders[bond]!;
    draft.charges[metal]! += order;
    draft.charges[partner]! -= order;
    draft.orders[bond] = 0;
  });
}

/** Anions that belong to a neighbouring cation in the usual way of drawing: nitro, N-oxide, azide, diazo, isocyanide. */
function pairedAnions(draft: Draft): Set<number> {
  const paired = new Set<number>();
  for (const { index, element } of draft.source.atoms) {
    if (draft.charges[index] !== 1 || (element !== 'N' && element !== 'O') || draft.hydrogens[index] !== 0)
      continue;
    const around = neighboursOf(draft, index);
    const unsaturated = around.some(({ bond }) => draft.orders[bond]! > 1);
    const rank = (atom: number) => 'ONC'.indexOf(draft.source.atoms[atom]!.element);
    const anions = around
      .map(({ other }) => other)
      .filter((other) => draft.charges[other] === -1 && !paired.has(other) && rank(other) !== -1)
      .filter((other) => draft.source.atoms[other]!.element !== 'C' || isMultiple(other))
      .sort((a, b) => rank(a) - rank(b) || a - b);
    const anion = anions[0];
    if (anion !== undefined && (unsaturated || draft.source.atoms[anion]!.element === 'O')) paired.add(anion);
  }
  return paired;

  /** A carbanion counts as paired in C−≡N+ and C−–N+≡N, not beside a quaternary nitrogen. */
  function isMultiple(atom: number): boolean {
    return neighboursOf(draft, atom).some(
      ({ other, bond }) => draft.charges[other] === 1 && (draft.orders[bond] === 3 || hasTriple(other)),
    );
  }

  function hasTriple(atom: number): boolean {
    return neighboursOf(draft, atom).some(({ bond }) => draft.orders[bond] === 3);
  }
}

function protonateAnions(draft: Draft, paired: ReadonlySet<number>): void {
  for (const { index, element } of draft.source.atoms) {
    const charge = draft.charges[index]!;
    if (0 <= charge || paired.has(index) || !PROTONATED.has(element)) continue;
    const degree = neighboursOf(draft, index).length;
    const hypervalent = (HALOGENS.has(element) && 0 < degree) || (HYPERVALENT.has(element) && 4 < degree);
    if (hypervalent) continue;
    draft.hydrogens[index]! -= charge;
    draft.added[index]! -= charge;
    draft.charges[index] = 0;
  }
}

/** A carbocation beside an amine is an iminium ion. */
function spreadCarbocations(draft: Draft): void {
  for (const { index, element } of draft.source.atoms) {
    if (element !== 'C' || draft.charges[index] !== 1) continue;
    const amine = neighboursOf(draft, index)
      .filter(
        ({ other, bond }) =>
          draft.source.atoms[other]!.element === 'N' &&
          draft.charges[other] === 0 &&
          draft.orders[bond] === 1,
      )
      .sort((a, b) => draft.hydrogens[b.other]! - draft.hydrogens[a.other]!)[0];
    if (amine === undefined) continue;
    draft.orders[amine.bond] = 2;
    draft.charges[index] = 0;
    draft.charges[amine.other] = 1;
  }
}

function deprotonateCations(draft: Draft): void {
  for (const { index, element } of draft.source.atoms) {
    while (0 < draft.charges[index]! && 0 < draft.hydrogens[index]! && ONIUM.has(element)) {
      draft.hydrogens[index]! -= 1;
      draft.charges[index]! -= 1;
      draft.added[index]! -= 1;
    }
  }
}

/** R2N+=C–NH and its aromatic like: the charge sits on one nitrogen, the proton that can leave on another. */
function shiftCations(draft: Draft): void {
  for (const { index, element, aromatic } of draft.source.atoms) {
    if (element !== 'N' || draft.charges[index] !== 1 || draft.hydrogens[index] !== 0) continue;
    if (aromatic) shiftInRing(draft, index);
    else shiftAcrossCarbon(draft, index);
  }
}

function shiftAcrossCarbon(draft: Draft, cation: number): void {
  const double = neighboursOf(draft, cation).find(
    ({ other, bond }) => draft.orders[bond] === 2 && draft.source.atoms[other]!.element === 'C',
  );
  if (double === undefined) return;
  const amine = neighboursOf(draft, double.other).find(
    ({ other, bond }) =>
      other !== cation &&
      draft.source.atoms[other]!.element === 'N' &&
      draft.orders[bond] === 1 &&
      draft.charges[other] === 0 &&
      0 < draft.hydrogens[other]!,
  );
  if (amine === undefined) return;
  draft.orders[double.bond] = 1;
  draft.orders[amine.bond] = 2;
  draft.charges[cation] = 0;
  draft.hydrogens[amine.other]! -= 1;
  draft.added[amine.other]! -= 1;
}

function shiftInRing(draft: Draft, cation: number): void {
  const ring = draft.source.rings.find(
    (atoms) =>
      atoms.includes(cation) && atoms.length === 5 && atoms.some((atom) => isPyrroleLike(draft, atom)),
  );
  const donor = ring?.find((atom) => isPyrroleLike(draft, atom));
  if (donor === undefined) return;
  draft.charges[cation] = 0;
  draft.hydrogens[donor]! -= 1;
  draft.added[donor]! -= 1;
  draft.replace = true;
}

function isPyrroleLike(draft: Draft, atom: number): boolean {
  const { element, aromatic } = draft.source.atoms[atom]!;
  return element === 'N' && aromatic && draft.charges[atom] === 0 && draft.hydrogens[atom] === 1;
}

/** The hydroxyl group on a quaternary nitrogen is the protonated form of an N-oxide or nitrone. */
function deprotonateOxides(draft: Draft): void {
  for (const { index, element } of draft.source.atoms) {
    if (element !== 'N' || draft.charges[index] !== 1 || draft.hydrogens[index] !== 0) continue;
    const around = neighboursOf(draft, index);
    if (around.some(({ other }) => draft.charges[other]! < 0)) continue;
    const hydroxyl = around.find(
      ({ other }) =>
        draft.source.atoms[other]!.element === 'O' &&
        draft.hydrogens[other] === 1 &&
        draft.charges[other] === 0,
    );
    if (hydroxyl === undefined) continue;
    draft.hydrogens[hydroxyl.other] = 0;
    draft.charges[hydroxyl.other] = -1;
    draft.added[hydroxyl.other]! -= 1;
  }
}

/** [H+].[Cl-] is hydrogen chloride: a bare proton belongs to the first anion beside it. */
function giveFreeProtons(draft: Draft): void {
  for (const { index, number } of draft.source.atoms) {
    if (number !== 1 || draft.charges[index] !== 1) continue;
    const taker = draft.added.findIndex((count) => 0 < count);
    if (taker === -1) continue;
    draft.added[taker]! -= 1;
    draft.charges[index] = 0;
    draft.absorbed.add(index);
  }
}

function isUnchanged({ source, charges, hydrogens, orders, replace }: Draft): boolean {
  return (
    !replace &&
    source.atoms.every(
      ({ index, charge, hydrogens: count }) => charge === charges[index] && count === hydrogens[index],
    ) &&
    source.bonds.every(({ index, order }) => order === orders[index])
  );
}

function rebuild(draft: Draft): Graph | null {
  const { source, charges, hydrogens, orders, replace } = draft;
  const aromatic = (atom: number) => replace && source.atoms[atom]!.aromatic;
  const atoms = source.atoms.map(
    ({ index, element, isotope, mapNumber, span }): Atom => ({
      index,
      element,
      aromatic: aromatic(index),
      isotope,
      charge: charges[index]!,
      writtenHydrogens: hydrogens[index]!,
      mapNumber,
      span,
    }),
  );
  const bonds = source.bonds.flatMap(({ from, to, span, index, aromatic: flat }): Bond[] => {
    const order = orders[index]!;
    if (order === 0) return [];
    const open = replace && flat && aromatic(from) && aromatic(to);
    return [{ from, to, symbol: open ? undefined : SYMBOLS[order], span }];
  });
  return buildGraph({ atoms, bonds }).graph ?? null;
}
