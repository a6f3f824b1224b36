/**
 * What goes into a flask and what is found in it once the protons have come to rest.
 *
 * Knows: perceived molecules and rows of the tables.  Must not know: text, names in plans, findings.
 * Units: mol, litre, kelvin; pH on the medium's own scale.
 */
import type { Constant, Couple, Perceived } from '../chemistry/couple.ts';
import type { ReagentRow, ScaleId, SolventRow } from '../tables/rows.ts';

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
}

/** What surrounds the couples: the solvent that governs, what it borrows, and how much there is of it. */
export interface Medium {
  readonly solvent: SolventRow | null;
  readonly scale: ScaleId;
  readonly scaleSd: number;
  readonly volume: number;
  readonly assumedVolume: boolean;
  /** Names of all solvents that share the phase. */
  readonly names: readonly string[];
}

export interface Contents {
  readonly ingredients: readonly Ingredient[];
  /** K */
  readonly temperature: number;
}

/** One couple of one ingredient as solved. */
export interface CoupleState {
  readonly ingredient: number;
  readonly couple: Couple;
  readonly constant: Constant;
  readonly amount: number;
  /** Share of this couple that holds its proton, 0 … 1. */
  readonly protonated: number;
}

export interface FlaskState {
  readonly medium: Medium;
  readonly temperature: number;
  /** Null where it has no meaning (no couples, no solvent). */
  readonly pH: number | null;
  readonly ionicStrength: number | null;
  readonly couples: readonly CoupleState[];
  readonly gases: readonly { readonly name: string; readonly mol: number }[];
  readonly residual: number;
}

/** The one answer to "does this proton move?". */
export interface Verdict {
  readonly answer: 'yes' | 'undecided' | 'no';
  /** log10 of the equilibrium constant of the transfer: pKa of the base's conjugate acid − pKa of the site. */
  readonly logK: number;
  readonly sd: number;
  /** Share of the intended sites that the transfer converts at these amounts, 0 … 1. */
  readonly extent: number;
  /** P(extent < 50 %), from the uncertainties. */
  readonly probability: number;
  readonly kinetics: 'instant' | 'slow' | 'dead';
  readonly site: { readonly ingredient: number; readonly couple: Couple; readonly constant: Constant };
  /** Null where nothing in the flask takes (gives) a proton. */
  readonly partner: {
    readonly ingredient: number;
    readonly couple: Couple;
    readonly constant: Constant;
  } | null;
  readonly scale: ScaleId;
  /** Why the plain comparison was set aside: ion-pair, levelled, lewis-acid, surface, gas, phases, consumed … */
  readonly allowances: readonly string[];
  readonly borrowed: boolean;
}
