/**
 * What a check is handed: one step with its flask at every line, its transfers judged, its conversions balanced.
 *
 * Knows: plans and flasks.  Must not know: checks, findings, the protocol.
 * Invariants: everything here is a function of the step's resolved content, the state it goes on from, the tables and
 * the settings; ranges are relative to the step's first line.
 */
import type { Conversion } from '../flask/convert.ts';
import type { Contents, FlaskState, Ingredient, Verdict } from '../flask/state.ts';
import type { Titration } from '../flask/titrate.ts';
import type {
  AdjustStatement,
  ConvertStatement,
  Range,
  Statement,
  Step,
  Substance,
  TextProblem,
  TransferStatement,
} from '../route/plan.ts';
import type { Tables } from '../tables/tables.ts';
import type { Settings } from './settings.ts';

/** Who put an ingredient into the flask. */
export interface Addition {
  readonly ingredient: Ingredient;
  /** Null for what an earlier step left or a conversion made. */
  readonly statement: Statement | null;
  /** Where a finding about it points; the step's own line where it came from elsewhere. */
  readonly range: Range;
  readonly substance: Substance | null;
}

/** The flask right after one statement. */
export interface Moment {
  readonly statement: Statement;
  readonly contents: Contents;
  /** Solved on first asking. */
  readonly state: () => FlaskState;
}

export interface TransferFact {
  readonly statement: TransferStatement;
  readonly contents: Contents;
  /** One for each site the writer named, or one for the site that the flask takes. */
  readonly verdicts: readonly Verdict[];
  /** The conversion after it that uses up the anion, if any. */
  readonly convert: ConvertStatement | null;
  /** What the line names; null where it is not in the flask. */
  readonly ingredient: Ingredient | null;
}

export interface ConvertFact {
  readonly statement: ConvertStatement;
  /** As charged, before the conversion takes place. */
  readonly before: Contents;
  readonly conversion: Conversion;
}

export interface AdjustFact {
  readonly statement: AdjustStatement;
  readonly titration: Titration;
  /** L of the reagent at the strength that is written; null where none is. */
  readonly volume: number | null;
}

export interface StepFacts {
  readonly adjustments: readonly AdjustFact[];
  readonly step: Step;
  /** What the reader found wrong in the step's own lines. */
  readonly problems: readonly TextProblem[];
  readonly additions: readonly Addition[];
  readonly moments: readonly Moment[];
  readonly transfers: readonly TransferFact[];
  readonly conversions: readonly ConvertFact[];
  /** The flask that a later step may go on from. */
  readonly left: Contents;
  readonly tables: Tables;
  readonly settings: Settings;
}
