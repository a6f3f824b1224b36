/**
 * Plots as SVG text: a titration, the forms of compounds over pH, the windows of solvents on one axis.
 *
 * Knows: curves and windows, worked out.  Must not know: files, the protocol; works out nothing but places.
 * Units: mol in, mmol on the axis; pH on the scale that the axis names.
 * Invariant: every picture says in words what it shows, and no text of a plan becomes markup.   (tests/answers/plots.test.ts)
 */
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import type { TitrationCurve } from '../flask/titration-curve.ts';
import type { PlacedWindow, WindowEnd } from '../flask/window.ts';
import { figure, oneDecimal } from './figures.ts';
import {
  axisBelow,
  axisLeft,
  type Frame,
  LEGEND_ROW,
  legendRow,
  legendText,
  lineStyle,
  page,
  type Scale,
} from './plot-frame.ts';
import type { FormCurves } from './speciation.ts';
import { element, type Markup, text } from './svg.ts';

const WIDTH = 720;
const PLOT: Frame = { width: WIDTH, height: 420, left: 56, right: 24, top: 34, bottom: 56 };
const MMOL = 1000;

/** A titration curve with its half-equivalence points. */
export function titrationPlot(
  curve: TitrationCurve,
  {
    title,
    titrant,
    nameOf,
  }: { readonly title: string; readonly titrant: string; readonly nameOf: (ingredient: number) => string },
): string {
  const { points, halves, scale } = curve;
  const frame = withLegend(halves.length);
  const x = scaleLinear([0, (points.at(-1)?.mol ?? 0) * MMOL], [frame.left, WIDTH - frame.right]);
  const pHs = points.map(({ pH }) => pH);
  const y = scaleLinear(
    [Math.min(...pHs), Math.max(...pHs)],
    [frame.height - frame.bottom, frame.top],
  ).nice();
  const path = line<{ mol: number; pH: number }>(
    ({ mol }) => x(mol * MMOL),
    ({ pH }) => y(pH),
  );
  const words = halves.map(
    ({ mol, pH, pKa, sd, ingredient, groupName }) =>
      `${cut(nameOf(ingredient))}, ${groupName}: pKa ${oneDecimal(pKa)} ± ${oneDecimal(sd)}, half at ${figure(mol * MMOL)} mmol, pH ${oneDecimal(pH)}`,
  );
  const description = [
    `pH from ${oneDecimal(pHs[0] ?? 0)} to ${oneDecimal(pHs.at(-1) ?? 0)} while ${figure((points.at(-1)?.mol ?? 0) * MMOL)} mmol of ${titrant} is added.`,
    ...words.map((word) => `${word}.`),
  ].join(' ');
  // The label stands on the side away from the curve.
  const offset = curve.kind === 'base' ? 17 : -8;
  const marks = halves.map(({ mol, pH, pKa }, place): Markup => {
    const [cx, cy] = [x(mol * MMOL), y(pH)];
    return element(
      'g',
      {},
      element('circle', { class: 'dot', cx, cy, r: 4 }),
      text('text', { x: cx + 8, y: cy + offset }, `${place + 1}: pKa ${oneDecimal(pKa)}`),
    );
  });
  return page(
    frame,
    { id: 'titration', title, description },
    axisBelow(frame, x, `${titrant} added, mmol`),
    axisLeft(frame, y, `pH (${scale})`),
    element('path', { ...lineStyle(0), d: path([...points]) ?? '' }),
    ...marks,
    ...words.map((word, place) => legendText(frame, place, words.length, `${place + 1}: ${word}`)),
  );
}

/** The share of each form over pH. */
export function speciationPlot(
  { scale, pHs, forms, now }: FormCurves,
  { title }: { readonly title: string },
): string {
  const frame = withLegend(forms.length);
  const x = scaleLinear([pHs[0] ?? 0, pHs.at(-1) ?? 14], [frame.left, WIDTH - frame.right]);
  const y = scaleLinear([0, 1], [frame.height - frame.bottom, frame.top]);
  const path = line<number>(
    (_, place) => x(pHs[place]!),
    (share) => y(share),
  );
  const words = forms.map(({ name, shares }) => {
    const most = shares.reduce((best, share, place) => (shares[best]! < share ? place : best), 0);
    return `${name}, most at pH ${oneDecimal(pHs[most] ?? 0)}.`;
  });
  const description = `Share of ${forms.length} forms over pH ${oneDecimal(pHs[0] ?? 0)} to ${oneDecimal(pHs.at(-1) ?? 0)} on the ${scale} scale. ${words.join(' ')}`;
  const mark =
    now === null || now < (pHs[0] ?? 0) || (pHs.at(-1) ?? 0) < now
      ? []
      : [
          element('line', {
            class: 'now',
            x1: x(now),
            x2: x(now),
            y1: frame.top,
            y2: frame.height - frame.bottom,
          }),
          text('text', { x: x(now) + 4, y: frame.top + 12 }, `this flask: ${oneDecimal(now)}`),
        ];
  return page(
    frame,
    { id: 'speciation', title, description },
    axisBelow(frame, x, `pH (${scale})`),
    axisLeft(frame, y, 'share'),
    ...forms.map(({ shares }, place) => element('path', { ...lineStyle(place), d: path([...shares]) ?? '' })),
    ...mark,
    ...forms.map(({ name }, place) => legendRow(frame, place, forms.length, name)),
  );
}

