/**
 * A structure with everything that chemistry adds to its text: hydrogens, bond orders, rings and aromaticity.
 *
 * Knows: atoms and bonds.  Must not know: acidity, names, files.
 * Invariants: atoms keep the order of the text, explicit [H] atoms included.
 */
import type { Span } from './molecule.ts';

export interface GraphAtom {
  readonly index: number;
  readonly element: string;
  readonly number: number;
  readonly charge: number;
  readonly isotope: number;
  readonly mapNumber: number;
  /** Implicit and bracket hydrogens; explicit [H] neighbours are atoms of their own and not counted here. */
  readonly hydrogens: number;
  readonly aromatic: boolean;
  readonly bonds: readonly number[];
  readonly neighbours: readonly number[];
  readonly span: Span;
}

export interface GraphBond {
  readonly index: number;
  readonly from: number;
  readonly to: number;
  /** Order in one Kekulé form: 1, 2, 3 or 4. */
  readonly order: number;
  readonly aromatic: boolean;
  readonly inRing: boolean;
  readonly span: Span;
}

export interface Graph {
  readonly atoms: readonly GraphAtom[];
  readonly bonds: readonly GraphBond[];
  /** Smallest rings as lists of atom indices in ring order. */
  readonly rings: readonly (readonly number[])[];
  /** Atoms of each separate part, in order of their first atom. */
  readonly fragments: readonly (readonly number[])[];
}
