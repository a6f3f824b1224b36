/**
 * A couple HA ⇌ A⁻ + H⁺ at one atom of a molecule, and the constant it has on a scale.
 *
 * Knows: atoms and numbers.  Must not know: flasks, plans, files.
 */
import type { ScaleId } from '../tables/rows.ts';
import type { Graph } from './graph.ts';
import type { Span } from './molecule.ts';

export interface Couple {
  /** Atom that carries the proton, in the order of the SMILES as written, from 0. */
  readonly atom: number;
  readonly element: string;
  /** Id of the row of `groups` that found it. */
  readonly group: string;
  readonly groupName: string;
  /** acid: the neutral molecule loses this proton; base: the neutral molecule gains it. */
  readonly kind: 'acid' | 'base';
  /** Class of correlations between scales: phenol, carboxylic-acid, ammonium, carbon-acid … */
  readonly family: string;
  /** Whether the molecule as drawn holds the proton. */
  readonly holdsProton: boolean;
  /** Symmetry-equivalent atoms of the same couple (this one included); protons leave them one after the other only where `steps` says so. */
  readonly equivalents: readonly number[];
  readonly component: number;
  /** Class of its atoms under the symmetry of the molecule; finds measured values. */
  readonly symmetry?: number;
}

/** Where a constant comes from, most trusted first. */
export type Origin = 'plan' | 'house' | 'measured' | 'estimated' | 'carried';

/** One link of a derivation, printable on its own. */
export interface Hop {
  readonly what: string;
  readonly value: number;
  readonly sd: number;
  readonly sources: readonly string[];
}

export interface Constant {
  readonly value: number;
  readonly sd: number;
  readonly scale: ScaleId;
  readonly origin: Origin;
  readonly sources: readonly string[];
  readonly hops: readonly Hop[];
}

/** A proton leaving (or entering) one component of a molecule, with the couple that it mainly belongs to. */
export interface ProtonStep {
  readonly couple: Couple;
  readonly constant: Constant;
}

export interface Component {
  readonly index: number;
  readonly atoms: readonly number[];
  /** Net charge as drawn. */
  readonly charge: number;
  /** Net charge of the form in which every couple has lost its proton. */
  readonly bareCharge: number;
  /** A part without couples: Na+, PF6-, a hydrocarbon outside the range. */
  readonly spectator: boolean;
  /** Canonical key of its neutral form. */
  readonly key?: string;
}

export interface Perceived {
  readonly smiles: string;
  /** Canonical key of the neutral reference form; null where the text could not be read. */
  readonly key: string | null;
  readonly problem: {
    readonly check: 'unreadable-structure' | 'impossible-valence' | 'budget-reached';
    readonly message: string;
    readonly span: Span;
  } | null;
  readonly graph: Graph | null;
  readonly components: readonly Component[];
  readonly couples: readonly Couple[];
  /** Heteroatoms that carry or could take a proton and that no rule covers. */
  readonly uncovered: readonly number[];
  readonly molarMass: number | null;
}

/** A measured value that outranks the tables: from the plan itself or from the house's own file. */
export interface OwnValue {
  readonly origin: 'plan' | 'house';
  readonly value: number;
  readonly sd: number | null;
  /** Atoms in SMILES order; empty where the value names no site and the molecule has one. */
  readonly atoms: readonly number[];
  readonly scale: ScaleId;
  readonly source: string;
}
