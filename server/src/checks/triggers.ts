/**
 * Whether something in a flask is what a caution speaks of.
 *
 * Knows: rows and ingredients.  Must not know: checks, findings.
 */
import type { Ingredient } from '../flask/state.ts';

/** Whether an ingredient fits any of `reagent:NAME`, `role:ROLE`, `solvent:NAME`, `kind:KIND`, joined with ` | `. */
export function isTriggered(trigger: string, ingredient: Ingredient): boolean {
  return trigger.split(' | ').some((part) => fits(part, ingredient));
}

function fits(part: string, { reagent, solvent, role }: Ingredient): boolean {
  const place = part.indexOf(':');
  const [kind, name] = [part.slice(0, place), part.slice(place + 1)];
  switch (kind) {
    case 'reagent':
      return reagent?.name === name;
    case 'role':
      return reagent?.roles.some((own) => own === name) ?? false;
    case 'solvent':
      return role === 'solvent' && solvent?.name === name;
    case 'kind':
      return role === 'solvent' && solvent?.kind === name;
    default:
      return false;
  }
}
