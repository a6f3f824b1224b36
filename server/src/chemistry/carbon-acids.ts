/**
 * Estimates in DMSO of carbon acids and of N–H acids whose nitrogen is no part of an aromatic ring.
 *
 * Each group on the site lowers the constant of the parent (methane, ammonia) by its resonance, which runs into a
 * limit, and by its field, which fades as the resonance spreads the charge. What a pair of groups does beyond that is
 * a row of its own.
 * Knows: graphs, rows of `activation`.  Must not know: measured values, flasks, plans.
 * Invariants: the estimate does not depend on how the molecule is written.   (tests/chemistry/carbon-acids.test.ts)
 * Units: pKa in DMSO at 25 °C.
 * Sources: fitted to the values of Bordwell 1988 and related papers in `measured`; see `server/tools/fit-activation.ts`.
 */
import type { ActivationRow, ScaleId, SubstituentRow } from '../tables/rows.ts';
import { type Activator, activatorsOf, isModifier } from './activators.ts';
import type { Constant, Couple, Hop, Perceived } from './couple.ts';
import type { Graph } from './graph.ts';
import { neutralForm } from './neutral.ts';
import { carry, type ScaleTables } from './scales.ts';
import { readSubstituents, type Substituents } from './substituents.ts';

export interface ActivationTables extends ScaleTables {
  readonly activation: readonly ActivationRow[];
  readonly substituents: readonly SubstituentRow[];
}

/** Worth of one group on one kind of centre. */
export interface Activation {
  readonly field: number;
  readonly resonance: number;
  /** Resonance for each unit of substituent constant on its arene. */
  readonly sigma: number;
  /** Molecules of the fit that carry it. */
  readonly n: number;
}

export interface ActivationModel {
  readonly parent: number;
  /** What resonance can reach at the most. */
  readonly limit: number;
  /** Resonance that leaves 1/e of the field: a charge spread out is pulled less. */
  readonly screening: number;
  readonly sd: number;
  readonly groups: ReadonlyMap<string, Activation>;
}

/** Names of the rows that are no groups. */
export const PARENT = '(parent)';
export const LIMIT = '(limit of resonance)';
export const SCREENING = '(screening)';
export const SPREAD = '(spread)';

const CENTRES = ['C', 'N'] as const;
export type Centre = (typeof CENTRES)[number];

const HALOGENS = new Set(['F', 'Cl', 'Br', 'I']);

/** Groups seen in fewer molecules than this add to the doubt. */
export const WELL_KNOWN = 4;
const RARE_SD = 2;
/** A group that no molecule of the fit carries counts as its prior says, with this doubt. */
const UNSEEN_SD = 3;

/** No N–H acid of the fit is as strong; two sulfonyl groups, say, do not add up. */
const LOWEST_ON_NITROGEN = 0;

interface Prepared {
  readonly models: ReadonlyMap<string, ActivationModel>;
  readonly substituents: Substituents;
}

const prepared = new WeakMap<ActivationTables, Prepared>();
const neutralGraphs = new WeakMap<Graph, Graph>();

/**
 * The estimate on an aprotic scale; null where the site is of another kind or carries a group without a row.
 *
 * Scales other than DMSO are reached from there by the line of the site's family.
 */
export function estimateNonAqueous(
  perceived: Perceived,
  couple: Couple,
  scale: ScaleId,
  tables: ActivationTables,
): Constant | null {
  if (perceived.graph === null || couple.kind !== 'acid') return null;
  const { models, substituents } = preparedFor(tables);
  const model = models.get(couple.element);
  if (model === undefined) return null;
  const activators = activatorsOf(neutralGraph(perceived.graph), couple.atom, substituents);
  if (activators === null || onlyHalogens(activators)) return null;
  if (activators.some(({ name }) => !model.groups.has(name))) return null;
  const constant = describe(activators, model, couple);
  if (couple.element === 'N' && constant.value < LOWEST_ON_NITROGEN) return null;
  return scale === 'DMSO' ? constant : carry(constant, couple, scale, tables);
}

