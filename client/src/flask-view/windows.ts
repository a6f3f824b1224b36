/** Windows of solvents on the absolute scale; those of the flask stand first, in bold and marked with a dot. */
import { axisTop } from 'd3-axis';
import { scaleLinear } from 'd3-scale';
import type { FlaskPicture } from '../../../server/src/answers/flask-picture.ts';
import { oneDecimal } from './layout.ts';
import { picture } from './svg.ts';

const WIDTH = 560;
const LEFT = 150;
const RIGHT = 16;
const TOP = 40;
const ROW = 20;

export function drawWindows(parent: HTMLElement, { solvents }: FlaskPicture): SVGSVGElement {
  const height = TOP + solvents.length * ROW + 12;
  const svg = picture(parent, {
    id: 'windows',
    width: WIDTH,
    height,
    title: 'Windows of solvents on the absolute scale',
    description: `${solvents.length} solvents, each from its protonated to its deprotonated form.`,
  });
  const low = Math.min(0, ...solvents.map((each) => each.low - each.sd));
  const high = Math.max(14, ...solvents.map((each) => each.high + each.sd));
  const x = scaleLinear([low, high], [LEFT, WIDTH - RIGHT]).nice();
  svg
    .append('g')
    .attr('class', 'axis')
    .attr('transform', `translate(0,${TOP - 6})`)
    .call(axisTop(x).ticks(8));
  svg
    .append('text')
    .attr('class', 'note')
    .attr('x', LEFT)
    .attr('y', 12)
    .text('absolute pH, against the proton in water');
  for (const [index, { solvent, low: from, high: to, sd, inFlask }] of solvents.entries()) {
    const at = TOP + index * ROW + ROW / 2;
    const words = `${solvent}: ${oneDecimal(from)} to ${oneDecimal(to)} ± ${oneDecimal(sd)}${inFlask ? ', in this flask' : ''}`;
    const row = svg
      .append('g')
      .attr('class', inFlask ? 'solvent mine' : 'solvent')
      .attr('role', 'img')
      .attr('aria-label', words);
    row.append('title').text(words);
    row
      .append('text')
      .attr('class', 'rung-label')
      .attr('text-anchor', 'end')
      .attr('x', LEFT - 8)
      .attr('y', at + 4)
      .text(`${inFlask ? '● ' : ''}${solvent}`);
    row
      .append('rect')
      .attr('class', 'solvent-bar')
      .attr('x', x(from))
      .attr('width', Math.max(1, x(to) - x(from)))
      .attr('y', at - 5)
      .attr('height', 10);
    for (const end of [from, to]) {
      row
        .append('line')
        .attr('class', 'spread')
        .attr('x1', x(end - sd))
        .attr('x2', x(end + sd))
        .attr('y1', at)
        .attr('y2', at);
    }
  }
  return svg.node()!;
}
