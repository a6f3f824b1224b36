/**
 * What all plots share: the page with its title for those who cannot see it, axes, colours for light and dark, a legend.
 *
 * Knows: numbers and words.  Must not know: chemistry.
 * Units: pixels of the picture.
 * Scales and lines come from d3; its axes need a document, so ticks are drawn here.
 */
import type { ScaleLinear } from 'd3-scale';
import { element, type Markup, text } from './svg.ts';

export interface Frame {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export type Scale = ScaleLinear<number, number>;

export const COLOURS = 6;
const DASHES = ['none', '7 3', '2 3', '10 3 2 3', '5 5', '1 4'];
export const LEGEND_ROW = 18;
const TICK = 5;
const STYLE = [
  'svg{font:13px system-ui,sans-serif;color:var(--lyate-ink,#1f2328);',
  '--c0:#0550ae;--c1:#a63603;--c2:#116329;--c3:#8250df;--c4:#9a6700;--c5:#bf3989}',
  '@media (prefers-color-scheme:dark){svg{color:var(--lyate-ink,#e6edf3);',
  '--c0:#79c0ff;--c1:#ffa657;--c2:#7ee787;--c3:#d2a8ff;--c4:#e3b341;--c5:#ff9bce}}',
  'text{fill:currentColor}.axis line,.axis path{stroke:currentColor;fill:none}',
  '.grid line{stroke:currentColor;opacity:.15}.curve{fill:none;stroke-width:2}',
  '.note{opacity:.8}.now{stroke:currentColor;stroke-dasharray:4 3}.dot{stroke:currentColor;fill:currentColor}',
  '.bar{fill:var(--c0);fill-opacity:.35}.edge{fill:none;stroke:var(--c0)}.guess{fill:none;stroke:var(--c0);stroke-dasharray:4 3}',
  '.spread{stroke:currentColor}',
  ...Array.from({ length: COLOURS }, (_, place) => `.k${place}{stroke:var(--c${place})}`),
].join('');

/** The whole picture. */
export function page(
  { width, height }: Frame,
  { id, title, description }: { readonly id: string; readonly title: string; readonly description: string },
  ...children: readonly Markup[]
): string {
  const { markup } = element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      id,
      viewBox: `0 0 ${width} ${height}`,
      width,
      height,
      role: 'img',
      'aria-labelledby': `${id}-title ${id}-description`,
    },
    text('title', { id: `${id}-title` }, title),
    text('desc', { id: `${id}-description` }, description),
    text('style', {}, STYLE),
    ...children,
  );
  return `${markup}\n`;
}

/** The horizontal axis under the plot, with its name. */
export function axisBelow(
  { left, width, right, height, bottom, top }: Frame,
  x: Scale,
  name: string,
): Markup {
  const y = height - bottom;
  const write = x.tickFormat(TICKS);
  const ticks = x
    .ticks(TICKS)
    .flatMap((value) => [
      element('line', { x1: x(value), x2: x(value), y1: y, y2: y + TICK }),
      text('text', { x: x(value), y: y + TICK + 14, 'text-anchor': 'middle' }, write(value)),
    ]);
  const grid = x.ticks(TICKS).map((value) => element('line', { x1: x(value), x2: x(value), y1: top, y2: y }));
  return element(
    'g',
    {},
    element('g', { class: 'grid' }, ...grid),
    element('g', { class: 'axis' }, element('line', { x1: left, x2: width - right, y1: y, y2: y }), ...ticks),
    text(
      'text',
      { class: 'note', x: (left + width - right) / 2, y: y + TICK + 34, 'text-anchor': 'middle' },
      name,
    ),
  );
}

/** The vertical axis at the left, with its name. */
export function axisLeft({ left, height, top, bottom, width, right }: Frame, y: Scale, name: string): Markup {
  const write = y.tickFormat(TICKS);
  const ticks = y
    .ticks(TICKS)
    .flatMap((value) => [
      element('line', { x1: left - TICK, x2: left, y1: y(value), y2: y(value) }),
      text('text', { x: left - TICK - 4, y: y(value) + 4, 'text-anchor': 'end' }, write(value)),
    ]);
  const grid = y
    .ticks(TICKS)
    .map((value) => element('line', { x1: left, x2: width - right, y1: y(value), y2: y(value) }));
  return element(
    'g',
    {},
    element('g', { class: 'grid' }, ...grid),
    element(
      'g',
      { class: 'axis' },
      element('line', { x1: left, x2: left, y1: top, y2: height - bottom }),
      ...ticks,
    ),
    text('text', { class: 'note', x: left, y: top - 10, 'text-anchor': 'middle' }, name),
  );
}

const TICKS = 8;

/** Colour and dashes of the n-th line: told apart without colour too. */
export function lineStyle(place: number): { readonly class: string; readonly 'stroke-dasharray': string } {
  return { class: `curve k${place % COLOURS}`, 'stroke-dasharray': DASHES[place % DASHES.length]! };
}

/** The n-th row of a legend below the plot. */
export function legendRow({ left, height }: Frame, place: number, rows: number, words: string): Markup {
  const y = height - (rows - place) * LEGEND_ROW + 6;
  return element(
    'g',
    {},
    element('line', { ...lineStyle(place), x1: left, x2: left + 34, y1: y, y2: y }),
    text('text', { x: left + 42, y: y + 4 }, words),
  );
}

/** The same without a line. */
export function legendText({ left, height }: Frame, place: number, rows: number, words: string): Markup {
  return text('text', { x: left, y: height - (rows - place) * LEGEND_ROW + 10 }, words);
}
