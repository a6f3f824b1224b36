/**
 * The shape of a line as read: every character in a leaf, and over the leaves what the statement says.
 *
 * Knows: nothing but its own shape.  Must not know: tables, structures, files.
 * Invariant: leaves joined in order give back the line.                          (tests/route/parse.test.ts)
 * Offsets are UTF-16 code units from the start of the line, half-open.
 */
import type { Span } from '../chemistry/molecule.ts';
import type { Quantity } from './units.ts';

export type LeafKind =
  | 'blank'
  | 'comment'
  | 'keyword'
  /** A small word inside a statement: in, into, at, to, yield … */
  | 'link'
  | 'name'
  /** The name after `compound` or `step`. */
  | 'definition'
  | 'string'
  | 'structure'
  | 'number'
  | 'unit'
  | 'operator'
  | 'site'
  /** A word with a fixed set of values: neutral, organic, excess, sat. … */
  | 'value'
  /** The name of a check after `accept`. */
  | 'check'
  | 'text';

export interface Leaf extends Span {
  readonly kind: LeafKind;
}

/** Something wrong with a line itself. */
export interface LineProblem extends Span {
  readonly check: string;
  readonly message: string;
}

export interface Word extends Span {
  readonly text: string;
}

/** A strength in front of a name: `1 M HCl`, `sat. NH4Cl`. */
export interface Strength extends Span {
  readonly quantity: Quantity | null;
  readonly saturated: boolean;
}

export interface NameNode extends Span {
  readonly kind: 'words' | 'string' | 'structure';
  /** Without quotes and angle brackets, escapes resolved. */
  readonly text: string;
  /** Of the text itself, without quotes and angle brackets. */
  readonly inner: Span;
  readonly words: readonly Word[];
  readonly strength: Strength | null;
}

export interface QuantityNode extends Span {
  readonly kind: 'quantity';
  readonly quantity: Quantity;
  readonly portions: number;
}
export interface QualifierNode extends Span {
  readonly kind: 'excess' | 'catalytic' | 'saturated';
}
export interface CarrierNode extends Span {
  readonly kind: 'carrier';
  readonly name: NameNode;
  readonly ratio: readonly number[] | null;
}
export type AmountNode = QuantityNode | QualifierNode | CarrierNode;

export interface SiteNode extends Span {
  readonly map: number;
}
export interface CountedName {
  readonly name: NameNode;
  readonly count: number;
}

export type Syntax =
  | { readonly keyword: 'plan'; readonly title: string }
  | { readonly keyword: 'use'; readonly path: string; readonly pathSpan: Span }
  | {
      readonly keyword: 'compound';
      readonly name: string;
      readonly nameSpan: Span;
      readonly smiles: string;
      readonly smilesSpan: Span;
    }
  | {
      readonly keyword: 'measured';
      readonly value: number;
      readonly sd: number | null;
      readonly sites: readonly SiteNode[];
      readonly medium: NameNode;
      readonly source: string;
    }
  | {
      readonly keyword: 'step';
      readonly label: string;
      readonly labelSpan: Span;
      readonly title: string | null;
      readonly continues: {
        readonly label: string;
        readonly span: Span;
        readonly layer: 'organic' | 'aqueous' | null;
      } | null;
    }
  | {
      readonly keyword: 'solvent';
      readonly name: NameNode;
      readonly ratio: readonly number[] | null;
      readonly amounts: readonly AmountNode[];
    }
  | {
      readonly keyword: 'charge' | 'base' | 'acid' | 'inert' | 'quench' | 'wash';
      readonly name: NameNode;
      readonly amounts: readonly AmountNode[];
    }
  | { readonly keyword: 'temperature'; readonly from: number | 'reflux'; readonly to: number | 'reflux' }
  | {
      readonly keyword: 'deprotonate' | 'protonate';
      readonly name: NameNode;
      readonly sites: readonly SiteNode[];
    }
  | {
      readonly keyword: 'convert';
      readonly from: readonly CountedName[];
      readonly to: readonly CountedName[];
      readonly yield: number | null;
    }
  | {
      readonly keyword: 'adjust';
      readonly pH: number;
      readonly pHSpan: Span;
      readonly name: NameNode;
      readonly amounts: readonly AmountNode[];
    }
  | {
      readonly keyword: 'extract';
      readonly name: NameNode;
      readonly into: NameNode;
      readonly amounts: readonly AmountNode[];
    }
  | {
      readonly keyword: 'keep';
      readonly name: NameNode;
      readonly layer: 'organic' | 'aqueous';
      readonly layerSpan: Span;
    }
  | {
      readonly keyword: 'isolate';
      readonly name: NameNode;
      readonly state: 'neutral' | 'salt' | 'anion' | 'cation' | 'zwitterion';
      readonly stateSpan: Span;
    }
  | {
      readonly keyword: 'accept';
      readonly check: string;
      readonly checkSpan: Span;
      readonly reason: string;
    }
  | { readonly keyword: 'note'; readonly text: string };

export interface LineTree {
  readonly text: string;
  readonly leaves: readonly Leaf[];
  /** Null for blank lines, comments and lines that could not be read. */
  readonly syntax: Syntax | null;
  /** The keyword's place; null where there is none. */
  readonly keyword: Span | null;
  /** From the keyword to the last thing said, without comment and blanks. */
  readonly span: Span;
  /** All names in the line, in order. */
  readonly names: readonly NameNode[];
  readonly problems: readonly LineProblem[];
}
