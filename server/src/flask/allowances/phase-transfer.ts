/**
 * Phase transfer: a lipophilic onium salt brings hydroxide or carbonate into the organic layer, far more basic than in
 * water (carbon acids up to pKa about 25 are alkylated over concentrated alkali; common practice). At most undecided.
 */
import type { Contents, Ingredient } from '../state.ts';

/** Carbon atoms from which a cation goes into an organic layer. */
const FEWEST_CARBONS = 8;

/** Whether a phase-transfer catalyst is in a flask of two layers. */
export function hasPhaseTransfer({ ingredients }: Contents): boolean {
  return ingredients.some(isLipophilicOnium);
}

function isLipophilicOnium({ molecule }: Ingredient): boolean {
  if (molecule?.graph == null) return false;
  const { atoms } = molecule.graph;
  return molecule.components.some((component) => {
    if (component.charge !== 1 || molecule.couples.some((couple) => couple.component === component.index))
      return false;
    return FEWEST_CARBONS <= component.atoms.filter((atom) => atoms[atom]?.element === 'C').length;
  });
}
