/**
 * Redraws anions that have more than one usual drawing, so that each has one: ylides, oxides, nitronates, enolates, borates.
 *
 * Knows: graphs in the making.  Must not know: rules, acidity.
 * Invariants: atoms keep their indices; hydrogens and charges are kept account of.   (tests/chemistry/neutral.test.ts)
 */
import type { Graph } from './graph.ts';

/** A graph whose charges, hydrogens and bond orders are being changed. */
export interface Draft {
  readonly source: Graph;
  readonly charges: number[];
  readonly hydrogens: number[];
  readonly orders: number[];
  readonly added: number[];
  readonly absorbed: Set<number>;
  /** Rings whose double bonds have to be placed anew. */
  replace: boolean;
}

export function redraw(draft: Draft): void {
  writeYlides(draft);
  writeOxides(draft);
  writeNitronates(draft);
  writeEnolates(draft);
  writeBorates(draft);
}

/** Neighbours by the bonds that are left. */
export function neighboursOf({ source, orders }: Draft, atom: number): { other: number; bond: number }[] {
  const { neighbours, bonds } = source.atoms[atom]!;
  return neighbours
    .map((other, place) => ({ other, bond: bonds[place]! }))
    .filter(({ bond }) => orders[bond]! > 0);
}

/** C=P and C=S of ylides become the carbanion beside an onium centre. */
function writeYlides(draft: Draft): void {
  for (const { index, element, charge } of draft.source.atoms) {
    if ((element !== 'P' && element !== 'S') || charge !== 0) continue;
    const around = neighboursOf(draft, index);
    const carbon = around.find(
      ({ other, bond }) => draft.source.atoms[other]!.element === 'C' && draft.orders[bond] === 2,
    );
    if (carbon === undefined || draft.source.bonds[carbon.bond]!.aromatic) continue;
    const carbons = around.filter(({ other }) => draft.source.atoms[other]!.element === 'C').length;
    if (element === 'P' ? around.length !== 4 : carbons < 3) continue;
    draft.orders[carbon.bond] = 1;
    draft.charges[index] = 1;
    draft.charges[carbon.other]! -= 1;
  }
}

/** P+–O− and S+–O− (also N− and C−-free forms) become double bonds. */
function writeOxides(draft: Draft): void {
  for (const { index, element } of draft.source.atoms) {
    if (element !== 'P' && element !== 'S' && element !== 'Cl' && element !== 'Br' && element !== 'I')
      continue;
    for (const { other, bond } of neighboursOf(draft, index)) {
      if (draft.charges[index]! <= 0) break;
      if (
        draft.source.atoms[other]!.element !== 'O' ||
        draft.charges[other] !== -1 ||
        draft.orders[bond] !== 1
      )
        continue;
      draft.orders[bond] = 2;
      draft.charges[index]! -= 1;
      draft.charges[other] = 0;
    }
  }
}

/** C=N+(O−)2 becomes the carbanion of the nitro compound. */
function writeNitronates(draft: Draft): void {
  for (const { index, element } of draft.source.atoms) {
    if (element !== 'N' || draft.charges[index] !== 1) continue;
    const around = neighboursOf(draft, index);
    const oxides = around.filter(
      ({ other }) => draft.source.atoms[other]!.element === 'O' && draft.charges[other] === -1,
    );
    const carbon = around.find(
      ({ other, bond }) => draft.source.atoms[other]!.element === 'C' && draft.orders[bond] === 2,
    );
    if (oxides.length !== 2 || carbon === undefined) continue;
    draft.orders[carbon.bond] = 1;
    draft.charges[carbon.other]! -= 1;
    draft.orders[oxides[0]!.bond] = 2;
    draft.charges[oxides[0]!.other] = 0;
  }
}

/**
 * C=C–O− becomes the carbanion beside a carbonyl group, where the proton of its acid sits.
 *
 * Enediols, enols of 1,2-diketones and enols in a ring with a lactone or lactam group stay what they are drawn as.
 */
function writeEnolates(draft: Draft): void {
  for (const { index, element, aromatic } of draft.source.atoms) {
    if (element !== 'O' || aromatic || draft.charges[index] !== -1) continue;
    const around = neighboursOf(draft, index);
    const middle = around[0];
    if (around.length !== 1 || middle === undefined || !isPlainCarbon(draft, middle.other)) continue;
    const alkene = neighboursOf(draft, middle.other).find(
      ({ other, bond }) => draft.orders[bond] === 2 && isPlainCarbon(draft, other),
    );
    if (alkene === undefined || keepsEnol(draft, middle.other, alkene.other)) continue;
    draft.orders[middle.bond] = 2;
    draft.orders[alkene.bond] = 1;
    draft.charges[index] = 0;
    draft.charges[alkene.other]! -= 1;
  }
}

function isPlainCarbon({ source }: Draft, atom: number): boolean {
  const { element, aromatic } = source.atoms[atom]!;
  return element === 'C' && !aromatic;
}

function keepsEnol(draft: Draft, middle: number, alkene: number): boolean {
  const { atoms, rings } = draft.source;
  const around = neighboursOf(draft, alkene);
  const isHetero = ({ other }: { other: number }) => 'ONS'.includes(atoms[other]!.element);
  if (around.some(({ other }) => atoms[other]!.element === 'O')) return true;
  if (neighboursOf(draft, middle).some(({ other }) => isAcyl(draft, other))) return true;
  return rings.some(
    (ring) =>
      ring.includes(middle) &&
      ring.includes(alkene) &&
      around.some(
        ({ other }) =>
          ring.includes(other) &&
          isAcyl(draft, other) &&
          neighboursOf(draft, other).some((next) => draft.orders[next.bond] === 1 && isHetero(next)),
      ),
  );
}

function isAcyl(draft: Draft, atom: number): boolean {
  return neighboursOf(draft, atom).some(
    ({ other, bond }) => draft.orders[bond] === 2 && 'OS'.includes(draft.source.atoms[other]!.element),
  );
}

/** B(OH)4− and its like are the boric acid that has taken up hydroxide: water, and the anion of the acid. */
function writeBorates(draft: Draft): void {
  for (const { index, element } of draft.source.atoms) {
    if (element !== 'B' || draft.charges[index] !== -1) continue;
    const around = neighboursOf(draft, index);
    const hydroxyls = around.filter(
      ({ other }) =>
        draft.source.atoms[other]!.element === 'O' &&
        draft.charges[other] === 0 &&
        draft.hydrogens[other] === 1 &&
        neighboursOf(draft, other).length === 1,
    );
    const [leaving, staying] = hydroxyls;
    if (around.length !== 4 || leaving === undefined || staying === undefined) continue;
    draft.orders[leaving.bond] = 0;
    draft.hydrogens[leaving.other]! += 1;
    draft.charges[index] = 0;
    draft.hydrogens[staying.other]! -= 1;
    draft.charges[staying.other] = -1;
  }
}
