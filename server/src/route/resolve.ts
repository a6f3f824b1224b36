/**
 * Resolves a whole text into a plan, reading anew only what changed since the last time.
 *
 * Knows: text, tables, files handed in.  Must not know: acidity, flasks, checks, disks.
 * Invariants:
 *  1. Never throws; what cannot be read is a problem at its place and the rest is resolved.   (tests/route/resolve.test.ts)
 *  2. A reader that has seen other versions gives the same plan as a fresh one.               (tests/route/incremental.test.ts)
 *  3. Steps with equal content keys are equal but for their first line.                       (same)
 */
import type { Tables } from '../tables/tables.ts';
import { compoundsDefinedTwice, labelsUsedTwice } from './defined-twice.ts';
import { type BlockDefinitions, definitionsOf, internDefinition } from './definitions.ts';
import { type Block, type Language, type RouteDocument, readDocument } from './document.ts';
import type { Before } from './draft.ts';
import { rangeOf } from './names.ts';
import type { AcceptStatement, Compound, Definition, Plan, Range, Step, TextProblem } from './plan.ts';
import { resolveStep } from './step.ts';
import { followUses, placed, shiftRange } from './use.ts';

export interface PlanText {
  /** Relative to the workspace, with `/` between its parts. */
  readonly file: string;
  readonly text: string;
  readonly language: Language;
}

export interface ReaderOptions {
  /** mol/L where no volume is written. */
  readonly concentration?: number;
}

/** Resolves texts against one set of tables and remembers what it has resolved. */
export interface PlanReader {
  /** `files` holds the texts that `use` may bring in, by path; null where one is missing. */
  resolve(source: PlanText, files?: ReadonlyMap<string, string | null>): Plan;
}

interface ResolvedBlock {
  readonly definitions: readonly (Definition | undefined)[];
  readonly before: string | null;
  readonly step: Step;
  readonly after: Before;
}

/** A step at its last place; made anew where it has moved. */
interface Standing {
  readonly core: Step;
  readonly step: Step;
}

/** Resolves one text once. */
export function resolvePlan(
  text: string,
  {
    file,
    language,
    tables,
    files,
  }: { file: string; language: Language; tables: Tables; files?: ReadonlyMap<string, string | null> },
): Plan {
  return createPlanReader(tables).resolve({ file, text, language }, files);
}

/** A reader for one set of tables. */
export function createPlanReader(tables: Tables, options: ReaderOptions = {}): PlanReader {
  const defined = new WeakMap<Block, BlockDefinitions>();
  const resolved = new WeakMap<Block, ResolvedBlock>();
  const standing = new WeakMap<Block, Standing>();
  const compoundsAt = new WeakMap<BlockDefinitions, { firstLine: number; compounds: readonly Compound[] }>();
  const broughtDefinitions = new WeakMap<Compound, Definition>();
  let last: { file: string; language: Language; document: RouteDocument } | null = null;
  const definitions = (block: Block): BlockDefinitions => {
    const known = defined.get(block);
    if (known !== undefined) return known;
    const fresh = definitionsOf(block, undefined, tables);
    defined.set(block, fresh);
    return fresh;
  };

  const resolveBlock = (
    block: Block,
    declared: ReadonlyMap<string, Definition>,
    before: { key: string; after: Before } | null,
  ): ResolvedBlock => {
    const used = block.mentions.map((name) => declared.get(name));
    const known = resolved.get(block);
    const beforeKey = before?.key ?? null;
    if (
      known !== undefined &&
      known.before === beforeKey &&
      known.definitions.every((each, at) => each === used[at])
    ) {
      return known;
    }
    const { step, after } = resolveStep(block, {
      tables,
      declared,
      before: before?.after ?? null,
      ...(options.concentration === undefined ? {} : { concentration: options.concentration }),
    });
    const contentKey = JSON.stringify([
      block.text,
      used.map((each) => each ?? null),
      beforeKey && digest(beforeKey),
    ]);
    const fresh = { definitions: used, before: beforeKey, step: { ...step, contentKey }, after };
    resolved.set(block, fresh);
    return fresh;
  };

  const compoundsOf = (found: BlockDefinitions, firstLine: number): readonly Compound[] => {
    const known = compoundsAt.get(found);
    if (known?.firstLine === firstLine) return known.compounds;
    const compounds = placed(found, firstLine);
    compoundsAt.set(found, { firstLine, compounds });
    return compounds;
  };

  const definitionOf = (compound: Compound): Definition => {
    const known = broughtDefinitions.get(compound);
    if (known !== undefined) return known;
    const { name, smiles, file, measured } = compound;
    const definition = internDefinition({ name, smiles, file, measured });
    broughtDefinitions.set(compound, definition);
    return definition;
  };

  const place = (block: Block, core: Step, firstLine: number): Step => {
    const known = standing.get(block);
    if (known?.core === core && known.step.firstLine === firstLine) return known.step;
    const step = { ...core, firstLine };
    standing.set(block, { core, step });
    return step;
  };

  return {
    resolve({ file, text, language }, files = new Map()) {
      const previous = last?.file === file && last.language === language ? last.document : undefined;
      const document = readDocument(text, language, previous);
      last = { file, language, document };
      const problems: TextProblem[] = [];
      const accepts: AcceptStatement[] = [];
      const own: Compound[] = [];
      const uses: { path: string; range: TextProblem['range'] }[] = [];
      const declared = new Map<string, Definition>();
      let title: string | null = null;
      for (const { block, firstLine } of document.blocks) {
        const found = definitions(block);
        title ??= found.title;
        for (const problem of found.problems) problems.push(moved(problem, firstLine));
        for (const { path, range } of found.uses) uses.push({ path, range: shiftRange(range, firstLine) });
        for (const statement of found.accepts) accepts.push(movedAccept(statement, firstLine));
        if (found.compounds.length === 0) continue;
        for (const { definition } of found.compounds) {
          if (!declared.has(definition.name)) declared.set(definition.name, definition);
        }
        own.push(...compoundsOf(found, firstLine));
      }
      const brought = followUses(file, uses, files, tables);
      problems.push(...brought.problems);
      for (const { compound } of brought.compounds) {
        if (!declared.has(compound.name)) declared.set(compound.name, definitionOf(compound));
      }
      if (declared.size < own.length + brought.compounds.length) {
        problems.push(...compoundsDefinedTwice(own, brought.compounds));
      }
      const steps = resolveSteps(document.blocks, declared, resolveBlock, place, problems);
      if (steps.length !== 0) problems.push(...unused(own, document.blocks));
      problems.sort(inOrder);
      const compounds = [...own, ...brought.compounds.map(({ compound }) => compound)];
      return { title, compounds, steps, accepts, problems, needs: brought.needs, document };
    },
  };
}

