/**
 * The ladder: couples of the flask on one pKa axis, the solvent's window shaded, protons moving as arrows.
 *
 * A rung's filled part is the share that holds its proton; a round head says most do, a square one most do not.
 */
import { axisLeft } from 'd3-axis';
import { scaleLinear } from 'd3-scale';
import type { FlaskPicture, Rung } from '../../../server/src/answers/flask-picture.ts';
import { figure, oneDecimal, percent, spread } from './layout.ts';
import { arrowHead, type Picture, picture } from './svg.ts';

const WIDTH = 560;
const TOP = 24;
const BOTTOM = 24;
const AXIS = 44;
const RUNG = 170;
const RUNG_WIDTH = 84;
const LABEL = RUNG + RUNG_WIDTH + 38;
const GAP = 16;
const LEAST_HEIGHT = 320;

export function drawLadder(parent: HTMLElement, flask: FlaskPicture): SVGSVGElement {
  const { rungs, window, pH, arrows, scale } = flask;
  const height = Math.max(LEAST_HEIGHT, rungs.length * GAP + TOP + BOTTOM);
  const values = [...rungs.flatMap(({ pKa, sd }) => [pKa - sd, pKa + sd]), ...(pH === null ? [] : [pH])];
  const [low, high] = [Math.min(...values, 0) - 1, Math.max(...values, 14) + 1];
  const y = scaleLinear([low, high], [height - BOTTOM, TOP]);
  const svg = picture(parent, {
    id: 'ladder',
    width: WIDTH,
    height,
    title: `Ladder of step ${flask.step}`,
    description: describe(flask),
  });
  arrowHead(svg, 'ladder-arrow');
  if (window !== null) shade(svg, y, { low: Math.max(low, window.low), high: Math.min(high, window.high) });
  svg.append('g').attr('class', 'axis').attr('transform', `translate(${AXIS},0)`).call(axisLeft(y).ticks(10));
  svg.append('text').attr('x', 6).attr('y', 14).attr('class', 'note').text(`pKa, ${scale} scale`);
  if (pH !== null) {
    svg
      .append('line')
      .attr('class', 'acidity')
      .attr('x1', AXIS)
      .attr('x2', LABEL - 10)
      .attr('y1', y(pH))
      .attr('y2', y(pH));
    svg
      .append('text')
      .attr('class', 'acidity-label')
      .attr('x', AXIS + 4)
      .attr('y', y(pH) - 4)
      .text(`pH ${oneDecimal(pH)}`);
  }
  const labels = spread(
    rungs.map(({ pKa }) => y(pKa)),
    GAP,
    TOP,
    height - BOTTOM,
  );
  for (const [index, rung] of rungs.entries()) drawRung(svg, rung, y(rung.pKa), labels[index]!, y);
  for (const [index, arrow] of arrows.entries()) {
    const from = rungs.find(({ id }) => id === arrow.from);
    const to = rungs.find(({ id }) => id === arrow.to);
    if (from === undefined || to === undefined) continue;
    const [y1, y2] = [y(from.pKa), y(to.pKa)];
    const bend = RUNG - 40 - 14 * index;
    svg
      .append('path')
      .attr('class', `transfer ${arrow.answer}`)
      .attr('d', `M${RUNG - 8} ${y1}C${bend} ${y1} ${bend} ${y2} ${RUNG - 8} ${y2}`)
      .attr('marker-end', 'url(#ladder-arrow)');
    svg
      .append('text')
      .attr('class', 'transfer-label')
      .attr('text-anchor', 'end')
      .attr('x', bend + 4)
      .attr('y', (y1 + y2) / 2 + 4)
      .text(`log K ${oneDecimal(arrow.logK)}`);
  }
  return svg.node()!;
}

function shade(
  svg: Picture,
  y: (value: number) => number,
  { low, high }: { low: number; high: number },
): void {
  if (high <= low) return;
  svg
    .append('rect')
    .attr('class', 'window')
    .attr('x', AXIS)
    .attr('width', LABEL - 10 - AXIS)
    .attr('y', y(high))
    .attr('height', y(low) - y(high));
  svg
    .append('text')
    .attr('class', 'note')
    .attr('x', AXIS + 4)
    .attr('y', y(high) + 12)
    .text('window of the solvent');
}

function drawRung(svg: Picture, rung: Rung, at: number, label: number, y: (value: number) => number): void {
  const { pKa, sd, protonated, substance, element, atom, group, mol } = rung;
  const words = `${substance}, ${group} (${element}${atom}): pKa ${oneDecimal(pKa)} ± ${oneDecimal(sd)}, ${percent(protonated)} protonated, ${figure(mol * 1000)} mmol`;
  const drawn = svg
    .append('g')
    .attr('class', 'rung')
    .attr('tabindex', 0)
    .attr('role', 'img')
    .attr('aria-label', words);
  drawn.append('title').text(words);
  drawn
    .append('line')
    .attr('class', 'spread')
    .attr('x1', RUNG + RUNG_WIDTH / 2)
    .attr('x2', RUNG + RUNG_WIDTH / 2)
    .attr('y1', y(pKa - sd))
    .attr('y2', y(pKa + sd));
  drawn
    .append('rect')
    .attr('class', 'rung-frame')
    .attr('x', RUNG)
    .attr('y', at - 3)
    .attr('width', RUNG_WIDTH)
    .attr('height', 6);
  drawn
    .append('rect')
    .attr('class', 'rung-filled')
    .attr('x', RUNG)
    .attr('y', at - 3)
    .attr('width', RUNG_WIDTH * protonated)
    .attr('height', 6);
  const head = RUNG + RUNG_WIDTH + 10;
  if (0.5 <= protonated)
    drawn.append('circle').attr('class', 'head held').attr('cx', head).attr('cy', at).attr('r', 5);
  else
    drawn
      .append('rect')
      .attr('class', 'head lost')
      .attr('x', head - 4.5)
      .attr('y', at - 4.5)
      .attr('width', 9)
      .attr('height', 9);
  drawn
    .append('path')
    .attr('class', 'leader')
    .attr('d', `M${head + 8} ${at}L${LABEL - 4} ${label}`);
  drawn
    .append('text')
    .attr('class', 'rung-label')
    .attr('x', LABEL)
    .attr('y', label + 4)
    .text(`${oneDecimal(pKa)}  ${short(substance)} · ${short(group)}`);
}

function short(text: string): string {
  return 24 < text.length ? `${text.slice(0, 23)}…` : text;
}

function describe({ rungs, pH, arrows, media }: FlaskPicture): string {
  const flask = `${rungs.length} couples in ${media.join(', ')}${pH === null ? '' : `, pH ${oneDecimal(pH)}`}.`;
  const moves = arrows.map(
    ({ logK, answer }) => ` The intended transfer has log K ${oneDecimal(logK)}: ${answer}.`,
  );
  return `${flask}${moves.join('')} The table of the balance holds the same figures.`;
}
