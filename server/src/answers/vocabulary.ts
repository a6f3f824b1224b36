/**
 * The words of the language with a line about each, for completion, hover and the colours of the editor.
 *
 * Knows: words.  Must not know: trees, plans, the protocol.
 * Invariant: every keyword of the reader and every terminal of GRAMMAR.md is here.   (tests/client/grammar.test.ts)
 */

export interface KeywordPage {
  /** What follows the keyword, as in the grammar of the language. */
  readonly form: string;
  readonly text: string;
  /** Where the statement may stand. */
  readonly place: 'file' | 'step' | 'both';
}

/** What each keyword says. */
export const KEYWORD_PAGES: Readonly<Record<string, KeywordPage>> = {
  plan: { form: 'plan "TITLE"', text: 'The title of the plan.', place: 'file' },
  use: {
    form: 'use "FILE"',
    text: 'Brings in the compounds of another file, with their measured values.',
    place: 'file',
  },
  compound: {
    form: 'compound NAME = SMILES',
    text: 'Declares a compound; atom maps such as [CH2:1] name its sites.',
    place: 'file',
  },
  measured: {
    form: 'measured pKa V ± SD at :1 in SOLVENT source "SOURCE"',
    text: 'A value of your own for the compound above; it beats every table.',
    place: 'file',
  },
  step: {
    form: 'step LABEL "TITLE"',
    text: 'Opens a step in an empty flask, or with “continues LABEL organic” in the one that another step left.',
    place: 'both',
  },
  solvent: {
    form: 'solvent NAME AMOUNT',
    text: 'A solvent, or a mixture by volume such as THF/water 3:1.',
    place: 'step',
  },
  charge: { form: 'charge NAME AMOUNT', text: 'Adds a compound or a reagent.', place: 'step' },
  base: { form: 'base NAME AMOUNT', text: 'Adds what is meant to act as a base.', place: 'step' },
  acid: { form: 'acid NAME AMOUNT', text: 'Adds what is meant to act as an acid.', place: 'step' },
  inert: {
    form: 'inert NAME AMOUNT',
    text: 'Adds a catalyst, drying agent or additive that takes no part.',
    place: 'step',
  },
  temperature: {
    form: 'temperature T °C to T °C',
    text: 'The temperature from this line on.',
    place: 'step',
  },
  rt: { form: 'rt', text: 'Room temperature, 25 °C, from this line on.', place: 'step' },
  reflux: { form: 'reflux', text: 'The boiling point of the solvent, from this line on.', place: 'step' },
  deprotonate: {
    form: 'deprotonate NAME at :1',
    text: 'The proton that is meant to leave; the flask as charged so far is judged here.',
    place: 'step',
  },
  protonate: {
    form: 'protonate NAME at :1',
    text: 'The site that is meant to take a proton; the flask as charged so far is judged here.',
    place: 'step',
  },
  convert: {
    form: 'convert A + B to C yield Y %',
    text: 'The reaction that is meant to happen.',
    place: 'step',
  },
  quench: { form: 'quench NAME AMOUNT', text: 'The addition that ends the reaction.', place: 'step' },
  adjust: {
    form: 'adjust pH V with NAME',
    text: 'Brings the aqueous phase to a pH; the amount that takes is worked out.',
    place: 'step',
  },
  extract: {
    form: 'extract NAME into SOLVENT n x V',
    text: 'Takes a compound into another layer.',
    place: 'step',
  },
  wash: { form: 'wash NAME AMOUNT', text: 'Washes the layer that is kept.', place: 'step' },
  keep: {
    form: 'keep NAME in organic',
    text: 'Says which layer a compound is meant to stay in.',
    place: 'step',
  },
  isolate: {
    form: 'isolate NAME as neutral',
    text: 'The state of charge that you expect to hold in hand.',
    place: 'step',
  },
  accept: {
    form: 'accept CHECK "REASON"',
    text: 'Accepts what one check says about the step, or about the file where it stands before all steps.',
    place: 'both',
  },
  note: { form: 'note "TEXT"', text: 'A remark that goes into the report.', place: 'both' },
};

/** Small words inside a statement. */
export const LINKS = [
  'pKa',
  'pH',
  'in',
  'into',
  'at',
  'as',
  'to',
  'of',
  'with',
  'yield',
  'source',
  'continues',
] as const;
export const LAYERS = ['organic', 'aqueous'] as const;
export const STATES = ['neutral', 'salt', 'anion', 'cation', 'zwitterion'] as const;
export const QUALIFIERS = ['excess', 'catalytic', 'cat.'] as const;
export const STRENGTHS = [
  'sat.',
  'sat',
  'saturated',
  'conc.',
  'conc',
  'concentrated',
  'aq.',
  'aq',
  'aqueous',
] as const;

/** Units of amounts with a word about each; the reader knows more, these are offered. */
export const UNITS: Readonly<Record<string, string>> = {
  equiv: 'mol for each mol of the first compound charged',
  mmol: 'amount of substance',
  mol: 'amount of substance',
  µmol: 'amount of substance',
  mg: 'mass',
  g: 'mass',
  kg: 'mass',
  mL: 'volume',
  µL: 'volume',
  L: 'volume',
  'mol%': 'share of the first compound charged',
  vol: 'mL for each g of the first compound charged',
  M: 'strength, mol/L',
  'wt%': 'strength by mass',
};
/** Further spellings of units that are coloured and not offered. */
export const UNIT_SPELLINGS = ['eq', 'uL', 'mL/g', 'mM', 'mol/L', 'g/L', '%', '°C', 'degC', 'K'] as const;
