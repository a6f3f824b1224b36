/**
 * The range of acidity that a solvent allows, on its own scale and on the absolute one.
 *
 * Where the autoprotolysis or the proton's transfer energy is not known, an end is estimated from the solvent's own
 * couples: the pKa in water of its protonated form, and its own pKa on the scale it borrows; such an end says so.
 * Knows: rows of solvents, constants.  Must not know: flasks, text.
 * Units: pH on the solvent's own scale; absolute pH counted from the standard proton in water (pH_abs − pH_abs(H+, water, 1 M)).
 * Source: D. Himmel, S. K. Goll, I. Leito, I. Krossing, Angew. Chem. Int. Ed. 2010, 49, 6885.
 * Invariant: the absolute window is as wide as the own one.   (tests/flask/shares.test.ts, tests/flask/window.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Constant } from '../chemistry/couple.ts';
import { perceive } from '../chemistry/perceive.ts';
import type { SolventRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import type { ConstantsIn } from './state.ts';

export interface SolventWindow {
  /** From 1 M lyonium to 1 M lyate; null without an autoprotolysis constant. */
  readonly own: { readonly low: number; readonly high: number } | null;
  /** The same against water; null without a transfer energy of the proton. */
  readonly absolute: { readonly low: number; readonly high: number; readonly sd: number } | null;
}

/** One end of a window on the absolute scale. */
export interface WindowEnd {
  readonly value: number;
  readonly sd: number;
  readonly estimated: boolean;
}

/** A window on the absolute scale; an end is null where nothing bounds it within reach of the rules. */
export interface PlacedWindow {
  readonly low: WindowEnd | null;
  readonly high: WindowEnd | null;
}

/** kJ/mol for one unit of pH at 25 °C. */
export const KJ_PER_UNIT = 8.314462618e-3 * 298.15 * Math.LN10;

/** By how much estimated low ends miss those from transfer energies (tests/flask/window.test.ts). */
const ESTIMATE_SD = 3;
const WATER = 'water';
/** The scale on which carbon acids are best known. */
const DMSO = 'DMSO';
/** Scales that are named otherwise than their solvent. */
const SOLVENT_OF_SCALE: Readonly<Record<string, string>> = { tBuOH: 't-BuOH' };
const GRAMS_PER_LITRE = 1000;

/** The window of a solvent. */
export function solventWindow({ pKs, protonTransferEnergy, transferSd }: SolventRow): SolventWindow {
  if (pKs === null) return { own: null, absolute: null };
  const own = { low: 0, high: pKs };
  if (protonTransferEnergy === null) return { own, absolute: null };
  // A proton that is less at home than in water (positive transfer energy) is the more acidic: its pH counts lower.
  const shift = -protonTransferEnergy / KJ_PER_UNIT;
  const sd = (transferSd ?? 0) / KJ_PER_UNIT;
  return { own, absolute: { low: own.low + shift, high: own.high + shift, sd } };
}

/** Where a solvent lies on the absolute scale, its ends estimated where they are not known. */
export function placedWindow(
  solvent: SolventRow,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): PlacedWindow {
  const low = lowEnd(solvent, tables, constantsIn);
  const { pKs, ownCoupleSd } = solvent;
  if (pKs === null) return { low, high: highEnd(solvent, tables, constantsIn) };
  if (low === null) return { low, high: null };
  return { low, high: { ...low, value: low.value + pKs, sd: Math.hypot(low.sd, ownCoupleSd ?? 0) } };
}

/** 1 M of the protonated solvent. */
function lowEnd(solvent: SolventRow, tables: Tables, constantsIn: ConstantsIn): WindowEnd | null {
  const { protonTransferEnergy, transferSd } = solvent;
  if (protonTransferEnergy !== null) {
    const value = protonTransferEnergy === 0 ? 0 : -protonTransferEnergy / KJ_PER_UNIT;
    return { value, sd: (transferSd ?? 0) / KJ_PER_UNIT, estimated: false };
  }
  const base = ownConstant(solvent, WATER, 'base', tables, constantsIn);
  if (base === null) return null;
  return {
    value: base.value + molarity(solvent, tables),
    sd: Math.hypot(base.sd, ESTIMATE_SD),
    estimated: true,
  };
}

/** 1 M of the deprotonated solvent, from its own pKa on the scale it borrows. */
function highEnd(solvent: SolventRow, tables: Tables, constantsIn: ConstantsIn): WindowEnd | null {
  const scale = solvent.protic ? solvent.scale : DMSO;
  const acid = ownConstant(solvent, scale, 'acid', tables, constantsIn);
  const home = tables.solvents.find(({ name }) => name === (SOLVENT_OF_SCALE[scale] ?? scale));
  const zero = home === undefined ? null : lowEnd(home, tables, constantsIn);
  if (acid === null || zero === null) return null;
  const value = solvent.protic ? acid.value : (solvent.lyatePKa ?? acid.value);
  const sd = solvent.protic ? acid.sd : (solvent.ownCoupleSd ?? acid.sd);
  return {
    value: value - molarity(solvent, tables) + zero.value,
    sd: Math.hypot(sd, zero.sd, ESTIMATE_SD),
    estimated: true,
  };
}

/** The constant of the most basic (acidic) site of the solvent. */
function ownConstant(
  { smiles }: SolventRow,
  scale: string,
  kind: 'acid' | 'base',
  tables: Tables,
  constantsIn: ConstantsIn,
): Constant | null {
  const molecule = perceive(smiles, tables);
  const { couples } = constantsIn(molecule, scale, tables);
  const own = molecule.couples.flatMap((couple, place) => {
    const constant = couples[place];
    return couple.kind === kind && constant != null ? [constant] : [];
  });
  const isBetter = (a: Constant, b: Constant) => (kind === 'base' ? b.value < a.value : a.value < b.value);
  return own.reduce<Constant | null>(
    (best, one) => (best === null || isBetter(one, best) ? one : best),
    null,
  );
}

/** log10 of mol/L of the neat solvent. */
function molarity({ density, smiles }: SolventRow, tables: Tables): number {
  const { molarMass } = perceive(smiles, tables);
  return density === null || molarMass === null ? 1 : Math.log10((GRAMS_PER_LITRE * density) / molarMass);
}
