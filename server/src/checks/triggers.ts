/**
 * Whether something in a flask is what a caution speaks of.
 *
 * Knows: rows and ingredients.  Must not know: checks, findings.
 */
import { matchSites } from '../chemistry/match.ts';
import type { Pattern } from '../chemistry/smarts.ts';
import type { Ingredient } from '../flask/state.ts';
import type { Trigger } from '../tables/rows.ts';

/** The first ingredient that fits one of the triggers and is still there; undefined without one. */
export function triggered(
  triggers: readonly Trigger[],
  ingredients: readonly Ingredient[],
): Ingredient | undefined {
  return ingredients.find((one) => isThere(one) && triggers.some((trigger) => fits(trigger, one)));
}

function isThere({ role, mol }: Ingredient): boolean {
  return role === 'solvent' || 0 < mol;
}

function fits({ kind, name, pattern }: Trigger, { reagent, solvent, role, molecule }: Ingredient): boolean {
  switch (kind) {
    case 'reagent':
      return reagent?.name === name;
    case 'role':
      return reagent?.roles.some((own) => own === name) ?? false;
    case 'solvent':
      return role === 'solvent' && solvent?.name === name;
    case 'kind':
      return role === 'solvent' && solvent?.kind === name;
    case 'group':
      return molecule?.graph != null && matchSites(molecule.graph, pattern as Pattern).length !== 0;
  }
}
