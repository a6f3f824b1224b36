/**
 * The solvents that a screening tries in place of those written, the nearest to hand first.
 *
 * Knows: rows of solvents, contents.  Must not know: bases, verdicts.
 * Units: L; cost in units of pKa.
 * Invariant: each solvent of the tables is tried or named as never proposed.   (tests/flask/suggest.test.ts)
 */
import { perceive } from '../chemistry/perceive.ts';
import type { SolventRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import { solventChoice, USUAL_COST } from './choices.ts';
import type { Contents, Ingredient } from './state.ts';

/** One solvent, or the mixture as written. */
export interface Place {
  /** Null for the solvents as written where they are several. */
  readonly solvent: SolventRow | null;
  readonly ingredients: readonly Ingredient[];
  readonly note: string;
  readonly cost: number;
  /** Place among all, to settle ties. */
  readonly rank: number;
}

/** Another solvent is a greater change than another base. */
const NEW_SOLVENT = 1.2;
/** What a chemist weighs before taking it. */
const NOTE = 0.5;

/**
 * The mixture as written and each solvent of the tables, and those that are never proposed with the reason.
 *
 * @param written ids of the solvents whose place is taken
 * @param id      for the ingredient of a solvent that is not in the flask
 */
export function solventsTried(
  contents: Contents,
  written: readonly number[],
  id: number,
  tables: Tables,
  where: 'anywhere' | 'as-written',
): { readonly places: Place[]; readonly never: { readonly solvent: SolventRow; readonly note: string }[] } {
  const own = contents.ingredients.filter((one) => written.includes(one.id));
  const volume = own.reduce<number | null>(
    (sum, one) => (sum === null || one.volume === null ? null : sum + one.volume),
    own.length === 0 ? null : 0,
  );
  const never: { solvent: SolventRow; note: string }[] = [];
  const places: Place[] = [];
  if (where === 'as-written') {
    const only = own.length === 1 ? own[0]!.solvent : null;
    return { places: [{ solvent: only, ingredients: own, note: '', cost: 0, rank: -1 }], never };
  }
  if (1 < own.length) places.push({ solvent: null, ingredients: own, note: '', cost: 0, rank: -1 });
  for (const solvent of tables.solvents) {
    const { usual, note, rank } = solventChoice(solvent, tables);
    if (usual === 'never') {
      never.push({ solvent, note });
      continue;
    }
    const isWritten = own.length === 1 && own[0]!.solvent?.name === solvent.name;
    const cost = USUAL_COST[usual] + (isWritten ? 0 : NEW_SOLVENT) + (note === '' ? 0 : NOTE);
    const ingredients = isWritten ? own : [ingredientOf(solvent, volume, id, tables)];
    places.push({ solvent, ingredients, note, cost, rank });
  }
  return { places: places.sort((a, b) => a.cost - b.cost || a.rank - b.rank), never };
}

function ingredientOf(solvent: SolventRow, volume: number | null, id: number, tables: Tables): Ingredient {
  return {
    id,
    name: solvent.name,
    molecule: perceive(solvent.smiles, tables),
    mol: 0,
    volume,
    role: 'solvent',
    reagent: null,
    solvent,
    assumed: volume === null,
    qualifier: null,
  };
}
