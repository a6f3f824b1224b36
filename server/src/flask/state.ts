/**
 * What goes into a flask and what is found in it once the protons have come to rest.
 *
 * Knows: perceived molecules and rows of the tables.  Must not know: text, names in plans, findings.
 * Units: mol, litre, kelvin; pH on the medium's own scale.
 */
import type { Constant, Couple, OwnValue, Perceived, ProtonStep } from '../chemistry/couple.ts';
import type { ReagentRow, ScaleId, SolventRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';

export type Role = 'solvent' | 'compound' | 'reagent' | 'base' | 'acid' | 'quench' | 'inert' | 'by-product';

/** One addition to a flask. */
export interface Ingredient {
  /** Counts up within the flask; a verdict points back with it. */
  readonly id: number;
  readonly name: string;
  /** Null for what has no structure (silica, Pd/C). */
  readonly molecule: Perceived | null;
  readonly mol: number;
  readonly volume: number | null;
  readonly role: Role;
  readonly reagent: ReagentRow | null;
  readonly solvent: SolventRow | null;
  /** The amount was assumed, not written. */
  readonly assumed: boolean;
  readonly qualifier: 'excess' | 'catalytic' | null;
  /** Measured values that the plan or the house gives for it. */
  readonly own?: readonly OwnValue[];
}

/** Gives the constants of a molecule on a scale; the flask asks nothing else of the chemistry. */
export type ConstantsIn = (
  molecule: Perceived,
  scale: ScaleId,
  tables: Tables,
  options?: { readonly own?: readonly OwnValue[] },
) => {
  /** Parallel to the couples of the molecule. */
  readonly couples: readonly (Constant | null)[];
  /** For each component its stepwise constants, the first proton lost first. */
  readonly steps: readonly (readonly ProtonStep[])[];
};

/** What surrounds the couples: the solvent that governs, what it borrows, and how much there is of it. */
export interface Medium {
  readonly solvent: SolventRow | null;
  readonly scale: ScaleId;
  readonly scaleSd: number;
  /** L of the phase that governs; with two layers the aqueous one. */
  readonly volume: number;
  readonly assumedVolume: boolean;
  /** Names of all solvents that share the phase. */
  readonly names: readonly string[];
  /** Water governs, so activities, pKw and saturation hold. */
  readonly aqueous: boolean;
  /** Enough hydroxylic solvent to part ions. */
  readonly protic: boolean;
  /** Water-immiscible solvent over the aqueous layer: names and volume; null in one phase. */
  readonly organic: {
    readonly volume: number;
    readonly names: readonly string[];
    readonly solvent: SolventRow;
  } | null;
}

export interface Contents {
  readonly ingredients: readonly Ingredient[];
  /** K */
  readonly temperature: number;
  /** mol/L assumed where no volume is written; 0.2 where undefined. */
  readonly concentration?: number;
}

/** One couple of one ingredient as solved; a couple with several steps appears once for each. */
export interface CoupleState {
  readonly ingredient: number;
  readonly couple: Couple;
  readonly constant: Constant;
  readonly amount: number;
  /** Share of this couple that holds its proton, 0 … 1. */
  readonly protonated: number;
  /** The same as charged, before any proton moved. */
  readonly charged: number;
}

export interface FlaskState {
  readonly medium: Medium;
  readonly temperature: number;
  /** Null where it has no meaning (no couples, no solvent). */
  readonly pH: number | null;
  readonly ionicStrength: number | null;
  readonly couples: readonly CoupleState[];
  readonly gases: readonly { readonly name: string; readonly mol: number; readonly ingredient: number }[];
  /** Protons counted minus protons charged at the answer, mol/L. */
  readonly residual: number;
}

/** A couple of an ingredient with the constant that it has in this flask. */
export interface Site {
  readonly ingredient: number;
  readonly couple: Couple;
  readonly constant: Constant;
}

/** Why the plain comparison of two constants was set aside, added to or limited. */
export type Allowance =
  | 'ion-pair'
  | 'levelled'
  | 'lewis-acid'
  | 'surface'
  | 'gas'
  | 'phases'
  | 'phase-transfer'
  | 'stoichiometric'
  | 'steady-amount'
  | 'net-reaction'
  | 'slow'
  | 'consumed'
  | 'already';

/** The one answer to "does this proton move?". */
export interface Verdict {
  readonly answer: 'yes' | 'undecided' | 'no';
  /** log10 of the equilibrium constant of the transfer: pKa of the base's conjugate acid − pKa of the site. */
  readonly logK: number;
  readonly sd: number;
  /** Share of the intended sites that the transfer converts at these amounts, 0 … 1. */
  readonly extent: number;
  /** Units that log K could lose before the extent falls to half of what the amounts allow; negative: units short. */
  readonly margin: number;
  /** P(extent < 50 %), from the uncertainties; where amounts limit, of half of what they allow. */
  readonly probability: number;
  readonly kinetics: 'instant' | 'slow' | 'dead';
  readonly site: Site;
  /** Null where nothing in the flask takes (gives) a proton. */
  readonly partner: Site | null;
  /** Where the solvent's own ion acts: the ingredient that made it (NaOH in water, NaH in ethanol); else null. */
  readonly broughtBy: number | null;
  readonly scale: ScaleId;
  readonly allowances: readonly Allowance[];
  /** The sd of the verdict without borrowing the scale would give another answer. */
  readonly borrowed: boolean;
  /** Protons that the flask's bases (acids) can move in all, mol for each mol of the site. */
  readonly capacity: number;
  /** The product's site that a full equivalent of base ends on, where `net-reaction` applies. */
  readonly net: { readonly logK: number; readonly site: Site } | null;
}
