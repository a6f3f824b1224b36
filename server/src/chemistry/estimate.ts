/**
 * The constant of a couple in water from its surroundings: published substituent effects with fitted corrections.
 *
 * Knows: graphs, groups, the terms' values.  Must not know: measured values, plans, flasks.
 * Invariants:
 *  1. The estimate does not depend on how the molecule is written.   (tests/chemistry/estimate.test.ts)
 *  2. Terms that few molecules of the fit have shown widen the sd; one that none has shown leaves the value alone.
 * Units: pKa in water at 25 °C, for the couple while all others are neutral.
 * Sources: Hansch, Leo and Taft 1991; fitted to the IUPAC Digitized pKa Dataset v1.0.
 */
import type { SpreadRow, SubstituentRow, TermRow } from '../tables/rows.ts';
import type { Constant, Hop } from './couple.ts';
import type { Graph } from './graph.ts';
import { readSubstituents, type Substituents } from './substituents.ts';
import { type Site, termClass, termsOf } from './terms.ts';

/** What the estimator needs of a group. */
export interface ParentRow {
  readonly id: string;
  readonly name: string;
  readonly water: number | null;
  readonly waterSd: number | null;
  readonly model: string;
  readonly sources: readonly string[];
}

export interface EstimatorTables {
  readonly groups: readonly ParentRow[];
  readonly substituents: readonly SubstituentRow[];
  readonly terms: readonly TermRow[];
  readonly spreads: readonly SpreadRow[];
}

interface Estimator {
  readonly substituents: Substituents;
  readonly values: ReadonlyMap<string, KnownTerm>;
  readonly families: ReadonlyMap<string, SpreadRow>;
  readonly variances: ReadonlyMap<string, number>;
  readonly parents: ReadonlyMap<string, ParentRow>;
}

/** A term of the table with what an estimate asks of it. */
interface KnownTerm {
  readonly value: number;
  readonly n: number;
  /** Variance that is left for a factor of one. */
  readonly doubt: number;
  readonly part: string;
}

/** All sums start from the middle of the scale. */
export const MIDDLE = 7;
/** What it adds to the sd that a group's own value stands for all molecules of the group. */
const STAND_IN_SD = 0.6;
/** The sd of a value that stands in no table. */
const UNKNOWN_SD = 3;
const FIT_SOURCES: readonly string[] = ['hansch-1991', 'iupac-pka-2024'];

const estimators = new WeakMap<EstimatorTables, Estimator>();

/**
 * The estimate for one site; null where neither fit nor parent value reaches it.
 *
 * @param graph the neutral reference form
 * @param equivalents number of symmetry-equivalent sites, for the statistical factor
 */
export function estimateInWater(
  graph: Graph,
  site: Site,
  equivalents: number,
  tables: EstimatorTables,
): Constant | null {
  const estimator = estimatorOf(tables);
  const parent = estimator.parents.get(site.group);
  const family = estimator.families.get(`${site.kind[0]}.${site.family}`);
  const met = estimator.values.get(`group:${site.group}`)?.n ?? 0;
  const familiar =
    family !== undefined && (FEW < family.n || 0 < met) && (parent?.model !== 'fixed' || 1 < met);
  if (!familiar || (site.family === 'carbon-acid' && met < FEW)) return fromParent(parent);
  const terms = termsOf(graph, site, estimator.substituents);
  let value = MIDDLE;
  let novelty = 0;
  const parts = new Map<string, number>();
  for (const term of terms) {
    const known = estimator.values.get(term.name);
    novelty += (known ?? unknownTerm(term.name, estimator)).doubt * term.factor ** 2;
    if (known === undefined) continue;
    const worth = known.value * term.factor;
    value += worth;
    parts.set(known.part, (parts.get(known.part) ?? 0) + worth);
  }
  const statistical = Math.log10(equivalents) * (site.kind === 'acid' ? -1 : 1);
  const doubt = family.value ** 2 + novelty * (estimator.variances.get('novelty') ?? 1);
  const sd = Math.min(UNKNOWN_SD, Math.sqrt(doubt));
  return {
    value: value + statistical,
    sd,
    scale: 'water',
    origin: 'estimated',
    sources: FIT_SOURCES,
    hops: hopsOf(parts, statistical, sd),
  };
}

