/**
 * What a structure is once it has been read: atoms and bonds in the order of the text.
 *
 * Knows: nothing but its own shape.  Must not know: acidity, names, files.
 * Offsets are UTF-16 code units, half-open.
 */

export interface Span {
  readonly start: number;
  readonly end: number;
}

export interface Atom {
  /** Position in the text's order of atoms, from 0. */
  readonly index: number;
  readonly element: string;
  /** Written in lower case. */
  readonly aromatic: boolean;
  readonly isotope: number;
  readonly charge: number;
  /** Hydrogens written inside the bracket; undefined where the element's usual valence decides. */
  readonly writtenHydrogens: number | undefined;
  /** The label that a plan uses to name a site; 0 where there is none. */
  readonly mapNumber: number;
  readonly span: Span;
}

export type BondSymbol = '-' | '=' | '#' | '$' | ':' | '/' | '\\';

export interface Bond {
  readonly from: number;
  readonly to: number;
  /** Undefined where the text leaves the bond to be understood. */
  readonly symbol: BondSymbol | undefined;
  readonly span: Span;
}

export interface Structure {
  readonly atoms: readonly Atom[];
  readonly bonds: readonly Bond[];
}
