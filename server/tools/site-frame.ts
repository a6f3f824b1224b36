/**
 * The frame of a site: the ring system that holds it or that it hangs on, else the group it belongs to.
 */
import { coresOf, frameName } from '../src/chemistry/cores.ts';
import type { Graph } from '../src/chemistry/graph.ts';
import type { Site } from '../src/chemistry/terms.ts';

export function siteFrame(graph: Graph, site: Site): string {
  const core = coresOf(graph, site.atom)[0];
  if (core === undefined || 2 < core.reach) return site.group;
  return `${site.family} ${core.reach} ${frameName(graph, core)}`;
}
