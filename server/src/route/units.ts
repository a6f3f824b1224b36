/**
 * Numbers and units: what a writer's text measures, in the units the program works with.
 *
 * Units: mol, litre, gram, kelvin, mol/L, g/L; shares and equivalents are plain numbers, percents divided by 100.
 * Knows: text.  Must not know: names, structures.
 * Absent on purpose: pressures, times and energies are no amounts and come back as `other`.
 */
import { create, type FactoryFunctionMap, unitDependencies } from 'mathjs';
import { boundedCache } from '../tables/cache.ts';

export type Dimension =
  | 'substance'
  | 'mass'
  | 'volume'
  | 'equiv'
  | 'mol-share'
  /** mL for each gram of the reference compound. */
  | 'relative-volume'
  | 'molarity'
  | 'mass-share'
  | 'mass-concentration'
  | 'temperature'
  | 'percent'
  | 'other';

export interface Quantity {
  readonly dimension: Dimension;
  /** In the program's unit. */
  readonly value: number;
}

interface UnitMeaning {
  readonly dimension: Dimension;
  readonly factor: number;
  readonly offset: number;
}

const OWN_UNITS: Readonly<Record<string, readonly [Dimension, number]>> = {
  equiv: ['equiv', 1],
  'equiv.': ['equiv', 1],
  equivs: ['equiv', 1],
  eq: ['equiv', 1],
  'eq.': ['equiv', 1],
  'mol%': ['mol-share', 0.01],
  vol: ['relative-volume', 1],
  vols: ['relative-volume', 1],
  'mL/g': ['relative-volume', 1],
  'L/kg': ['relative-volume', 1],
  M: ['molarity', 1],
  mM: ['molarity', 1e-3],
  'wt%': ['mass-share', 0.01],
  '%': ['percent', 0.01],
};
/** Longest text that is tried as a unit. */
const LONGEST_UNIT = 16;
/** A cubic metre in litres: compound units come back in base units. */
const LITRES = 1e3;
const NUMBER = /^[+\-−]?(?:\d+\.?\d*|\.\d+)(?:[eE][+\-−]?\d+)?$/;
const LEADING_NUMBER = /^[+\-−]?(?:\d+\.?\d*|\.\d+)(?:[eE][+\-−]?\d+)?/;

const meanings = boundedCache<string, UnitMeaning | 'unknown'>(2000);
let math: Pick<ReturnType<typeof create>, 'unit'> | undefined;

/** Value of a decimal number as written, with either minus; NaN where the text is none. May be infinite. */
export function numberOf(text: string): number {
  return NUMBER.test(text) ? Number(text.replaceAll('−', '-')) : Number.NaN;
}

/** Length of the number that a word begins with; 0 where it begins with none. */
export function leadingNumber(word: string): number {
  return LEADING_NUMBER.exec(word)?.[0].length ?? 0;
}

/** What one unit measures; null for text that is no unit. */
export function dimensionOf(unit: string): Dimension | null {
  return meaningOf(unit)?.dimension ?? null;
}

/** A number with its unit; null for text that is no unit. */
export function quantityOf(value: number, unit: string): Quantity | null {
  const meaning = meaningOf(unit);
  if (meaning === null) return null;
  return { dimension: meaning.dimension, value: tidy(value * meaning.factor + meaning.offset) };
}

/** Rounds away what only binary fractions brought in, so that 5 mmol is 0.005 mol. */
function tidy(value: number): number {
  return Number.isFinite(value) ? Number(value.toPrecision(14)) : value;
}

function meaningOf(unit: string): UnitMeaning | null {
  const known = meanings.get(unit);
  if (known !== undefined) return known === 'unknown' ? null : known;
  const meaning = ownMeaning(unit) ?? physicalMeaning(unit);
  meanings.set(unit, meaning ?? 'unknown');
  return meaning;
}

function ownMeaning(unit: string): UnitMeaning | null {
  const own = Object.hasOwn(OWN_UNITS, unit) ? OWN_UNITS[unit] : undefined;
  return own === undefined ? null : { dimension: own[0], factor: own[1], offset: 0 };
}

function physicalMeaning(unit: string): UnitMeaning | null {
  const plain = unit.replace(/[µμ]/g, 'u').replace(/°/g, 'deg');
  if (LONGEST_UNIT < plain.length || !/^[A-Za-z][A-Za-z0-9/^]*$/.test(plain)) return null;
  math ??= create(unitDependencies as FactoryFunctionMap);
  try {
    const one = math.unit(1, plain);
    const [mass, length, time, current, temperature, , substance] = dimensionsOf(one);
    const pure = time === 0 && current === 0;
    const is = (m: number, l: number, n: number) => pure && mass === m && length === l && substance === n;
    const scaled = (dimension: Dimension, base: string, to: number): UnitMeaning => ({
      dimension,
      factor: tidy(one.toNumber(base) * to),
      offset: 0,
    });
    const other: UnitMeaning = { dimension: 'other', factor: 1, offset: 0 };
    if (temperature === 1 && is(0, 0, 0)) {
      const offset = math.unit(0, plain).toNumber('K');
      return { dimension: 'temperature', factor: one.toNumber('K') - offset, offset };
    }
    if (temperature !== 0) return other;
    if (is(1, 0, 0)) return scaled('mass', 'g', 1);
    if (is(0, 3, 0)) return scaled('volume', 'L', 1);
    if (is(0, 0, 1)) return scaled('substance', 'mol', 1);
    if (is(0, -3, 1)) return scaled('molarity', 'mol/m^3', 1 / LITRES);
    if (is(1, -3, 0)) return scaled('mass-concentration', 'g/m^3', 1 / LITRES);
    return other;
  } catch {
    return null;
  }
}

/** mathjs keeps powers in the order mass, length, time, current, temperature, luminosity, substance, angle, bits. */
function dimensionsOf(unit: unknown): readonly number[] {
  return (unit as { dimensions: readonly number[] }).dimensions;
}
