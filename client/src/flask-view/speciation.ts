/** The share of each couple that holds its proton, over pH; dashes tell the lines apart as well as colours. */
import { axisBottom, axisLeft } from 'd3-axis';
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import type { FlaskPicture } from '../../../server/src/answers/flask-picture.ts';
import { oneDecimal } from './layout.ts';
import { picture } from './svg.ts';

const WIDTH = 560;
const PLOT_HEIGHT = 260;
const MARGIN = { top: 16, right: 16, bottom: 40, left: 48 };
const LEGEND_ROW = 18;
const DASHES = ['', '7 3', '2 3', '10 3 2 3', '5 5', '1 4'];
const COLOURS = 6;
/** More lines cannot be told apart. */
const MOST_LINES = 12;

export function drawSpeciation(parent: HTMLElement, flask: FlaskPicture): SVGSVGElement {
  const { pHs, curves, rungs, pH } = flask;
  const shown = curves.slice(0, MOST_LINES);
  const height = PLOT_HEIGHT + shown.length * LEGEND_ROW + 8;
  const svg = picture(parent, {
    id: 'speciation',
    width: WIDTH,
    height,
    title: `Share that holds its proton, step ${flask.step}`,
    description: `${shown.length} couples over pH ${oneDecimal(pHs[0] ?? 0)} to ${oneDecimal(pHs.at(-1) ?? 0)}; each falls from 1 to 0 around its pKa.`,
  });
  const x = scaleLinear([pHs[0] ?? 0, pHs.at(-1) ?? 14], [MARGIN.left, WIDTH - MARGIN.right]);
  const y = scaleLinear([0, 1], [PLOT_HEIGHT - MARGIN.bottom, MARGIN.top]);
  svg
    .append('g')
    .attr('class', 'axis')
    .attr('transform', `translate(0,${PLOT_HEIGHT - MARGIN.bottom})`)
    .call(axisBottom(x));
  svg
    .append('g')
    .attr('class', 'axis')
    .attr('transform', `translate(${MARGIN.left},0)`)
    .call(axisLeft(y).ticks(5, '%'));
  svg
    .append('text')
    .attr('class', 'note')
    .attr('text-anchor', 'middle')
    .attr('x', WIDTH / 2)
    .attr('y', PLOT_HEIGHT - 8)
    .text(`pH, ${flask.scale} scale`);
  if (pH !== null) {
    svg
      .append('line')
      .attr('class', 'acidity')
      .attr('x1', x(pH))
      .attr('x2', x(pH))
      .attr('y1', MARGIN.top)
      .attr('y2', PLOT_HEIGHT - MARGIN.bottom);
  }
  const path = line<number>(
    (_, index) => x(pHs[index]!),
    (share) => y(share),
  );
  for (const [index, curve] of shown.entries()) {
    const rung = rungs.find(({ id }) => id === curve.id);
    const style = { class: `curve colour-${index % COLOURS}`, dash: DASHES[index % DASHES.length]! };
    svg
      .append('path')
      .attr('class', style.class)
      .attr('stroke-dasharray', style.dash)
      .attr('d', path([...curve.shares]));
    const row = PLOT_HEIGHT + index * LEGEND_ROW + 8;
    svg
      .append('line')
      .attr('class', style.class)
      .attr('stroke-dasharray', style.dash)
      .attr('x1', MARGIN.left)
      .attr('x2', MARGIN.left + 34)
      .attr('y1', row)
      .attr('y2', row);
    svg
      .append('text')
      .attr('class', 'rung-label')
      .attr('x', MARGIN.left + 42)
      .attr('y', row + 4)
      .text(rung === undefined ? '' : `${rung.substance} · ${rung.group}, pKa ${oneDecimal(rung.pKa)}`);
  }
  return svg.node()!;
}