export interface NamedWindow {
  readonly solvent: string;
  readonly window: PlacedWindow;
}

const BAR = { row: 30, height: 14, left: 150 } as const;

/** Windows of solvents on the absolute scale; estimated ends are dashed, unknown ones run out of the picture. */
export function windowsPlot(windows: readonly NamedWindow[], { title }: { readonly title: string }): string {
  const frame: Frame = {
    width: WIDTH,
    height: 84 + windows.length * BAR.row,
    left: BAR.left,
    right: 24,
    top: 16,
    bottom: 60,
  };
  const reach = windows.flatMap(({ window: { low, high } }) =>
    [low, high].flatMap((end) => (end === null ? [] : [end.value - end.sd, end.value + end.sd])),
  );
  const x = scaleLinear(
    [Math.min(0, ...reach), Math.max(14, ...reach)],
    [frame.left, WIDTH - frame.right],
  ).nice();
  const rows = windows.map(({ solvent, window: { low, high } }, place) => {
    const y = frame.top + BAR.row * (place + 0.5);
    const bars = barOf({ low, high }, x, y);
    const spreads = [low, high].flatMap((end) =>
      end === null || end.sd === 0
        ? []
        : [
            element('line', {
              class: 'spread',
              x1: x(end.value - end.sd),
              x2: x(end.value + end.sd),
              y1: y,
              y2: y,
            }),
          ],
    );
    return element(
      'g',
      {},
      text('title', {}, `${solvent}: ${windowWords({ low, high })}`),
      text('text', { x: BAR.left - 10, y: y + 4, 'text-anchor': 'end' }, cut(solvent)),
      ...bars,
      ...spreads,
    );
  });
  const description = windows.map(({ solvent, window }) => `${solvent}: ${windowWords(window)}.`).join(' ');
  return page(
    frame,
    { id: 'windows', title, description },
    axisBelow(frame, x, 'absolute pH, counted from the proton in water; dashed: estimated'),
    ...rows,
  );
}

/** Filled where known, dashed where estimated, open where nothing bounds it. */
function barOf({ low, high }: PlacedWindow, x: Scale, y: number): Markup[] {
  const [from, to] = x.range() as [number, number];
  const [left, right] = [low === null ? from : x(low.value), high === null ? to : x(high.value)];
  const [top, bottom] = [y - BAR.height / 2, y + BAR.height / 2];
  const middle = (left + right) / 2;
  const half = (end: WindowEnd | null, at: number): Markup => {
    const side = end === null ? `M${at} ${top}M${at} ${bottom}` : `M${at} ${top}V${bottom}`;
    const d = `M${middle} ${top}H${at}M${middle} ${bottom}H${at}${side}`;
    if (end === null || end.estimated) return element('path', { class: 'guess', d });
    const [x1, x2] = [Math.min(at, middle), Math.max(at, middle)];
    return element(
      'g',
      {},
      element('rect', { class: 'bar', x: x1, width: x2 - x1, y: top, height: BAR.height }),
      element('path', { class: 'edge', d }),
    );
  };
  return [half(low, left), half(high, right)];
}

/** "3.4 ± 0.4 to 36.7 ± 0.6", with what is estimated or unknown said. */
export function windowWords({ low, high }: PlacedWindow): string {
  return `${endWords(low)} to ${endWords(high)}`;
}

function endWords(end: WindowEnd | null): string {
  if (end === null) return 'unknown';
  return `${oneDecimal(end.value)} ± ${oneDecimal(end.sd)}${end.estimated ? ' (estimated)' : ''}`;
}

/** Room for the rows of a legend under the plot. */
function withLegend(rows: number): Frame {
  const more = rows === 0 ? 0 : rows * LEGEND_ROW + 8;
  return { ...PLOT, height: PLOT.height + more, bottom: PLOT.bottom + more };
}

const LONGEST = 22;

function cut(name: string): string {
  return name.length <= LONGEST ? name : `${name.slice(0, LONGEST - 1)}…`;
}
