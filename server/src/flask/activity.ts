/**
 * Activity coefficients of ions in water, and what they do to stepwise constants.
 *
 * Knows: charges and ionic strength.  Must not know: structures, names, text, the protocol.
 * Units: ionic strength in mol per litre; 25 °C.
 * Accuracy: the Davies equation holds to about I = 0.5 M; beyond, the coefficient of 0.5 M is kept.
 * Sources: C. W. Davies, Ion Association (Butterworths, London 1962), for the form and the factor 0.3.
 */

/** Debye–Hückel slope for log10 γ in water at 25 °C. */
const SLOPE = 0.509;
const LINEAR_FACTOR = 0.3;
export const HIGHEST_IONIC_STRENGTH = 0.5;

/** log10 of the activity coefficient of an ion (Davies). */
export function logActivityCoefficient(charge: number, ionicStrength: number): number {
  const root = Math.sqrt(Math.min(ionicStrength, HIGHEST_IONIC_STRENGTH));
  return -SLOPE * charge ** 2 * (root / (1 + root) - LINEAR_FACTOR * root ** 2);
}

/**
 * The stepwise constants that hold between a pH (an activity) and concentrations of the forms.
 *
 * @param pKa          thermodynamic constants, lowest first
 * @param fullCharge   charge of the form that holds every proton
 */
export function mixedConstants(pKa: readonly number[], fullCharge: number, ionicStrength: number): number[] {
  return pKa.map((value, step) => {
    const acid = logActivityCoefficient(fullCharge - step, ionicStrength);
    const base = logActivityCoefficient(fullCharge - step - 1, ionicStrength);
    return value + base - acid;
  });
}
