/**
 * The sites that the rules of `groups.csv` find in a molecule, for tools that run before the tables are built.
 *
 * Must not know: values.
 */
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { countedSites } from '../src/chemistry/boron.ts';
import { buildGraph } from '../src/chemistry/build-graph.ts';
import type { EstimatorTables, ParentRow } from '../src/chemistry/estimate.ts';
import type { Graph } from '../src/chemistry/graph.ts';
import { matchSites } from '../src/chemistry/match.ts';
import { neutralForm } from '../src/chemistry/neutral.ts';
import { type Pattern, parseSmarts } from '../src/chemistry/smarts.ts';
import { readSmiles } from '../src/chemistry/smiles.ts';
import type { Site } from '../src/chemistry/terms.ts';
import { canonicalKey, symmetryClasses } from '../src/chemistry/toolkit.ts';
import type { SubstituentRow } from '../src/tables/rows.ts';

export interface Rule extends ParentRow {
  readonly kind: 'acid' | 'base';
  readonly family: string;
  readonly priority: number;
  readonly example: string;
  readonly pattern: Pattern;
}

export interface RuleSite extends Site {
  readonly rule: Rule;
  readonly equivalents: number;
  /** All atoms of the class, this one included. */
  readonly equals: readonly number[];
  /** Whether a mark :1 stands on this site or its equals. */
  readonly marked: boolean;
}

export function readRules(file: string): Rule[] {
  return records(file).map((row) => ({
    id: row.id!,
    name: row.name!,
    kind: row.kind === 'base' ? 'base' : 'acid',
    family: row.family!,
    priority: Number(row.priority),
    example: row.example!,
    pattern: parseSmarts(row.smarts!),
    water: number(row.water),
    waterSd: number(row.water_sd),
    model: row.model!,
    sources: row.sources!.split(';'),
  }));
}

/** A published constant of a parent molecule, its site marked. */
export interface ParentValue {
  readonly smiles: string;
  readonly kind: 'acid' | 'base';
  readonly pKa: number;
  readonly sd: number;
}

export function readParents(file: string): ParentValue[] {
  return records(file).map((row) => ({
    smiles: row.smiles!,
    kind: row.kind === 'base' ? 'base' : 'acid',
    pKa: Number(row.water),
    sd: Number(row.water_sd),
  }));
}

/** One name for one molecule, however it is written. */
export function moleculeKey(smiles: string): string {
  const { structure } = readSmiles(smiles);
  const built = structure === undefined ? undefined : buildGraph(structure);
  if (built?.graph === undefined) return smiles;
  const { graph } = neutralForm(built.graph);
  return graph.fragments.map((fragment) => canonicalKey(graph, fragment) ?? '?').join(' ');
}

/** One site for each class of equivalent atoms; null where the text cannot be read. */
export function sitesByRule(
  smiles: string,
  rules: readonly Rule[],
): { graph: Graph; sites: RuleSite[] } | null {
  const { structure } = readSmiles(smiles);
  const built = structure === undefined ? undefined : buildGraph(structure);
  if (built?.graph === undefined) return null;
  const { graph } = neutralForm(built.graph);
  const best = new Map<string, { atom: number; rule: Rule }>();
  for (const rule of rules) {
    for (const atom of matchSites(graph, rule.pattern)) {
      const key = `${rule.kind} ${atom}`;
      const known = best.get(key);
      if (known === undefined || known.rule.priority < rule.priority) best.set(key, { atom, rule });
    }
  }
  const counted = new Set(
    (['acid', 'base'] as const).flatMap((kind) => {
      const ofKind = [...best.values()].filter(({ rule }) => rule.kind === kind);
      const families = new Map(ofKind.map(({ atom, rule }) => [atom, rule.family]));
      const kept = countedSites(
        graph,
        [...families.keys()],
        (atom) => families.get(atom)!,
        () => false,
      );
      return kept.map((atom) => `${kind} ${atom}`);
    }),
  );
  const classes = new Map<number, number>();
  for (const fragment of graph.fragments)
    for (const [atom, rank] of symmetryClasses(graph, fragment)) classes.set(atom, rank);
  const groups = new Map<string, { atom: number; rule: Rule; equals: number[] }>();
  for (const { atom, rule } of best.values()) {
    if (!counted.has(`${rule.kind} ${atom}`)) continue;
    const key = `${rule.kind} ${classes.get(atom)}`;
    const known = groups.get(key);
    if (known === undefined) groups.set(key, { atom, rule, equals: [atom] });
    else known.equals.push(atom);
  }
  const marked = new Set(
    graph.atoms.filter(({ mapNumber }) => mapNumber === 1).map(({ index }) => classes.get(index)),
  );
  const sites = [...groups.values()].map(({ atom, rule, equals }) => ({
    atom,
    kind: rule.kind,
    group: rule.id,
    family: rule.family,
    rule,
    equivalents: equals.length,
    equals,
    marked: marked.has(classes.get(atom)),
  }));
  return { graph, sites };
}

export function readSubstituentRows(file: string): SubstituentRow[] {
  return records(file).map((row) => ({
    name: row.name!,
    smiles: row.smiles!,
    sigmaM: Number(row.sigma_m),
    sigmaP: Number(row.sigma_p),
    sigmaPMinus: number(row.sigma_p_minus),
    sigmaPPlus: number(row.sigma_p_plus),
    sources: row.sources!.split(';'),
    basis: row.basis === 'checked' ? 'checked' : 'recalled',
    note: row.note!,
  }));
}

/** The estimator's tables straight from their files. */
export function readEstimatorTables(folder: string, groups: readonly Rule[]): EstimatorTables {
  return {
    groups,
    substituents: readSubstituentRows(`${folder}/substituents.csv`),
    terms: records(`${folder}/terms.csv`).map((row) => ({
      name: row.name!,
      value: Number(row.value),
      n: Number(row.n),
    })),
    spreads: records(`${folder}/spreads.csv`).map((row) => ({
      kind: row.kind === 'family' ? 'family' : 'term',
      name: row.name!,
      value: Number(row.value),
      n: Number(row.n),
    })),
  };
}

function records(file: string): Record<string, string>[] {
  return parse(readFileSync(file, 'utf8'), { columns: true, bom: true }) as Record<string, string>[];
}

function number(text: string | undefined): number | null {
  return text === undefined || text === '' ? null : Number(text);
}
