/**
 * The ladder of a flask as a picture: each site at its pKa with its spread, full where it holds its proton.
 *
 * Knows: pictures of flasks.  Must not know: plans, files, how the picture is embedded.
 * Units: pixels; pKa on the scale of the flask.
 */
import { scaleLinear } from 'd3-scale';
import { oneDecimal, percent } from './figures.ts';
import type { FlaskPicture, Rung } from './flask-picture.ts';
import { axisBelow, type Frame, page, type Scale } from './plot-frame.ts';
import { element, type Markup, text } from './svg.ts';

const WIDTH = 720;
const ROW = 24;
const LEFT = 296;
const MARGIN = { right: 24, top: 44, bottom: 52 } as const;
const HALF = 0.5;
/** Heights of words above the rows: two, so that lines close together keep theirs apart. */
const UPPER = 26;
const LOWER = 10;

/** An SVG document; null for a flask without sites. */
export function ladderPlot(picture: FlaskPicture): string | null {
  const { rungs, scale, step, arrows, window, pH } = picture;
  if (rungs.length === 0) return null;
  const height = MARGIN.top + rungs.length * ROW + MARGIN.bottom;
  const frame: Frame = { width: WIDTH, height, left: LEFT, ...MARGIN };
  const low = Math.min(...rungs.map(({ pKa, sd }) => pKa - sd));
  const high = Math.max(...rungs.map(({ pKa, sd }) => pKa + sd));
  const x = scaleLinear([Math.floor(low - 1), Math.ceil(high + 1)], [LEFT, WIDTH - MARGIN.right]);
  const rowOf = new Map(rungs.map(({ id }, place) => [id, MARGIN.top + (place + HALF) * ROW]));
  const shown = (value: number) => x.domain()[0]! <= value && value <= x.domain()[1]!;
  const down = (value: number, word: string, above: number): Markup[] =>
    shown(value)
      ? [
          element('line', {
            class: 'now',
            x1: x(value),
            x2: x(value),
            y1: MARGIN.top - 6,
            y2: height - MARGIN.bottom,
          }),
          text('text', { class: 'note', x: x(value), y: MARGIN.top - above, 'text-anchor': 'middle' }, word),
        ]
      : [];
  return page(
    frame,
    {
      id: 'ladder',
      title: `Acidities in the flask of step ${step}`,
      description: describe(picture),
    },
    axisBelow(frame, x, `pKa (${scale})`),
    ...(pH === null ? [] : down(pH, `pH ${oneDecimal(pH)}`, UPPER)),
    ...(window === null ? [] : [...down(window.low, 'lyonium', LOWER), ...down(window.high, 'lyate', LOWER)]),
    ...rungs.map((rung) => row(rung, x, rowOf.get(rung.id)!)),
    ...arrows.flatMap(({ from, to, answer, logK }) => {
      const [a, b] = [rungs.find(({ id }) => id === from), rungs.find(({ id }) => id === to)];
      if (a === undefined || b === undefined) return [];
      return arrow(
        x(a.pKa),
        rowOf.get(from)!,
        x(b.pKa),
        rowOf.get(to)!,
        `${answer}, log K ${oneDecimal(logK)}`,
      );
    }),
  );
}

/** The ladder in words, for who cannot see it. */
export function describe({ rungs, scale, arrows, pH }: FlaskPicture): string {
  const sites = rungs.map(
    ({ group, substance, pKa, sd, protonated }) =>
      `${group} of ${substance}: pKa ${oneDecimal(pKa)} ± ${oneDecimal(sd)}, ${percent(protonated)} protonated`,
  );
  const transfers = arrows.map(
    ({ answer, logK }) => `The intended transfer has log K ${oneDecimal(logK)}: ${answer}.`,
  );
  const acidity = pH === null ? '' : ` pH ${oneDecimal(pH)}.`;
  return `On the ${scale} scale:${acidity} ${sites.join('; ')}. ${transfers.join(' ')}`.trim();
}

function row(
  { substance, group, element: symbol, atom, pKa, sd, protonated }: Rung,
  x: Scale,
  y: number,
): Markup {
  const [from, to] = [x(pKa - sd), x(pKa + sd)];
  const words = `${group}, ${substance} ${symbol}${atom}`;
  return element(
    'g',
    {},
    text('text', { x: LEFT - 8, y: y + 4, 'text-anchor': 'end' }, short(words)),
    element('line', { class: 'spread', x1: from, x2: to, y1: y, y2: y }),
    element('circle', {
      class: 'dot',
      cx: x(pKa),
      cy: y,
      r: 5,
      'fill-opacity': protonated < HALF ? 0 : 1,
      'stroke-width': 2,
    }),
  );
}

const LONGEST = 38;

function short(words: string): string {
  return words.length <= LONGEST ? words : `${words.slice(0, LONGEST - 1)}…`;
}

function arrow(x1: number, y1: number, x2: number, y2: number, words: string): Markup[] {
  const turn = Math.atan2(y2 - y1, x2 - x1);
  const wing = (side: number) => {
    const angle = turn + side * 0.45;
    return `M ${(x2 - 7 * Math.cos(turn)).toFixed(1)} ${(y2 - 7 * Math.sin(turn)).toFixed(1)} l ${(-9 * Math.cos(angle)).toFixed(1)} ${(-9 * Math.sin(angle)).toFixed(1)}`;
  };
  return [
    element('path', {
      class: 'curve k1',
      d: `M ${x1.toFixed(1)} ${y1.toFixed(1)} L ${x2.toFixed(1)} ${y2.toFixed(1)}`,
    }),
    element('path', { class: 'curve k1', d: `${wing(1)} ${wing(-1)}` }),
    text('text', { x: Math.min(x1, x2) - 10, y: (y1 + y2) / 2 + 4, 'text-anchor': 'end' }, words),
  ];
}
