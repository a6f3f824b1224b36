/**
 * Carries a constant from the scale of one solvent to that of another by the line of its family.
 *
 * Knows: lines, constants.  Must not know: molecules, flasks, plans.
 * Invariants:                                                              (tests/chemistry/scales.test.ts)
 *  1. On its own scale a constant comes back unchanged; no hop ever narrows its sd.
 *  2. A line is used in both directions; there and back gives the first value again.
 *  3. Outside the range of its points a line is trusted less with every unit.
 * A group whose parent is known on both scales has a line of its own through that parent, with the slope of its family.
 */
import { boundedCache } from '../tables/cache.ts';
import type { GroupRow, ScaleId, ScaleRow } from '../tables/rows.ts';
import type { Constant, Couple, Hop } from './couple.ts';

export interface ScaleTables {
  readonly scales: readonly ScaleRow[];
  readonly groups: readonly GroupRow[];
}

/** Families of the lines that hold where a family has none of its own. */
export const ANY_ACID = 'any acid';
export const ANY_BASE = 'any base';

/** sd that each unit outside the range of a line's points adds. */
const OUTSIDE_SD = 0.15;
/** What a molecule differs from the parent of its group in the cost of the change of solvent. */
const PARENT_SD = 0.5;
/** How far from the parent the line of a group is as good as at the parent, in pKa units. */
const PARENT_RANGE = 3;
/** Slope of a line through a parent where the family has none: anions feel the change of solvent, cations hardly do. */
const ACID_SLOPE = 1.3;
const BASE_SLOPE = 1;
/** A way over more scales than this is not taken. */
const MOST_HOPS = 3;
const NOTHING: readonly ScaleRow[] = [];

/** What decides which lines hold for a couple. */
export type Site = Pick<Couple, 'family' | 'group' | 'kind'>;

/** A line as it is walked, forwards or backwards. */
interface Link {
  readonly from: ScaleId;
  readonly to: ScaleId;
  readonly slope: number;
  readonly intercept: number;
  readonly sd: number;
  readonly low: number | null;
  readonly high: number | null;
  readonly row: ScaleRow;
}

const linksOf = new WeakMap<ScaleTables, ReadonlyMap<string, readonly ScaleRow[]>>();
const ways = new WeakMap<ScaleTables, ReturnType<typeof boundedCache<string, readonly Link[]>>>();
const REMEMBERED_WAYS = 500;

/**
 * The constant on another scale; null where no line leads there.
 *
 * @param site the surer of its group's and its family's line is taken, and that of all acids or bases where there is neither
 */
export function carry(constant: Constant, site: Site, to: ScaleId, tables: ScaleTables): Constant | null {
  if (constant.scale === to) return constant;
  const way = wayBetween(constant.scale, to, site, tables);
  if (way.length === 0) return null;
  return way.reduce(cross, constant);
}

/** What carrying costs in sd for a family, in the middle of its lines; null where no line leads there. */
export function scaleDistance(from: ScaleId, to: ScaleId, site: Site, tables: ScaleTables): number | null {
  if (from === to) return 0;
  const way = wayBetween(from, to, site, tables);
  if (way.length === 0) return null;
  return way.reduce((sd, link) => Math.hypot(sd * link.slope, link.sd), 0);
}

/** Every scale that a line leads from or to, in alphabetical order. */
export function scaleIds({ scales }: ScaleTables): readonly ScaleId[] {
  return [...new Set(scales.flatMap(({ from, to }) => [from, to]))].sort();
}

function cross(constant: Constant, link: Link): Constant {
  const value = link.intercept + link.slope * constant.value;
  const outside = Math.max(
    0,
    (link.low ?? -Infinity) - constant.value,
    constant.value - (link.high ?? Infinity),
  );
  // A slope below one would narrow the sd; what the line flattens is not known any better for it.
  const sd = Math.hypot(constant.sd * Math.max(1, link.slope), link.sd, OUTSIDE_SD * outside);
  const hop: Hop = {
    what: `carried from ${link.from} to ${link.to} by the line of ${familyName(link.row)}${outside === 0 ? '' : ', outside its range'}`,
    value,
    sd,
    sources: link.row.sources,
  };
  return {
    value,
    sd,
    scale: link.to,
    origin: 'carried',
    sources: [...new Set([...constant.sources, ...link.row.sources])],
    hops: [...constant.hops, hop],
  };
}

function familyName({ family }: ScaleRow): string {
  return family === ANY_ACID ? 'all acids' : family === ANY_BASE ? 'all bases' : family;
}

/** The links of the best way, at most three; empty where there is none. There and back is one way. */
function wayBetween(from: ScaleId, to: ScaleId, site: Site, tables: ScaleTables): readonly Link[] {
  let known = ways.get(tables);
  if (known === undefined) {
    known = boundedCache(REMEMBERED_WAYS);
    ways.set(tables, known);
  }
  const key = `${from}\0${to}\0${site.family}\0${site.group}\0${site.kind}`;
  let way = known.get(key);
  if (way === undefined) {
    way = from < to ? findWay(from, to, site, tables) : findWay(to, from, site, tables).map(turned).reverse();
    known.set(key, way);
  }
  return way;
}

