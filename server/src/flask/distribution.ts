/**
 * How a substance shares out between an aqueous layer and an organic one, and what that does to its constants.
 *
 * A neutral form that slips into the organic layer pulls its equilibrium: an acid looks weaker, an ammonium ion stronger,
 * by the logarithm of what the organic layer holds.
 * Knows: calculated log P, volumes.  Must not know: pH, text.
 * Accuracy: calculated log P of octanol and water stands for any organic solvent; an estimate, to be shown as one.
 * Sources: R. P. Schwarzenbach, P. M. Gschwend, D. M. Imboden, Environmental Organic Chemistry (Wiley, 2003), for log D.
 */
import type { Component, Perceived } from '../chemistry/couple.ts';
import { neutralForm } from '../chemistry/neutral.ts';
import { logP } from '../chemistry/toolkit.ts';
import { boundedCache } from '../tables/cache.ts';
import type { Ingredient, Medium } from './state.ts';

/** Ions enter an organic layer as pairs, some four powers of ten less than the neutral form. */
export const ION_PAIR_DROP = 4;
/** Components with fewer carbon atoms stay in water: mineral acids and bases. */
const FEWEST_CARBONS = 1;
const REMEMBERED = 4000;

const remembered = boundedCache<string, readonly (number | null)[]>(REMEMBERED);

/** log P of the neutral form of each component; null where it stays in water or the library has none. */
export function neutralLogP(molecule: Perceived): readonly (number | null)[] {
  const known = remembered.get(molecule.smiles);
  if (known !== undefined) return known;
  const { graph } = molecule;
  const neutral = graph === null ? null : neutralForm(graph);
  const values = molecule.components.map(({ atoms }) => {
    if (neutral === null) return null;
    const there = atoms.filter((atom) => !neutral.absorbed.has(atom));
    const carbons = there.filter((atom) => neutral.graph.atoms[atom]?.element === 'C').length;
    const bare = there.filter((atom) => neutral.graph.atoms[atom]?.element === 'O').length;
    // Carbonic acid, formic acid and the like are as good as mineral.
    if (carbons < FEWEST_CARBONS || (carbons === 1 && 2 <= bare)) return null;
    return logP(neutral.graph, there);
  });
  remembered.set(molecule.smiles, values);
  return values;
}

/**
 * What each step's pKa gains in the aqueous layer because forms share out, lowest step first.
 *
 * @param steps number of steps; the form that holds every proton has `fullCharge`
 */
export function distribution(
  { molecule }: Ingredient,
  component: Component,
  steps: number,
  fullCharge: number,
  { organic, volume }: Medium,
): number[] {
  const zero = Array.from({ length: steps }, () => 0);
  if (organic === null || molecule === null) return zero;
  const log = neutralLogP(molecule)[component.index] ?? null;
  if (log === null) return zero;
  const ratio = organic.volume / volume;
  const held = (charge: number) =>
    Math.log10(1 + ratio * 10 ** (charge === 0 ? log : log - ION_PAIR_DROP * Math.abs(charge)));
  return zero.map((_, step) => held(fullCharge - step) - held(fullCharge - step - 1));
}
