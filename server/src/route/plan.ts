/**
 * A plan once its names and amounts have been resolved: what the flask and the checks read.
 *
 * Knows: names, structures as text, amounts.  Must not know: acidity, flasks, checks, files.
 * Units: mol, litre, gram, kelvin.  Ranges are UTF-16; lines of a step are relative to the step's first line.
 */
import type { OwnValue } from '../chemistry/couple.ts';
import type { ReagentRow, SolventRow } from '../tables/rows.ts';
import type { RouteDocument } from './document.ts';

export interface Position {
  readonly line: number;
  readonly character: number;
}

export interface Range {
  readonly start: Position;
  readonly end: Position;
}

/** Something wrong with the text itself, found while reading or resolving. */
export interface TextProblem {
  readonly check: string;
  readonly range: Range;
  readonly message: string;
  readonly severity?: 'error' | 'warning' | 'information';
  readonly related?: readonly { readonly range: Range; readonly message: string; readonly file?: string }[];
}

/**
 * What a compound is, without its place: a step that uses it stays the same when lines are inserted above the definition.
 * Its place is that of the compound of the same name in `Plan.compounds`.
 */
export interface Definition {
  readonly name: string;
  readonly smiles: string;
  /** File it was defined in, as the host named it; the plan's own file where undefined. */
  readonly file: string | undefined;
  readonly measured: readonly OwnValue[];
}

export interface Compound extends Definition {
  /** Absolute ranges in that file. */
  readonly nameRange: Range;
  readonly smilesRange: Range;
}

/** What a name stands for. `unknown` still takes part as text. */
export interface Substance {
  readonly kind: 'compound' | 'reagent' | 'solvent' | 'structure' | 'unknown';
  /** As written. */
  readonly name: string;
  readonly smiles: string | null;
  readonly compound: Definition | null;
  readonly reagent: ReagentRow | null;
  readonly solvent: SolventRow | null;
  readonly range: Range;
  /** The SMILES text of `<…>` in the step itself, to map atom spans to ranges; null for all else. */
  readonly structureRange: Range | null;
}

export interface Amount {
  /** Null only where nothing could be worked out. */
  readonly mol: number | null;
  /** Relative to the reference compound. */
  readonly equiv: number | null;
  /** L of the liquid or solution as added, all portions together. */
  readonly volume: number | null;
  /** g of the substance itself. */
  readonly mass: number | null;
  readonly portions: number;
  readonly qualifier: 'excess' | 'catalytic' | null;
  /** True where nothing was written and 1 equiv, 0.2 M or the like was assumed. */
  readonly assumed: boolean;
  readonly carriers: readonly { readonly solvent: Substance; readonly volume: number | null }[];
  readonly range: Range | null;
}

export interface MixturePart {
  readonly substance: Substance;
  /** Share of the volume, adding up to 1. */
  readonly share: number;
}

interface Line {
  readonly range: Range;
  readonly keywordRange: Range;
}

export interface SolventStatement extends Line {
  readonly keyword: 'solvent';
  readonly parts: readonly MixturePart[];
  readonly amount: Amount;
}
export interface AddStatement extends Line {
  readonly keyword: 'charge' | 'base' | 'acid' | 'inert' | 'quench';
  readonly substance: Substance;
  readonly amount: Amount;
}
export interface TemperatureStatement extends Line {
  readonly keyword: 'temperature';
  /** K. */
  readonly from: number | 'reflux';
  readonly to: number | 'reflux';
}
export interface TransferStatement extends Line {
  readonly keyword: 'deprotonate' | 'protonate';
  readonly substance: Substance;
  /** Map numbers as written, with the atoms (SMILES order) they name. */
  readonly sites: readonly {
    readonly map: number;
    readonly atoms: readonly number[];
    readonly range: Range;
  }[];
}
export interface ConvertStatement extends Line {
  readonly keyword: 'convert';
  readonly from: readonly { readonly substance: Substance; readonly count: number }[];
  readonly to: readonly { readonly substance: Substance; readonly count: number }[];
  /** Share of 1; null where not written. */
  readonly yield: number | null;
}
export interface AdjustStatement extends Line {
  readonly keyword: 'adjust';
  readonly pH: number;
  readonly pHRange: Range;
  readonly substance: Substance;
  readonly amount: Amount;
}
export interface ExtractStatement extends Line {
  readonly keyword: 'extract';
  readonly substance: Substance;
  readonly into: Substance;
  readonly amount: Amount;
}
export interface WashStatement extends Line {
  readonly keyword: 'wash';
  readonly substance: Substance;
  readonly amount: Amount;
}
export interface KeepStatement extends Line {
  readonly keyword: 'keep';
  readonly substance: Substance;
  readonly layer: 'organic' | 'aqueous';
  readonly layerRange: Range;
}
export interface IsolateStatement extends Line {
  readonly keyword: 'isolate';
  readonly substance: Substance;
  readonly state: 'neutral' | 'salt' | 'anion' | 'cation' | 'zwitterion';
  readonly stateRange: Range;
}
export interface AcceptStatement extends Line {
  readonly keyword: 'accept';
  readonly check: string;
  readonly checkRange: Range;
  readonly reason: string;
}
export interface NoteStatement extends Line {
  readonly keyword: 'note';
  readonly text: string;
}

export type Statement =
  | SolventStatement
  | AddStatement
  | TemperatureStatement
  | TransferStatement
  | ConvertStatement
  | AdjustStatement
  | ExtractStatement
  | WashStatement
  | KeepStatement
  | IsolateStatement
  | AcceptStatement
  | NoteStatement;

export interface Step {
  readonly label: string;
  readonly title: string | null;
  /** Line of the document that holds the `step` keyword. */
  readonly firstLine: number;
  readonly lineCount: number;
  /** Of the `step` line, relative like all ranges below. */
  readonly range: Range;
  readonly labelRange: Range;
  readonly continues: {
    readonly label: string;
    readonly layer: 'organic' | 'aqueous' | null;
    readonly range: Range;
  } | null;
  readonly statements: readonly Statement[];
  /** The charged compound that `equiv` refers to. */
  readonly reference: Substance | null;
  /** mol of it; 0.001 where the step fixes none. */
  readonly referenceMol: number;
  /** Problems of this step's own lines, relative. */
  readonly problems: readonly TextProblem[];
  /** Equal for two steps exactly when text, definitions used and relative lines are equal. */
  readonly contentKey: string;
}

export interface Plan {
  readonly title: string | null;
  readonly compounds: readonly Compound[];
  readonly steps: readonly Step[];
  /** Before any step: hold for the whole file. */
  readonly accepts: readonly AcceptStatement[];
  /** Problems outside steps, absolute. */
  readonly problems: readonly TextProblem[];
  /** Files that `use` asks for and the host has not handed in yet. */
  readonly needs: readonly string[];
  /** The lines as read, for what needs the text itself: tokens, formatting, names and their places. */
  readonly document: RouteDocument;
}
