/**
 * What may be proposed for a flask: which reagents count as bases or acids, how ordinary each is, what it attacks.
 *
 * Knows: rows, ingredients.  Must not know: verdicts, text.
 * Units: °C in rows, K in flasks.
 * Invariant: the first row of `choices` that fits holds; what no row names is rare.   (tests/flask/suggest.test.ts)
 */
import { matchSites } from '../chemistry/match.ts';
import type { Pattern } from '../chemistry/smarts.ts';
import type { ChoiceRow, ReagentRole, ReagentRow, SolventRow, StabilityRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import type { Ingredient } from './state.ts';

export type Usual = ChoiceRow['usual'];

/** What it costs to be less than ordinary, in units of pKa. */
export const USUAL_COST: Readonly<Record<Usual, number>> = { everyday: 0, known: 1, rare: 3, never: 9 };

/** A reagent that could act, with the row that says how ordinary that is. */
export interface Choice {
  readonly reagent: ReagentRow;
  readonly row: ChoiceRow;
}

/** A group of the flask that a reagent would attack. */
export interface Attacked {
  readonly ingredient: number;
  readonly group: string;
}

/** Roles of reagents that are charged to take (give) a proton. */
export const ACTING_ROLES: Readonly<Record<'base' | 'acid', ReadonlySet<ReagentRole>>> = {
  base: new Set([
    'metal-hydride',
    'metal-amide',
    'organometallic',
    'solid-base',
    'amine-base',
    'alkoxide',
    'hydroxide',
    'carbonate',
  ]),
  acid: new Set(['mineral-acid', 'organic-acid']),
};

/** Every reagent of the tables that counts as a base (an acid), in the order of the table. */
export function choicesAs(as: 'base' | 'acid', { reagents, choices }: Tables): Choice[] {
  const rows = choices.filter((row) => row.as === as);
  return reagents.flatMap((reagent) => {
    const row = rows.find((one) => names(one, reagent));
    if (reagent.smiles === null || row === undefined) return [];
    const isMeant =
      row.what.startsWith('reagent:') || reagent.roles.some((role) => ACTING_ROLES[as].has(role));
    return isMeant ? [{ reagent, row }] : [];
  });
}

/** How ordinary a solvent is, why not where it is not, and its place among the ordinary ones. */
export function solventChoice(
  { name }: SolventRow,
  { choices }: Tables,
): { readonly usual: Usual; readonly note: string; readonly rank: number } {
  const rank = choices.findIndex(({ as, what }) => as === 'solvent' && what === `solvent:${name}`);
  const row = choices[rank];
  if (row === undefined) return { usual: 'rare', note: '', rank: choices.length };
  return { usual: row.usual, note: row.note, rank };
}

/** Whether a reagent is ordinarily used in a solvent. */
export function isUsedIn({ usedIn }: ChoiceRow, { name, kind }: SolventRow): boolean {
  return usedIn.includes(kind) || usedIn.includes(name);
}

/** The first group of the flask that a reagent attacks; null where it leaves all in peace. */
export function attackedBy(
  { reagent, row }: Choice,
  ingredients: readonly Ingredient[],
  tables: Tables,
): Attacked | null {
  for (const { id, molecule, role } of ingredients) {
    if (role === 'solvent' || role === 'inert' || molecule?.graph == null) continue;
    const { graph } = molecule;
    const fits = ({ pattern }: { readonly pattern: unknown }) =>
      matchSites(graph, pattern as Pattern).length !== 0;
    const electrophile = tables.electrophiles.find((one) => row.attacks.includes(one.id) && fits(one));
    if (electrophile !== undefined) return { ingredient: id, group: electrophile.name };
    const sensitive = tables.stability.find((one) => isTakenOffBy(one, reagent) && fits(one));
    if (sensitive !== undefined) return { ingredient: id, group: sensitive.name };
  }
  return null;
}

function names({ what }: ChoiceRow, { name, roles }: ReagentRow): boolean {
  return what === `reagent:${name}` || roles.some((role) => what === `role:${role}`);
}

function isTakenOffBy({ attackedBy: what }: StabilityRow, { name, roles }: ReagentRow): boolean {
  return what.some((one) => one === `reagent:${name}` || roles.some((role) => one === `role:${role}`));
}
