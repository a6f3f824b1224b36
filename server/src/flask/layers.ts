/**
 * How a compound shares out between water and an organic layer at a pH.
 *
 * Knows: calculated log P of neutral forms, stepwise constants.  Must not know: plans, text.
 * Units: litre; log P and log D decimal.
 * Accuracy: an estimate; calculated log P errs by about half a unit and stands for any organic solvent.
 * Invariants: shares lie between 0 and 1; more organic solvent or more portions never leave more in water.   (tests/flask/shares.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { OwnValue, Perceived } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import { ION_PAIR_DROP, neutralLogP } from './distribution.ts';
import { speciate } from './speciate.ts';
import type { ConstantsIn } from './state.ts';

/** Decimal units by which a calculated log P may be off. */
export const LOG_P_SD = 0.5;

export interface LayerForms {
  /** Null where there is no neutral form whose log P could be calculated. */
  readonly logP: number | null;
  readonly logD: number | null;
  /** Shares by charge of the main component at this pH, commonest first. */
  readonly charges: readonly { readonly charge: number; readonly share: number }[];
}

/** Which forms the organic part of a compound has at a pH, and its log D. */
export function layerForms(
  molecule: Perceived,
  pH: number,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
  own: readonly OwnValue[] = [],
): LayerForms {
  const main = mainComponent(molecule);
  if (main === null) return { logP: null, logD: null, charges: [] };
  const logP = neutralLogP(molecule)[main] ?? null;
  const forms = speciate(molecule, 'water', [pH], tables, constantsIn, own).filter(
    ({ component }) => component === main,
  );
  const charges = forms
    .map(({ charge, shares }) => ({ charge, share: shares[0]! }))
    .sort((a, b) => b.share - a.share);
  if (logP === null) return { logP, logD: null, charges };
  // A permanent charge has no neutral form; it goes over as a pair, like the ions of the others.
  const partition = charges.reduce(
    (sum, { charge, share }) =>
      sum + share * 10 ** (charge === 0 ? logP : logP - ION_PAIR_DROP * Math.abs(charge)),
    0,
  );
  return { logP, logD: Math.log10(partition), charges };
}

/**
 * Share that ends in the organic layers after `portions` extractions of `organic` L each from `water` L.
 *
 * @returns 1 for all of it in the organic layers
 */
export function organicShare(logD: number, organic: number, water: number, portions = 1): number {
  if (water <= 0) return 1;
  const left = 1 / (1 + (10 ** logD * organic) / water);
  return 1 - left ** portions;
}

/** The largest component that holds carbon; counter-ions are not what a chemist extracts. */
export function mainComponent({ components, graph }: Perceived): number | null {
  let best: { index: number; atoms: number } | null = null;
  for (const { index, atoms } of components) {
    const carbons = atoms.filter((atom) => graph?.atoms[atom]?.element === 'C').length;
    if (carbons !== 0 && (best === null || best.atoms < atoms.length)) best = { index, atoms: atoms.length };
  }
  return best?.index ?? null;
}
