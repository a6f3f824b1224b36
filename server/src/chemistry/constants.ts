/**
 * The constants of a molecule on a scale, with the tables behind them: the door to all values.
 *
 * Knows: couples, the tables of values.  Must not know: flasks, plans, files.
 * Invariants: the same molecule, scale and own values give the same constants; answers are remembered, bounded.
 */
import { boundedCache } from '../tables/cache.ts';
import type {
  GroupRow,
  MeasuredRow,
  ScaleId,
  ScaleRow,
  SpreadRow,
  SubstituentRow,
  TermRow,
} from '../tables/rows.ts';
import type { Constant, Couple, Hop, Perceived } from './couple.ts';
import {
  type ConstantOptions,
  coupleConstants,
  type MeasuredConstant,
  type MoleculeConstants,
} from './couple-constants.ts';

export interface ValueTables {
  readonly version: string;
  readonly groups: readonly GroupRow[];
  readonly groupById: ReadonlyMap<string, GroupRow>;
  readonly substituents: readonly SubstituentRow[];
  readonly terms: readonly TermRow[];
  readonly spreads: readonly SpreadRow[];
  readonly scales: readonly ScaleRow[];
  readonly measuredByKey: ReadonlyMap<string, readonly MeasuredRow[]>;
}

const REMEMBERED = 6000;
const remembered = boundedCache<string, MoleculeConstants>(REMEMBERED);
/** Families that lend their correlation to those without one, nearest first, and what that costs in sd. */
const RELATED_ACIDS = ['carbon-acid', 'alcohol', 'phenol', 'carboxylic-acid', 'any'];
const RELATED_BASES = ['ammonium', 'pyridinium', 'any'];
const RELATED_SD = 1.5;
/** Outside the range of a correlation each unit costs this much more sd. */
const EXTRAPOLATION_SD = 0.15;

/** Constants of every couple of a molecule, and the stepwise ones of each component. */
export function constantsIn(
  molecule: Perceived,
  scale: ScaleId,
  tables: ValueTables,
  options: ConstantOptions = {},
): MoleculeConstants {
  const key = [
    tables.version,
    molecule.smiles,
    scale,
    options.estimateOnly ?? '',
    JSON.stringify(options.own ?? []),
  ].join('\0');
  let found = remembered.get(key);
  if (found === undefined) {
    found = coupleConstants(
      molecule,
      scale,
      tables,
      {
        measured: (perceived) => measuredIn(perceived, tables),
        carry: (constant, couple, to) => carry(constant, couple, to, tables),
        estimateElsewhere: (_, couple, to) => parentOn(couple, to, tables),
      },
      options,
    );
    remembered.set(key, found);
  }
  return found;
}

/** Measured rows of each component that name one of its couples. */
function measuredIn({ couples, components }: Perceived, { measuredByKey }: ValueTables): MeasuredConstant[] {
  return components.flatMap((component) => {
    const rows = component.key === undefined ? [] : (measuredByKey.get(component.key) ?? []);
    return rows.flatMap((row): MeasuredConstant[] => {
      const couple = couples.findIndex(
        (candidate) =>
          candidate.component === component.index &&
          candidate.kind === row.direction &&
          candidate.symmetry !== undefined &&
          row.classes.includes(candidate.symmetry),
      );
      return couple === -1 ? [] : [{ couple, step: row.step, constant: measuredConstant(row) }];
    });
  });
}

function measuredConstant({ name, value, sd, scale, sources, temperature }: MeasuredRow): Constant {
  const at = temperature === null || temperature === 25 ? '' : ` at ${temperature} °C`;
  return {
    value,
    sd,
    scale,
    origin: 'measured',
    sources,
    hops: [{ what: `measured for ${name} in ${scale}${at}`, value, sd, sources }],
  };
}

/** The parent's own value on a scale other than water: only where the group gives one and substituents are not counted. */
function parentOn(
  { group, groupName, family }: Couple,
  scale: ScaleId,
  { groupById }: ValueTables,
): Constant | null {
  const row = groupById.get(group);
  if (row === undefined || (family !== 'carbon-acid' && row.model !== 'fixed')) return null;
  const value = scale === 'DMSO' ? row.dmso : scale === 'MeCN' ? row.mecn : null;
  const sd = scale === 'DMSO' ? row.dmsoSd : row.mecnSd;
  if (value === null || sd === null) return null;
  const { sources } = row;
  return {
    value,
    sd,
    scale,
    origin: 'estimated',
    sources,
    hops: [{ what: `parent value of ${groupName} in ${scale}`, value, sd, sources }],
  };
}

/** A constant on another scale by the correlation of its family, directly or on the way; a related family's as a last resort. */
export function carry(constant: Constant, couple: Couple, to: ScaleId, tables: ValueTables): Constant | null {
  if (constant.scale === to) return constant;
  for (const related of [false, true]) {
    const direct = rowFor(constant.scale, to, couple, tables, related);
    if (direct !== undefined) return apply(constant, direct);
    for (const way of ['DMSO', 'water']) {
      if (way === constant.scale || way === to) continue;
      const second = rowFor(way, to, couple, tables, related);
      const first = rowFor(constant.scale, way, couple, tables, related);
      if (second === undefined) continue;
      const there = parentOn(couple, way, tables) ?? (first === undefined ? null : apply(constant, first));
      if (there !== null) return apply(there, second);
    }
  }
  return null;
}

/** The row of a family, or with `related` that of a family like it, at a cost. */
function rowFor(
  from: ScaleId,
  to: ScaleId,
  { family, kind }: Couple,
  { scales }: ValueTables,
  related: boolean,
): ScaleRow | undefined {
  const rows = scales.filter((row) => row.from === from && row.to === to);
  const own = rows.find((row) => row.family === family);
  if (own !== undefined || !related) return own;
  for (const other of kind === 'acid' ? RELATED_ACIDS : RELATED_BASES) {
    const row = rows.find((candidate) => candidate.family === other);
    if (row !== undefined) return { ...row, sd: Math.hypot(row.sd, RELATED_SD) };
  }
  return undefined;
}

function apply(constant: Constant, row: ScaleRow): Constant {
  const value = row.intercept + row.slope * constant.value;
  const beyond = Math.max(
    0,
    (row.low ?? -Infinity) - constant.value,
    constant.value - (row.high ?? Infinity),
  );
  const sd = Math.hypot(row.slope * constant.sd, row.sd, EXTRAPOLATION_SD * beyond);
  const hop: Hop = {
    what: `carried from ${row.from} to ${row.to} as ${row.family}`,
    value,
    sd,
    sources: row.sources,
  };
  return {
    value,
    sd,
    scale: row.to,
    origin: 'carried',
    sources: [...new Set([...constant.sources, ...row.sources])],
    hops: [...constant.hops, hop],
  };
}