type PlacedBlocks = Plan['document']['blocks'];

function resolveSteps(
  blocks: PlacedBlocks,
  declared: ReadonlyMap<string, Definition>,
  resolveBlock: (
    block: Block,
    declared: ReadonlyMap<string, Definition>,
    before: { key: string; after: Before } | null,
  ) => ResolvedBlock,
  place: (block: Block, core: Step, firstLine: number) => Step,
  problems: TextProblem[],
): Step[] {
  const steps: Step[] = [];
  const byLabel = new Map<string, { key: string; after: Before }>();
  const labels = new Map<string, Range[]>();
  for (const { block, firstLine } of blocks) {
    if (!block.isStep) continue;
    const head = block.lines[0]!.syntax;
    const opening = head?.keyword === 'step' ? head : null;
    const from = opening?.continues ?? null;
    const before = from === null ? null : (byLabel.get(from.label) ?? null);
    const { step: core, after } = resolveBlock(block, declared, before);
    const step = place(block, core, firstLine);
    steps.push(step);
    if (from !== null && before === null) {
      problems.push({
        check: 'unknown-name',
        message: `No step above this one is called ${from.label}; a new flask is assumed.`,
        severity: 'error',
        range: rangeOf(firstLine, from.span),
      });
    }
    if (opening === null) continue;
    if (!byLabel.has(step.label)) byLabel.set(step.label, { key: step.contentKey, after });
    const range = shiftRange(step.labelRange, firstLine);
    const places = labels.get(step.label);
    if (places === undefined) labels.set(step.label, [range]);
    else places.push(range);
  }
  for (const [label, places] of labels) problems.push(...labelsUsedTwice(label, places));
  return steps;
}

function unused(own: readonly Compound[], blocks: PlacedBlocks): TextProblem[] {
  const mentioned = new Set<string>();
  for (const { block } of blocks) if (block.isStep) for (const name of block.mentions) mentioned.add(name);
  return own
    .filter(({ name }) => !mentioned.has(name))
    .map(({ name, nameRange }) => ({
      check: 'unused-compound',
      message: `No step mentions compound ${name}.`,
      range: nameRange,
    }));
}

function moved(problem: TextProblem, lines: number): TextProblem {
  return { ...problem, range: shiftRange(problem.range, lines) };
}

function movedAccept(statement: AcceptStatement, lines: number): AcceptStatement {
  return {
    ...statement,
    range: shiftRange(statement.range, lines),
    keywordRange: shiftRange(statement.keywordRange, lines),
    checkRange: shiftRange(statement.checkRange, lines),
  };
}

function inOrder(a: TextProblem, b: TextProblem): number {
  const [x, y] = [a.range.start, b.range.start];
  return x.line - y.line || x.character - y.character || (a.check < b.check ? -1 : a.check > b.check ? 1 : 0);
}

/** A short stand-in for a long key: two independent 53-bit hashes, so that equal stands for equal in practice. */
export function digest(text: string): string {
  const mix = (seed: number) => {
    let high = 0xdeadbeef ^ seed;
    let low = 0x41c6ce57 ^ seed;
    for (let at = 0; at < text.length; at++) {
      const code = text.charCodeAt(at);
      high = Math.imul(high ^ code, 2654435761);
      low = Math.imul(low ^ code, 1597334677);
    }
    high = Math.imul(high ^ (high >>> 16), 2246822507) ^ Math.imul(low ^ (low >>> 13), 3266489909);
    low = Math.imul(low ^ (low >>> 16), 2246822507) ^ Math.imul(high ^ (high >>> 13), 3266489909);
    return (4294967296 * (2097151 & low) + (high >>> 0)).toString(36);
  };
  return `${mix(1)}.${mix(2)}`;
}
