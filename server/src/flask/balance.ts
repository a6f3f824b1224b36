/**
 * Solves the proton balance of one aqueous flask: where the protons sit when everything has come to rest.
 *
 * Knows: stepwise constants and amounts.  Must not know: structures, names, text, the protocol.
 * Units: mol per litre; constants and pH are decimal logarithms at one temperature.
 * Invariants:
 *  1. The protons bound fall monotonically with pH, so bisection always converges.   (tests/flask/balance.test.ts)
 *  2. Nothing is remembered between calls: the same input gives the same bits.        (same)
 * Absent on purpose: activities, gases, second phases.
 */

/** An acid of one or more steps, with the protons it brought along. */
export interface Polyprotic {
  /** Stepwise pKa values in the order in which the protons leave, lowest first. */
  readonly pKa: readonly number[];
  /** Total concentration of all its forms, mol/L. */
  readonly concentration: number;
  /** Protons held by the form that was charged: 0 for the bare base, `pKa.length` for the full acid. */
  readonly protonsCharged: number;
}

export interface Balance {
  readonly pH: number;
  /** Protons counted minus protons charged at the answer, mol/L. */
  readonly residual: number;
}

/** Concentration of pure water at 25 °C, mol/L (997.05 g/L over 18.015 g/mol). */
export const WATER_MOLARITY = 55.34;

const LOWEST_PH = -3;
const HIGHEST_PH = 18;
const HALVINGS = 80;

/**
 * Mean number of protons held by an acid at a pH, from its binding polynomial.
 *
 * Works with logarithms relative to the largest term, so that no constant over- or underflows.
 */
export function meanProtons(pKa: readonly number[], pH: number): number {
  const logTerms = [0];
  for (let held = 1; held <= pKa.length; held++) {
    // The step that gives up the held-th proton is counted from the bare base upwards.
    logTerms.push(logTerms[held - 1]! + pKa[pKa.length - held]! - pH);
  }
  const largest = Math.max(...logTerms);
  let weight = 0;
  let protons = 0;
  logTerms.forEach((logTerm, held) => {
    const term = 10 ** (logTerm - largest);
    weight += term;
    protons += held * term;
  });
  return protons / weight;
}

/**
 * The pH at which the protons held by all couples and by water equal the protons charged.
 *
 * @param couples  what is dissolved; fully dissociated acids and hydroxides go into `strong`
 * @param strong   strong acid minus strong base, mol/L
 * @param pKw      ionic product of water at the flask's temperature
 */
export function solveBalance(couples: readonly Polyprotic[], strong: number, pKw: number): Balance {
  const excess = (pH: number) => {
    let protons = 10 ** -pH - 10 ** (pH - pKw) - strong;
    for (const { pKa, concentration, protonsCharged } of couples) {
      protons += concentration * (meanProtons(pKa, pH) - protonsCharged);
    }
    return protons;
  };
  let low = LOWEST_PH;
  let high = HIGHEST_PH;
  for (let halving = 0; halving < HALVINGS; halving++) {
    const middle = (low + high) / 2;
    if (excess(middle) < 0) high = middle;
    else low = middle;
  }
  const pH = (low + high) / 2;
  return { pH, residual: excess(pH) };
}

/** pKa of water as an acid in its own solvent: the ionic product over the molarity of water. */
export function pKaOfWater(pKw: number): number {
  return pKw + Math.log10(WATER_MOLARITY);
}