/** A family with no more molecules in the fit speaks only for groups that the fit has met; carbon acids need as many of their group,
 * and rules with a fixed value at least two. */
const FEW = 4;
function fromParent(parent: ParentRow | undefined): Constant | null {
  if (parent === undefined || parent.water === null) return null;
  const sd = Math.hypot(parent.waterSd ?? UNKNOWN_SD, parent.model === 'fixed' ? 0 : STAND_IN_SD);
  return {
    value: parent.water,
    sd,
    scale: 'water',
    origin: 'estimated',
    sources: parent.sources,
    hops: [{ what: `value of the group “${parent.name}”`, value: parent.water, sd, sources: parent.sources }],
  };
}

/** Share of the prior variance of a term that is left once `n` molecules of the fit have shown it. */
export function doubtLeft(n: number): number {
  return (1 + n) ** -2;
}

/** The terms' values by the question that they answer. */
function hopsOf(parts: ReadonlyMap<string, number>, statistical: number, sd: number): Hop[] {
  const hops: Hop[] = [...parts].map(([what, value]) => ({
    what,
    value: what === PARENT ? value + MIDDLE : value,
    sd: what === PARENT ? sd : 0,
    sources: FIT_SOURCES,
  }));
  if (statistical !== 0) hops.push({ what: 'equivalent sites', value: statistical, sd: 0, sources: [] });
  return hops;
}

const PARENT = 'parent acid or base';
const PARTS: Readonly<Record<string, string>> = {
  series: PARENT,
  group: PARENT,
  near1: PARENT,
  near3: PARENT,
  frameany: 'ring system',
  aza: 'heteroatoms of the ring system',
  fused: 'rings fused to the ring system',
  tied: 'rings fused to the ring system',
  'sigma-m': 'substituents on the ring (σ)',
  'sigma-p': 'substituents on the ring (σ)',
  'sigma-minus': 'substituents on the ring (σ)',
  'sigma-plus': 'substituents on the ring (σ)',
  sub0: 'corrections for these substituents',
  sub1: 'corrections for these substituents',
  sub2: 'corrections for these substituents',
  bend: 'several substituents at once',
  bendany: 'several substituents at once',
  crowd: 'crowding in both ortho positions',
  beside: 'atoms beside the site',
  pair: 'atoms beside the site',
  charge: 'charges',
};

function unknownTerm(name: string, { variances }: Pick<Estimator, 'variances'>): { readonly doubt: number } {
  return { doubt: variances.get(termClass(name)) ?? 0 };
}

function partOf(name: string): string {
  return (
    PARTS[name.slice(0, name.indexOf(':'))] ??
    (name.startsWith('ring') ? 'ring size' : 'atoms along the chain')
  );
}

function estimatorOf(tables: EstimatorTables): Estimator {
  const known = estimators.get(tables);
  if (known !== undefined) return known;
  const variances = new Map(
    tables.spreads.filter(({ kind }) => kind === 'term').map(({ name, value }) => [name, value]),
  );
  const made: Estimator = {
    substituents: readSubstituents(tables.substituents),
    values: new Map(
      tables.terms.map(({ name, value, n }) => {
        const doubt = unknownTerm(name, { variances }).doubt * doubtLeft(n);
        return [name, { value, n, doubt, part: partOf(name) }];
      }),
    ),
    families: new Map(tables.spreads.filter(({ kind }) => kind === 'family').map((row) => [row.name, row])),
    variances,
    parents: new Map(tables.groups.map((row) => [row.id, row])),
  };
  estimators.set(tables, made);
  return made;
}
