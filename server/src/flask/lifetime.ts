/**
 * How long a strong base lives in a solvent, between the temperatures at which that has been measured.
 *
 * Knows: rows of limits.  Must not know: flasks, text.
 * Units: °C, hours.
 * Invariant: at a measured temperature the measured half-life comes out; warmer never lives longer where the points say so.   (tests/flask/lifetime.test.ts)
 * Source of the form: the Arrhenius equation, ln of the half-life linear in 1/T between two points.
 */
import type { LimitRow } from '../tables/rows.ts';

export interface Lifetime {
  readonly hours: number;
  /** Colder or warmer than any point, by no more than `MOST_BEYOND`. */
  readonly isExtrapolated: boolean;
  readonly row: LimitRow;
}

/** K beyond the known points that the line is still trusted for. */
const MOST_BEYOND = 25;
const ZERO_CELSIUS = 273.15;

/** The half-life of a reagent in a solvent at a temperature; null where no point is near enough. */
export function lifetimeAt(
  limits: readonly LimitRow[],
  reagent: string,
  solvent: string,
  celsius: number,
): Lifetime | null {
  const points = limits
    .filter((row) => row.reagent === reagent && row.solvent === solvent && row.halfLifeHours !== null)
    .sort((a, b) => a.temperature - b.temperature);
  const [coldest, warmest] = [points[0], points.at(-1)];
  if (coldest === undefined || warmest === undefined) return null;
  const beyond = Math.max(coldest.temperature - celsius, celsius - warmest.temperature, 0);
  if (MOST_BEYOND < beyond) return null;
  if (points.length === 1) {
    // One point says nothing of the slope; colder it lives at least as long, warmer at most.
    return { hours: coldest.halfLifeHours!, isExtrapolated: 0 < beyond, row: coldest };
  }
  const place = Math.min(
    points.length - 2,
    Math.max(0, points.findIndex(({ temperature }) => celsius <= temperature) - 1),
  );
  const [low, high] =
    warmest.temperature < celsius ? [points.at(-2)!, warmest] : [points[place]!, points[place + 1]!];
  const inverse = (temperature: number) => 1 / (temperature + ZERO_CELSIUS);
  const slope =
    Math.log(high.halfLifeHours! / low.halfLifeHours!) /
    (inverse(high.temperature) - inverse(low.temperature));
  const hours = low.halfLifeHours! * Math.exp(slope * (inverse(celsius) - inverse(low.temperature)));
  return {
    hours,
    isExtrapolated: 0 < beyond,
    row: celsius - low.temperature < high.temperature - celsius ? low : high,
  };
}
