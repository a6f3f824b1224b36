/**
 * Where the rows of the cautions table speak in a step: at the first line where what they name has come together.
 *
 * Knows: facts and rows.  Must not know: how a danger is worded or how grave it is.
 * Units: mol, shares 0 … 1.
 * Invariant: a row speaks once in a step; what a conversion has used up is no longer there.   (tests/checks/toxic-gas.md)
 */
import { isSolidBase } from '../flask/medium.ts';
import type { CoupleState, Ingredient } from '../flask/state.ts';
import type { Range } from '../route/plan.ts';
import type { CautionRow } from '../tables/rows.ts';
import type { Moment, StepFacts } from './facts.ts';
import { triggered } from './triggers.ts';

export interface Danger {
  readonly row: CautionRow;
  /** The line that brings it about. */
  readonly range: Range;
  /** Share of the dangerous form by the proton balance; null where a pair decides. */
  readonly share: number | null;
  /** mol of the dangerous form, or of the gas that the pair can make; null where it cannot be told. */
  readonly mol: number | null;
  /** pH at that line where water governs, else null. */
  readonly pH: number | null;
}

const ZERO_CELSIUS = 273.15;
/** Share in the dangerous form from which it is more than a trace. */
const GRAVE = 0.05;
const HYDROGEN = '[H][H]';
/** L/mol of an ideal gas at 25 °C and 1 atm. */
const MOLAR_VOLUME = 24.47;

/** The dangers of one check in a step, in the order of the table; a grave one rather than an earlier slight one. */
export function* dangersOf(check: CautionRow['check'], facts: StepFacts): Iterable<Danger> {
  for (const row of facts.tables.cautions) {
    if (row.check !== check) continue;
    let first: Danger | null = null;
    for (let place = 0; place < facts.moments.length; place++) {
      const danger = dangerAt(row, facts, place);
      if (danger === null) continue;
      if (first === null || isGrave(danger)) first = danger;
      if (isGrave(first)) break;
    }
    if (first !== null) yield first;
  }
}

/** Whether the dangerous form is more than a trace of what was charged; a pair always is. */
export function isGrave({ share }: Danger): boolean {
  return share === null || GRAVE <= share;
}

function dangerAt(row: CautionRow, facts: StepFacts, place: number): Danger | null {
  const moment = facts.moments[place]!;
  const { ingredients } = moment.contents;
  const first = triggered(row.first, ingredients);
  const second = triggered(row.second, ingredients);
  if (row.first.length !== 0 && first === undefined && row.group === '') return null;
  if (row.second.length !== 0 && second === undefined) return null;
  if (row.aboveTemperature !== null && hottest(row, facts, place) < row.aboveTemperature) return null;
  const range = rangeOf(moment, facts);
  if (row.group === '') {
    const pH = row.gasValue === null ? null : acidity(moment);
    // Without water there is no pH to ask for, and the pair is taken at its word.
    if (row.gasValue !== null && pH !== null && row.gasValue + (row.gasMargin ?? 0) < pH) return null;
    const share = row.gasValue === null || pH === null ? null : 1 / (1 + 10 ** (pH - row.gasValue));
    return { row, range, share, mol: gasOfPair(row, first, second), pH };
  }
  if (first !== undefined && row.second.length === 0 && row.check === 'skin-carrier')
    return { row, range, share: null, mol: null, pH: null };
  return dangerOfGroup(row, moment, range);
}

/** By the proton balance: how much of the group stands in its dangerous form beyond what was charged so. */
function dangerOfGroup(row: CautionRow, moment: Moment, range: Range): Danger | null {
  const { ingredients } = moment.contents;
  if (!ingredients.some((one) => mayHold(one, row))) return null;
  const { couples, gases, medium } = moment.state();
  // A solid carbonate in a dry solvent takes one proton at its surface and stays hydrogen carbonate.
  const dry = !medium.protic && medium.organic === null;
  const solid = new Set(ingredients.filter((one) => dry && isSolidBase(one)).map(({ id }) => id));
  const own = fullyProtonated(
    couples.filter(({ couple, ingredient }) => couple.group === row.group && !solid.has(ingredient)),
  );
  const sum = (of: (one: CoupleState) => number) => own.reduce((total, one) => total + of(one), 0);
  const gone = gases
    .filter(({ ingredient }) => own.some((one) => one.ingredient === ingredient))
    .reduce((total, { mol }) => total + mol, 0);
  const amount = sum((one) => one.amount);
  const mol = Math.min(
    amount,
    Math.max(
      gone,
      sum((one) => one.amount * one.protonated),
    ),
  );
  const share = amount === 0 ? 0 : mol / amount;
  if (share < 10 ** -(row.gasMargin ?? 1) || mol <= sum((one) => one.amount * one.charged)) return null;
  return { row, range, share, mol, pH: acidity(moment) };
}

/** Whether it is worth solving the flask for the group; complex hydrides act by their class, not by a couple drawn. */
function mayHold({ molecule, reagent }: Ingredient, { group, gas }: CautionRow): boolean {
  if (molecule?.couples.some((couple) => couple.group === group)) return true;
  return gas === HYDROGEN && (reagent?.roles.some((role) => role.endsWith('hydride')) ?? false);
}

/** Of each ingredient the step that completes the form which leaves: its strongest acid. */
function fullyProtonated(couples: readonly CoupleState[]): CoupleState[] {
  const last = new Map<number, CoupleState>();
  for (const one of couples) {
    const other = last.get(one.ingredient);
    if (other === undefined || one.constant.value < other.constant.value) last.set(one.ingredient, one);
  }
  return [...last.values()];
}

function acidity(moment: Moment): number | null {
  const { medium, pH } = moment.state();
  return medium.aqueous ? pH : null;
}

/** mol of gas that a pair can make at most; the hydrides of a reagent count one by one. */
function gasOfPair(
  { gas }: CautionRow,
  first: Ingredient | undefined,
  second: Ingredient | undefined,
): number | null {
  if (gas === null || first === undefined || first.role === 'solvent') return null;
  if (gas !== HYDROGEN) return first.mol;
  const able = first.mol * (first.reagent?.protonCapacity ?? 1);
  return second === undefined || second.role === 'solvent' ? able : Math.min(able, second.mol);
}

/** °C at its highest while the two are together, from this line on. */
function hottest({ first, second }: CautionRow, { moments, left }: StepFacts, place: number): number {
  const later = [...moments.slice(place).map(({ contents }) => contents), left];
  const together = later.filter(
    ({ ingredients }) =>
      triggered(first, ingredients) !== undefined &&
      (second.length === 0 || triggered(second, ingredients) !== undefined),
  );
  return Math.max(...together.map(({ temperature }) => temperature)) - ZERO_CELSIUS;
}

function rangeOf({ statement }: Moment, { additions }: StepFacts): Range {
  const own = additions.filter((addition) => addition.statement === statement);
  return (own.find(({ ingredient }) => ingredient.role !== 'solvent') ?? own[0])?.range ?? statement.range;
}

/** " (4.2 mmol, 0.10 L as gas)", or nothing where the amount is not known. */
export function gasWords(mol: number | null, { gas }: CautionRow): string {
  if (mol === null || !(0 < mol)) return '';
  const amount = `${(1000 * mol).toPrecision(2)} mmol`;
  return gas === null ? ` (${amount})` : ` (${amount}, ${(MOLAR_VOLUME * mol).toPrecision(2)} L as gas)`;
}
