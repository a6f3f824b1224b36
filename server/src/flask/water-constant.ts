/**
 * The ionic product of water over temperature and density.
 *
 * Knows: temperature, density.  Must not know: flasks, structures, text, the protocol.
 * Units: kelvin, degrees Celsius where named so, kg per cubic metre; pKw on the molal scale.
 * Accuracy: within 0.01 of tabulated pKw from 0 to 100 °C.               (tests/published/water-constant.test.ts)
 * Sources: IAPWS R11-07 for pKw; G. S. Kell, J. Chem. Eng. Data 1975, 20, 97, for the density of liquid water.
 */

const COORDINATION = 6;
const MOLAR_MASS = 18.015268;
const ALPHA = [-0.864671, 8659.19, -22786.2] as const;
const BETA = [0.642044, -56.8534, -0.375754] as const;
const GAMMA = [0.61415, 48251.33, -67706.93, 10102100] as const;
const ZERO_CELSIUS = 273.15;

/** pKw by IAPWS release R11-07; density in g/cm³ inside the formula, kg/m³ outside. */
export function pKwAt(temperature: number, density: number): number {
  const rho = density / 1000;
  const association =
    rho * Math.exp(ALPHA[0] + ALPHA[1] / temperature + (ALPHA[2] / temperature ** 2) * rho ** (2 / 3));
  const bound = (association / (1 + association)) * rho * (BETA[0] + BETA[1] / temperature + BETA[2] * rho);
  const idealGas =
    GAMMA[0] + GAMMA[1] / temperature + GAMMA[2] / temperature ** 2 + GAMMA[3] / temperature ** 3;
  const scale = 2 * Math.log10(MOLAR_MASS / 1000);
  return -2 * COORDINATION * (Math.log10(1 + association) - bound) + idealGas + scale;
}

/** Density of air-free liquid water at 1 atm from 0 to 100 °C, kg/m³ (Kell 1975). */
export function waterDensity(celsius: number): number {
  const t = celsius;
  const above =
    999.83952 +
    16.945176 * t -
    7.9870401e-3 * t ** 2 -
    46.170461e-6 * t ** 3 +
    105.56302e-9 * t ** 4 -
    280.54253e-12 * t ** 5;
  return above / (1 + 16.87985e-3 * t);
}

/** pKw of liquid water at 1 atm; 0 to 100 °C. */
export function pKwOfLiquid(celsius: number): number {
  return pKwAt(celsius + ZERO_CELSIUS, waterDensity(celsius));
}
