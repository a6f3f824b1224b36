/**
 * Brings constants that hold at 25 °C to the temperature of the flask.
 *
 * Knows: rows of `enthalpies`.  Must not know: activities, text.
 * Units: kelvin, kJ/mol.  Accuracy: van 't Hoff, with the change of heat capacity where it is tabulated; without it good to
 * some 20 K from 25 °C. The sd grows with the distance.
 * Source of the form: E. C. W. Clarke, D. N. Glew, Trans. Faraday Soc. 1966, 62, 539.
 */
import type { Constant, Couple } from '../chemistry/couple.ts';
import type { EnthalpyRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';

const GAS_CONSTANT = 8.314462618e-3;
const ROOM = 298.15;
/** Values hold for the room, whose few degrees nobody writes down. */
const ROOM_WIDTH = 0.5;

/** The constant of one step in water at a temperature; unchanged where no enthalpy is tabulated. */
export function atTemperature(
  constant: Constant,
  couple: Couple,
  step: number,
  temperature: number,
  tables: Tables,
): Constant {
  if (Math.abs(temperature - ROOM) < ROOM_WIDTH) return constant;
  const row = enthalpyOf(couple, step, tables);
  if (row === null) return constant;
  const factor = (1 / temperature - 1 / ROOM) / (GAS_CONSTANT * Math.LN10);
  const ratio = ROOM / temperature;
  const curvature = ((row.heatCapacity ?? 0) * (ratio - 1 - Math.log(ratio))) / (GAS_CONSTANT * Math.LN10);
  const value = constant.value + row.enthalpy * factor - curvature;
  const sd = Math.hypot(constant.sd, row.sd * factor);
  const what = `at ${(temperature - 273.15).toFixed(0)} °C (enthalpy ${row.enthalpy} kJ/mol)`;
  return { ...constant, value, sd, hops: [...constant.hops, { what, value, sd, sources: row.sources }] };
}

/** The enthalpy of giving up one proton in water, kJ/mol; null where the table has none. */
export function enthalpyOf(couple: Couple, step: number, tables: Tables): EnthalpyRow | null {
  const fits = (row: EnthalpyRow) =>
    row.kind === couple.kind &&
    (row.step === null || row.step === step) &&
    (row.groups.includes(couple.group) || row.families.includes(couple.family));
  return tables.enthalpies.find(fits) ?? null;
}
