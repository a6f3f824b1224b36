/**
 * Activity coefficients of ions in water, and what they do to stepwise constants.
 *
 * Knows: charges and ionic strength.  Must not know: structures, names, text, the protocol.
 * Units: ionic strength in mol per litre; kelvin.
 * Accuracy: the Davies equation holds to about I = 0.5 M; beyond, the coefficient of 0.5 M is kept and constants get
 * `EXTRA_SD` for each decade.
 * Sources: C. W. Davies, Ion Association (Butterworths, London 1962), for the form and the factor 0.3; the slope's
 * temperature dependence follows from (εT)^−3/2 with ε of water after C. G. Malmberg, A. A. Maryott,
 * J. Res. Natl. Bur. Stand. 1956, 56, 1.
 */

/** Debye–Hückel slope for log10 γ in water at 25 °C. */
const SLOPE = 0.509;
const LINEAR_FACTOR = 0.3;
const ROOM = 298.15;
const ZERO_CELSIUS = 273.15;
export const HIGHEST_IONIC_STRENGTH = 0.5;
/** Added to the sd of a constant for each factor of ten that the ionic strength lies above the highest. */
const EXTRA_SD = 0.3;

/** log10 of the activity coefficient of an ion (Davies). */
export function logActivityCoefficient(charge: number, ionicStrength: number, temperature = ROOM): number {
  const root = Math.sqrt(Math.min(ionicStrength, HIGHEST_IONIC_STRENGTH));
  return -slopeAt(temperature) * charge ** 2 * (root / (1 + root) - LINEAR_FACTOR * root ** 2);
}

/**
 * The stepwise constants that hold between a pH (an activity) and concentrations of the forms.
 *
 * @param pKa          thermodynamic constants, lowest first
 * @param fullCharge   charge of the form that holds every proton
 */
export function mixedConstants(
  pKa: readonly number[],
  fullCharge: number,
  ionicStrength: number,
  temperature = ROOM,
): number[] {
  return pKa.map((value, step) => {
    const acid = logActivityCoefficient(fullCharge - step, ionicStrength, temperature);
    const base = logActivityCoefficient(fullCharge - step - 1, ionicStrength, temperature);
    return value + base - acid;
  });
}

/** What the sd of a constant grows by, in variance, where the equation is stretched beyond its range. */
export function activityVariance(ionicStrength: number): number {
  const decades = Math.log10(ionicStrength / HIGHEST_IONIC_STRENGTH);
  return decades <= 0 || Number.isNaN(decades) ? 0 : (EXTRA_SD * decades) ** 2;
}

function slopeAt(temperature: number): number {
  const t = Math.min(Math.max(temperature, ZERO_CELSIUS), 373.15);
  return SLOPE * ((permittivity(ROOM) * ROOM) / (permittivity(t) * t)) ** 1.5;
}

/** Relative permittivity of water (Malmberg and Maryott 1956). */
function permittivity(temperature: number): number {
  const t = temperature - ZERO_CELSIUS;
  return 87.74 - 0.40008 * t + 9.398e-4 * t ** 2 - 1.41e-6 * t ** 3;
}
