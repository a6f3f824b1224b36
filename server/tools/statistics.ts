/** Figures that say how well values were met, one line for each set. */
export interface Met {
  /** Said minus measured; null where nothing was said. */
  readonly error: number | null;
  readonly sd: number;
}

const WIDTH = 30;

export const HEADER = `${''.padEnd(WIDTH)}     n  covered   mean    rms  ≤0.5   ≤1   inside 1.64 sd   mean sd`;

/** Number, share covered, mean absolute error, root mean square, shares within 0.5, 1.0 and 1.64 sd. */
export function figures(title: string, list: readonly Met[]): string {
  const met = list.flatMap(({ error, sd }) => (error === null ? [] : [{ size: Math.abs(error), sd }]));
  const mean = (pick: (one: { size: number; sd: number }) => number) =>
    met.length === 0 ? Number.NaN : met.reduce((sum, one) => sum + pick(one), 0) / met.length;
  const share = (holds: (one: { size: number; sd: number }) => boolean) =>
    percent(met.filter(holds).length, met.length);
  return [
    title.slice(0, WIDTH).padEnd(WIDTH),
    String(list.length).padStart(6),
    percent(met.length, list.length).padStart(9),
    mean(({ size }) => size)
      .toFixed(2)
      .padStart(7),
    Math.sqrt(mean(({ size }) => size ** 2))
      .toFixed(2)
      .padStart(7),
    share(({ size }) => size <= 0.5).padStart(6),
    share(({ size }) => size <= 1).padStart(6),
    share(({ size, sd }) => size <= 1.64 * sd).padStart(12),
    mean(({ sd }) => sd)
      .toFixed(2)
      .padStart(12),
  ].join('');
}

function percent(part: number, whole: number): string {
  return `${Math.round((100 * part) / Math.max(1, whole))} %`;
}
