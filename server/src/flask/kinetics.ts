/**
 * Whether a proton moves at all in the time a step takes: most do at once, many on carbon never do.
 *
 * Knows: rows of `kinetics`, roles and names of what is in the flask.  Must not know: constants, text.
 * Invariant: the first row that fits holds; a couple that no row names moves at once.   (tests/flask/fates.test.ts)
 */
import type { Couple } from '../chemistry/couple.ts';
import { foldName } from '../tables/fold-name.ts';
import type { KineticsRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import type { Contents, Ingredient } from './state.ts';

const ZERO_CELSIUS = 273.15;

export type Rate = KineticsRow['rate'];

/** How fast a couple of this flask gives up ('leaves') or takes ('arrives') its proton. */
export function rateOf(
  couple: Couple,
  direction: KineticsRow['direction'],
  contents: Contents,
  tables: Tables,
): Rate {
  const celsius = contents.temperature - ZERO_CELSIUS;
  for (const row of tables.kinetics) {
    if (row.direction !== direction || !names(row, couple)) continue;
    if (row.above !== null && celsius < row.above) continue;
    if (!isThere(row.bases, contents) || !isThere(row.helpers, contents)) continue;
    return row.rate;
  }
  return 'instant';
}

function names({ groups, families }: KineticsRow, { group, family }: Couple): boolean {
  return groups.includes(group) || families.includes(family);
}

function isThere(wanted: readonly string[], { ingredients }: Contents): boolean {
  return wanted.length === 0 || wanted.some((what) => ingredients.some((one) => isCalled(one, what)));
}

/** Whether an ingredient is what a table means by `role:ROLE` or `reagent:NAME`. */
export function isCalled({ reagent, role }: Ingredient, what: string): boolean {
  if (reagent === null || role === 'inert') return false;
  if (what.startsWith('role:')) return (reagent.roles as readonly string[]).includes(what.slice(5));
  if (!what.startsWith('reagent:')) return false;
  const name = foldName(what.slice(8));
  return foldName(reagent.name) === name || reagent.synonyms.some((synonym) => foldName(synonym) === name);
}