/** pKa in DMSO of a site with these groups; every group must have a row. */
export function activatedValue(
  activators: readonly Activator[],
  { parent, limit, screening, groups }: ActivationModel,
): number {
  let [field, resonance] = [0, 0];
  for (const { name, count, sigma } of activators) {
    const group = groups.get(name)!;
    field += group.field * count;
    resonance += group.resonance * count + group.sigma * sigma;
  }
  const together = pairsOf(activators).reduce((sum, name) => sum + (groups.get(name)?.field ?? 0), 0);
  const held = field * Math.exp(-Math.max(0, resonance) / screening);
  return parent - held - saturated(resonance, limit) - together;
}

/** Whether nothing but halogens stands there: what haloforms do, no other acid foretells. */
export function onlyHalogens(activators: readonly Activator[]): boolean {
  return 0 < activators.length && activators.every(({ name }) => HALOGENS.has(name));
}

/** Names of the pairs of groups that meet at a site; a group alone makes a pair with nothing. */
export function pairsOf(activators: readonly Activator[]): string[] {
  const groups = activators.filter(({ name }) => !isModifier(name));
  if (groups.length === 1 && groups[0]!.count === 1) return [`${groups[0]!.name}&`];
  const names = groups.flatMap(({ name, count }) => (1 < count ? [name, name] : [name])).sort();
  const pairs = names.flatMap((first, place) => names.slice(place + 1).map((second) => `${first}&${second}`));
  return [...new Set(pairs)];
}

/** Grows like `x` at first and comes to rest at the limit; what raises the constant is not held back. */
function saturated(x: number, limit: number): number {
  return x < 0 ? x : limit * (1 - Math.exp(-x / limit));
}

function describe(activators: readonly Activator[], model: ActivationModel, couple: Couple): Constant {
  const value = activatedValue(activators, model);
  const doubt = activators.map(({ name }) => {
    const { n } = model.groups.get(name)!;
    return n === 0 ? UNSEEN_SD : n < WELL_KNOWN ? RARE_SD : 0;
  });
  const sd = Math.hypot(model.sd, ...doubt);
  const sources = ['bordwell-1988'];
  const named = activators.map(({ name, count }) => (count === 1 ? name : `${count} × ${name}`)).join(', ');
  const parentHop: Hop = {
    what: couple.element === 'C' ? 'methane in DMSO' : 'ammonia in DMSO',
    value: model.parent,
    sd: 0,
    sources,
  };
  const hop: Hop = {
    what: named === '' ? 'no activating group' : `with ${named}`,
    value: value - model.parent,
    sd,
    sources,
  };
  return { value, sd, scale: 'DMSO', origin: 'estimated', sources, hops: [parentHop, hop] };
}

/** The rows of one kind of centre as a model. */
export function readModel(rows: readonly ActivationRow[], centre: Centre): ActivationModel {
  const own = rows.filter((row) => row.centre === centre);
  const special = (name: string) => own.find((row) => row.name === name)?.field ?? 0;
  const groups = own.filter(({ name }) => !name.startsWith('('));
  return {
    parent: special(PARENT),
    limit: special(LIMIT),
    screening: special(SCREENING),
    sd: special(SPREAD),
    groups: new Map(
      groups.map(({ name, field, resonance, sigma, n }) => [name, { field, resonance, sigma, n }]),
    ),
  };
}

function preparedFor(tables: ActivationTables): Prepared {
  let found = prepared.get(tables);
  if (found === undefined) {
    found = {
      models: new Map(CENTRES.map((centre) => [centre, readModel(tables.activation, centre)])),
      substituents: readSubstituents(tables.substituents),
    };
    prepared.set(tables, found);
  }
  return found;
}

function neutralGraph(graph: Graph): Graph {
  let found = neutralGraphs.get(graph);
  if (found === undefined) {
    found = neutralForm(graph).graph;
    neutralGraphs.set(graph, found);
  }
  return found;
}
