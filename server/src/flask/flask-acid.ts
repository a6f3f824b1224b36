/**
 * What a proton balance is solved for: the acids of a flask with their stepwise constants.
 *
 * Knows: couples and their steps.  Must not know: how the acids are put together.
 * Units: mol; pKa on the medium's scale.
 */
import type { Couple, ProtonStep } from '../chemistry/couple.ts';

/** One component of one ingredient with its protons. */
export interface FlaskAcid {
  readonly ingredient: number;
  readonly component: number;
  /** In the order in which the protons leave, lowest constant first. */
  readonly steps: readonly ProtonStep[];
  /** Added to each step's value for the shares of the layers and for ion pairs, lowest step first. */
  readonly shifts: readonly number[];
  readonly amount: number;
  readonly protonsCharged: number;
  /** Charge of the form that holds every proton. */
  readonly fullCharge: number;
  readonly gas: { readonly name: string; readonly protons: number; readonly most: number } | null;
  /** Belongs to the solvent that governs. */
  readonly isSolvent: boolean;
  /** The solvent's own ion or molecule from another ingredient: hydroxide in water. */
  readonly isSolventIon: boolean;
}

export interface FlaskSystem {
  readonly acids: readonly FlaskAcid[];
  /** Sum of amount × charge² of ions without protons of their own, mol. */
  readonly spectatorCharges: number;
  /** pKw where water governs. */
  readonly pKw: number | null;
}

/** Which couples take part besides those that always do. */
export interface Participation {
  /** Couples that somebody means to move, however slow they are. */
  readonly intended?: readonly { readonly ingredient: number; readonly couple: Couple }[];
  /** An organometallic is about, which adds to carbonyl groups rather than taking the proton beside them. */
  readonly sparingCarbonyls?: boolean;
}
