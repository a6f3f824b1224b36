/** Small helpers to build SVG without ever reading text as markup. */
import { type Selection, select } from 'd3-selection';

export type Group = Selection<SVGGElement, unknown, null, undefined>;
export type Picture = Selection<SVGSVGElement, unknown, null, undefined>;

/** An empty picture with a name and a description for those who cannot see it. */
export function picture(
  parent: HTMLElement,
  {
    id,
    width,
    height,
    title,
    description,
  }: {
    readonly id: string;
    readonly width: number;
    readonly height: number;
    readonly title: string;
    readonly description: string;
  },
): Picture {
  const svg = select(parent)
    .append('svg')
    .attr('id', id)
    .attr('xmlns', 'http://www.w3.org/2000/svg')
    .attr('viewBox', `0 0 ${width} ${height}`)
    .attr('width', width)
    .attr('height', height)
    .attr('role', 'img')
    .attr('aria-labelledby', `${id}-title ${id}-description`);
  svg.append('title').attr('id', `${id}-title`).text(title);
  svg.append('desc').attr('id', `${id}-description`).text(description);
  return svg;
}

/** An arrow head that lines can end in. */
export function arrowHead(svg: Picture, id: string): void {
  svg
    .append('defs')
    .append('marker')
    .attr('id', id)
    .attr('viewBox', '0 0 8 8')
    .attr('refX', 7)
    .attr('refY', 4)
    .attr('markerWidth', 7)
    .attr('markerHeight', 7)
    .attr('orient', 'auto')
    .append('path')
    .attr('class', 'arrow-head')
    .attr('d', 'M0 0L8 4L0 8z');
}
