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

/** A constant on another scale by the correlation of its family, directly or by way of water; null where none leads there. */
export function carry(constant: Constant, couple: Couple, to: ScaleId, tables: ValueTables): Constant | null {
  if (constant.scale === to) return constant;
  const direct = rowFor(constant.scale, to, couple, tables);
  if (direct !== undefined) return apply(constant, direct);
  for (const way of ['water', 'DMSO']) {
    const first =
      way === constant.scale || way === to ? undefined : rowFor(constant.scale, way, couple, tables);
    const second = first === undefined ? undefined : rowFor(way, to, couple, tables);
    if (first !== undefined && second !== undefined) return apply(apply(constant, first), second);
  }
  return null;
}

function rowFor(
  from: ScaleId,
  to: ScaleId,
  { family, kind }: Couple,
  { scales }: ValueTables,
): ScaleRow | undefined {
  const rows = scales.filter((row) => row.from === from && row.to === to);
  return (
    rows.find((row) => row.family === family) ??
    rows.find((row) => row.family === (kind === 'acid' ? '*acid' : '*base')) ??
    rows.find((row) => row.family === '*')
  );
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
