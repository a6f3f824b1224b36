/**
 * Where the acid goes that a conversion sets free: whether the nucleophile is still there to react.
 *
 * Knows: solved flasks.  Must not know: text.
 * Units: mol; shares 0 … 1.
 * Invariant: more acid never leaves more of the free amine.   (tests/flask/uptake.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Perceived } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import { solveFlask } from './solve.ts';
import type { ConstantsIn, Contents, FlaskState, Ingredient } from './state.ts';

/** Couples that hold their proton below this constant are no nucleophile's own: amide oxygen, nitrile, ether. */
const LEAST_BASIC = 0;

/** Share of an ingredient's most basic nitrogen that holds a proton; null where it has none. */
export function protonatedShare({ couples }: FlaskState, ingredient: number): number | null {
  let best: { readonly value: number; readonly share: number } | null = null;
  for (const { ingredient: id, couple, constant, protonated } of couples) {
    if (id !== ingredient || couple.kind !== 'base' || couple.element !== 'N') continue;
    if (constant.value < LEAST_BASIC) continue;
    if (best === null || best.value < constant.value) best = { value: constant.value, share: protonated };
  }
  return best?.share ?? null;
}

/** Share of an ingredient's acid couples of one group that hold their proton: free HF of a fluoride; null without one. */
export function freeShare({ couples }: FlaskState, ingredient: number, group: string): number | null {
  const own = couples.filter(({ ingredient: id, couple }) => id === ingredient && couple.group === group);
  if (own.length === 0) return null;
  return own.reduce((sum, { protonated }) => sum + protonated, 0) / own.length;
}

/** mol of strong acid that the reagents of a flask release when they have done their work. */
export function acidOfReagents({ ingredients }: Contents): number {
  return ingredients.reduce((sum, { reagent, mol, role }) => {
    const each = role === 'inert' ? 0 : (reagent?.acidReleased ?? 0);
    return 0 < mol && Number.isFinite(mol) ? sum + each * mol : sum;
  }, 0);
}

/** The share of a nucleophile that is protonated before and after `mol` of an acid has been set free in the flask. */
export function acidUptake(
  contents: Contents,
  nucleophile: number,
  acid: Perceived,
  mol: number,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): { readonly before: number | null; readonly after: number | null } {
  const released: Ingredient = {
    id: 1 + Math.max(0, ...contents.ingredients.map(({ id }) => id)),
    name: 'acid set free',
    molecule: acid,
    mol,
    volume: null,
    role: 'by-product',
    reagent: null,
    solvent: null,
    assumed: false,
    qualifier: null,
  };
  const after = { ...contents, ingredients: [...contents.ingredients, released] };
  const share = (what: Contents) => protonatedShare(solveFlask(what, tables, constantsIn), nucleophile);
  return { before: share(contents), after: share(after) };
}
