/**
 * Solves a proton balance: where the protons sit when everything has come to rest.
 *
 * Knows: stepwise constants and amounts.  Must not know: structures, names, text, the protocol.
 * Units: mol; constants and pH are decimal logarithms on one scale.
 * Invariants:
 *  1. The protons bound fall monotonically with pH, so bisection always converges.   (tests/flask/balance.test.ts)
 *  2. Nothing is remembered between calls: the same input gives the same bits.        (same)
 * Absent on purpose: activities, what a constant means.
 */
import { fallingRoot } from './numbers.ts';

/** An acid of one or more steps, with the protons it brought along. */
export interface Polyprotic {
  /** Stepwise pKa values in the order in which the protons leave, lowest first. */
  readonly pKa: readonly number[];
  /** mol of all its forms. */
  readonly amount: number;
  /** Protons held by the form that was charged: 0 for the bare base, `pKa.length` for the full acid. */
  readonly protonsCharged: number;
  /** A form that leaves once more of it is there than the liquid holds. */
  readonly gas?: { readonly protons: number; readonly most: number } | null;
}

export interface Balance {
  readonly pH: number;
  /** Protons counted minus protons charged at the answer, mol. */
  readonly residual: number;
  /** mol of each acid that left as gas. */
  readonly left: readonly number[];
}

export const LOWEST_PH = -20;
export const HIGHEST_PH = 70;
/** Concentration of pure water at 25 °C, mol/L (997.05 g/L over 18.015 g/mol). */
export const WATER_MOLARITY = 55.34;

/**
 * Shares of the forms with 0, 1, … all protons at a pH, from the binding polynomial.
 *
 * Works with logarithms relative to the largest term, so that no constant over- or underflows.
 */
export function formShares(pKa: readonly number[], pH: number): number[] {
  const logTerms = [0];
  let largest = 0;
  for (let held = 1; held <= pKa.length; held++) {
    // The step that gives up the held-th proton is counted from the bare base upwards.
    const term = logTerms[held - 1]! + pKa[pKa.length - held]! - pH;
    logTerms.push(term);
    if (largest < term) largest = term;
  }
  let weight = 0;
  const shares = logTerms.map((term) => {
    const share = 10 ** (term - largest);
    weight += share;
    return share;
  });
  for (let held = 0; held < shares.length; held++) shares[held]! /= weight;
  return shares;
}

/** Mean number of protons held by an acid at a pH; the root finder lives on it, so it makes no arrays. */
export function meanProtons(pKa: readonly number[], pH: number): number {
  let term = 0;
  let largest = 0;
  for (let step = pKa.length - 1; 0 <= step; step--) {
    term += pKa[step]! - pH;
    if (largest < term) largest = term;
  }
  let weight = 10 ** -largest;
  let protons = 0;
  term = 0;
  for (let held = 1; held <= pKa.length; held++) {
    term += pKa[pKa.length - held]! - pH;
    const share = 10 ** (term - largest);
    weight += share;
    protons += held * share;
  }
  return protons / weight;
}

/** For each step, lowest first, the share of molecules in which its proton is still there. */
export function stepShares(pKa: readonly number[], pH: number): number[] {
  const shares = formShares(pKa, pH);
  const held: number[] = [];
  let above = 0;
  for (let protons = pKa.length; 0 < protons; protons--) {
    above += shares[protons]!;
    held.push(above);
  }
  return held;
}

/** mol of an acid that leaves as gas at a pH. */
export function gasLeft({ pKa, amount, gas }: Polyprotic, pH: number): number {
  if (gas === undefined || gas === null) return 0;
  const share = formShares(pKa, pH)[gas.protons] ?? 0;
  if (amount * share <= gas.most) return 0;
  return amount - gas.most / share;
}

/** Protons bound by all acids at a pH minus those charged, mol; falls with pH. */
export function protonExcess(acids: readonly Polyprotic[], pH: number): number {
  let protons = 0;
  for (const acid of acids) {
    const left = gasLeft(acid, pH);
    const dissolved = acid.amount - left;
    protons +=
      dissolved * meanProtons(acid.pKa, pH) +
      left * (acid.gas?.protons ?? 0) -
      acid.amount * acid.protonsCharged;
  }
  return protons;
}

/** The pH at which the protons held by all acids, less `withdrawn`, equal the protons charged. */
export function solveBalance(acids: readonly Polyprotic[], withdrawn = 0): Balance {
  const excess = (pH: number) => protonExcess(acids, pH) - withdrawn;
  const pH = fallingRoot(excess, LOWEST_PH, HIGHEST_PH);
  return { pH, residual: excess(pH), left: acids.map((acid) => gasLeft(acid, pH)) };
}

/** pKa of water as an acid in its own solvent: the ionic product over the molarity of water. */
export function pKaOfWater(pKw: number): number {
  return pKw + Math.log10(WATER_MOLARITY);
}

/** pKa of the hydronium ion in water on the same footing. */
export const PKA_OF_HYDRONIUM = -Math.log10(WATER_MOLARITY);
