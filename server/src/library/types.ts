/**
 * What the library gives and takes, said without a word from elsewhere: the build hands this file out as its types.
 *
 * Units: SI, but mol and litre; pH on the medium's own scale.  Lines and UTF-16 characters count from 0.
 */

export type Severity = 'error' | 'warning' | 'information' | 'hint';

export interface Position {
  readonly line: number;
  readonly character: number;
}

export interface Range {
  readonly start: Position;
  readonly end: Position;
}

export interface Finding {
  readonly check: string;
  readonly severity: Severity;
  /** How sure, 0 … 1; severity says how bad. */
  readonly confidence: number;
  /** Label of the step; null outside steps. */
  readonly step: string | null;
  readonly range: Range;
  readonly message: string;
  readonly figures: Readonly<Record<string, number | null>>;
  readonly related: readonly { readonly range: Range; readonly message: string; readonly file?: string }[];
  readonly accepted: boolean;
  readonly reason: string | null;
}

export interface FlaskState {
  readonly line: number;
  readonly scale: string;
  readonly temperature: number;
  /** Null where it has no meaning. */
  readonly pH: number | null;
  readonly ionicStrength: number | null;
  readonly volume: number;
  readonly couples: readonly {
    readonly name: string;
    /** From 0, in the order of the SMILES. */
    readonly atom: number;
    readonly group: string;
    readonly pKa: number;
    readonly sd: number;
    readonly amount: number;
    /** Share that holds its proton, 0 … 1. */
    readonly protonated: number;
  }[];
  readonly gases: readonly { readonly name: string; readonly mol: number }[];
  /** What the proton balance leaves open. */
  readonly residual: number;
}

export interface Options {
  /** Markdown holds plans in its fences; `lyate` where left out. */
  readonly language?: 'lyate' | 'markdown';
  /** Path of the plan, which `use` starts from; `plan.lyate` where left out. */
  readonly file?: string;
  /** Texts of the files that `use` may bring in, by path. */
  readonly files?: Readonly<Record<string, string>>;
  /** Severity by name of check. */
  readonly severities?: Readonly<Record<string, Severity | 'off'>>;
  /** How sure a failure must be before the analysis speaks, 0 … 1. */
  readonly thresholds?: { readonly error?: number; readonly warning?: number; readonly undecided?: number };
  /** mol/L where a step writes no volume; 0.2 where left out. */
  readonly concentration?: number;
}

export interface Analysis {
  /** In the order of the text. */
  readonly findings: readonly Finding[];
  /** Labels of the steps, in order. */
  readonly steps: readonly string[];
  /** Files that `use` names and `files` did not hold. */
  readonly needs: readonly string[];
  /** The flask of a step after each line that changes it; null where there is no such step. */
  flask(step: string): readonly FlaskState[] | null;
}

/**
 * Analyses a plan. Never throws for what a plan says; what is wrong with it is a finding.
 *
 * @throws TypeError where the text is no string
 */
export declare function analyse(text: string, options?: Options): Analysis;
