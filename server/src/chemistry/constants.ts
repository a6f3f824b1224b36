/**
 * The constants of a molecule on a scale, with the tables behind them: the door to all values.
 *
 * Knows: couples, the tables of values.  Must not know: flasks, plans, files.
 * Invariants: the same molecule, scale and own values give the same constants; answers are remembered, bounded.
 */
import { boundedCache } from '../tables/cache.ts';
import type {
  ActivationRow,
  GroupRow,
  MeasuredRow,
  ScaleId,
  ScaleRow,
  SpreadRow,
  SubstituentRow,
  TermRow,
} from '../tables/rows.ts';
import { estimateNonAqueous } from './carbon-acids.ts';
import type { Constant, Couple, Perceived } from './couple.ts';
import { type ConstantOptions, coupleConstants, type MoleculeConstants } from './couple-constants.ts';
import { measuredConstants } from './measured.ts';
import { carry } from './scales.ts';

export interface ValueTables {
  readonly version: string;
  readonly activation: readonly ActivationRow[];
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
        measured: (perceived) => measuredConstants(perceived, tables),
        carry: (constant, couple, to) => carry(constant, couple, to, tables),
        estimateElsewhere: (perceived, couple, to) =>
          estimateNonAqueous(perceived, couple, to, tables) ?? parentOn(couple, to, tables),
      },
      options,
    );
    remembered.set(key, found);
  }
  return found;
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