interface Way {
  readonly links: readonly Link[];
  readonly general: number;
  readonly sd: number;
}

/** Of all ways that with the fewest lines of all acids or all bases, then the shortest, then the surest. */
function findWay(from: ScaleId, to: ScaleId, site: Site, tables: ScaleTables): readonly Link[] {
  const links = scaleIds(tables).flatMap((scale) => linksFrom(scale, site, tables));
  let best: Way | null = null;
  const walk = (scale: ScaleId, way: Way) => {
    if (scale === to) {
      if (best === null || isBetter(way, best)) best = way;
      return;
    }
    if (way.links.length === MOST_HOPS) return;
    for (const link of links) {
      if (link.from !== scale || link.to === from || way.links.some((one) => one.from === link.to)) continue;
      walk(link.to, {
        links: [...way.links, link],
        general: way.general + (isGeneral(link.row) ? 1 : 0),
        sd: Math.hypot(way.sd * Math.max(1, link.slope), link.sd),
      });
    }
  };
  walk(from, { links: [], general: 0, sd: 0 });
  return (best as Way | null)?.links ?? [];
}

function isBetter(one: Way, other: Way): boolean {
  if (one.general !== other.general) return one.general < other.general;
  if (one.links.length !== other.links.length) return one.links.length < other.links.length;
  return one.sd < other.sd;
}

function isGeneral({ family }: ScaleRow): boolean {
  return family === ANY_ACID || family === ANY_BASE;
}

function turned({ from, row }: Link): Link {
  return row.from === from ? backwards(row) : forwards(row);
}

/** The lines that leave a scale, one for each scale that they reach. */
function linksFrom(scale: ScaleId, { family, group, kind }: Site, tables: ScaleTables): Link[] {
  const rows = rowsByScale(tables).get(scale) ?? NOTHING;
  const general = kind === 'acid' ? ANY_ACID : ANY_BASE;
  const best = new Map<ScaleId, ScaleRow>();
  for (const row of rows) {
    if (row.family !== general && row.family !== family && row.family !== group) continue;
    const other = row.from === scale ? row.to : row.from;
    const known = best.get(other);
    const doubt = (one: ScaleRow) => (isGeneral(one) ? Infinity : one.sd);
    if (known === undefined || doubt(row) < doubt(known)) best.set(other, row);
  }
  return [...best.values()].map((row) => (row.from === scale ? forwards(row) : backwards(row)));
}

function forwards(row: ScaleRow): Link {
  return { ...row, row };
}

function backwards(row: ScaleRow): Link {
  const { slope, intercept } = row;
  const image = (value: number | null) => (value === null ? null : intercept + slope * value);
  return {
    from: row.to,
    to: row.from,
    slope: 1 / slope,
    intercept: -intercept / slope,
    sd: row.sd / slope,
    low: image(row.low),
    high: image(row.high),
    row,
  };
}

function rowsByScale(tables: ScaleTables): ReadonlyMap<string, readonly ScaleRow[]> {
  let index = linksOf.get(tables);
  if (index === undefined) {
    const lists = new Map<string, ScaleRow[]>();
    for (const row of [...tables.scales, ...parentLines(tables)]) {
      for (const scale of [row.from, row.to]) {
        const list = lists.get(scale);
        if (list === undefined) lists.set(scale, [row]);
        else list.push(row);
      }
    }
    index = lists;
    linksOf.set(tables, lists);
  }
  return index;
}

/** Lines through the parents of groups that are known on two scales. */
function parentLines({ groups, scales }: ScaleTables): ScaleRow[] {
  return groups.flatMap((group) => {
    const known = [
      { scale: 'water', value: group.water, sd: group.waterSd },
      { scale: 'DMSO', value: group.dmso, sd: group.dmsoSd },
      { scale: 'MeCN', value: group.mecn, sd: group.mecnSd },
    ].flatMap(({ scale, value, sd }) => (value === null || sd === null ? [] : [{ scale, value, sd }]));
    return known.flatMap((first, place) =>
      known.slice(place + 1).map((second): ScaleRow => {
        const own = scales.find(
          ({ from, to, family }) => from === first.scale && to === second.scale && family === group.family,
        );
        const slope = own?.slope ?? (group.kind === 'acid' ? ACID_SLOPE : BASE_SLOPE);
        return {
          from: first.scale,
          to: second.scale,
          family: group.id,
          slope,
          intercept: second.value - slope * first.value,
          sd: Math.hypot(second.sd, slope * first.sd, PARENT_SD),
          n: null,
          low: first.value - PARENT_RANGE,
          high: first.value + PARENT_RANGE,
          sources: group.sources,
          basis: 'derived',
          note: `through the parent of ${group.name}`,
        };
      }),
    );
  });
}
