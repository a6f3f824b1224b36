/**
 * Bases (acids) and solvents that make an intended transfer, each tried out in its step with every check, with the change
 * of the text that takes it.
 *
 * Knows: analysed plans.  Must not know: files, the protocol, how a list is shown.
 * Units: K, mol; ranges of edits are those of the document.
 * Invariants:
 *  1. The step as edited raises no error that it did not raise before.        (tests/answers/suggest.test.ts)
 *  2. No more than `MOST_TRIED` steps are worked for one transfer.            (same)
 */

import type { StepFacts, TransferFact } from '../checks/facts.ts';
import { perceive } from '../chemistry/perceive.ts';
import type { Ingredient, Site, Verdict } from '../flask/state.ts';
import { type Option, type Reason, type Rejection, screen } from '../flask/suggest.ts';
import type { Step } from '../route/plan.ts';
import type { ReagentRow, SolventRow } from '../tables/rows.ts';
import type { Edit } from './fix.ts';
import { stepAt } from './steps.ts';
import { editsFor, type Swap } from './suggest-edits.ts';
import { createTrial, type Remark, type Trial } from './suggest-trial.ts';
import type { Analysed, AnalysedStep } from './types.ts';

export interface Suggestion {
  readonly option: Option;
  /** Other solvents in which the same reagent does it about as well, best first. */
  readonly alsoIn: readonly string[];
  /** Warnings that the step would raise with it and does not raise now. */
  readonly cautions: readonly Remark[];
  /** "LDA in THF" */
  readonly title: string;
  readonly edits: readonly Edit[];
}

/** Why a reagent, or a solvent where there is no reagent, is not among the suggestions. */
export interface Refusal {
  readonly reagent: ReagentRow | null;
  readonly solvent: SolventRow | null;
  readonly reason: Reason | { readonly kind: 'finding'; readonly remark: Remark };
}

export interface Suggestions {
  readonly step: string;
  /** Of the transfer, from 0. */
  readonly line: number;
  readonly direction: 'deprotonate' | 'protonate';
  readonly compound: string;
  readonly site: Site;
  /** The flask as written: what acts, in what, and how it goes. */
  readonly asWritten: {
    readonly acting: readonly string[];
    readonly solvents: readonly string[];
    readonly verdict: Verdict;
  };
  /** Best first. */
  readonly list: readonly Suggestion[];
  /** One for each reagent without a suggestion, the nearest miss; then solvents that are not proposed at all. */
  readonly refusals: readonly Refusal[];
  /** Every pair of reagent and solvent that the screening refused. */
  readonly pairs: readonly Rejection[];
  readonly namesOf: ReadonlyMap<number, string>;
}

/** ordinary: what is rare is looked at only where nothing ordinary does it. */
export type Breadth = 'ordinary' | 'all';

const MOST_TRIED = 20;
const LEAST_TRIED = 1;
/** Statements of a step up to which that many are tried. */
const USUAL_LENGTH = 20;
/** Solvents of one reagent that are tried before it is refused. */
const TRIES = 3;
const USUAL_EQUIV = 1.1;
const CATALYTIC = 0.35;
/** Units of cost that a warning stands for, and by which another solvent may lie behind the best. */
const CAUTION_COST = 2;
const NEAR = 1.5;
const MOST_ALSO = 4;

/** Suggestions for each transfer of the step at a line, or for the one on that line; empty outside steps. */
export function suggestionsAt(
  analysed: Analysed,
  line: number,
  breadth: Breadth = 'ordinary',
): Suggestions[] {
  const found = stepAt(analysed, line);
  if (found === null) return [];
  const { transfers } = found.step.facts;
  const onLine = transfers.filter(({ statement }) => statement.range.start.line === line - found.firstLine);
  const wanted = onLine.length === 0 ? transfers : onLine;
  return wanted.flatMap((fact) => suggestionsFor(analysed, found.step, found.firstLine, fact, breadth) ?? []);
}

/** Suggestions for every transfer of a step; null where the plan has no such step. */
export function suggestionsOf(
  analysed: Analysed,
  label: string,
  breadth: Breadth = 'ordinary',
): Suggestions[] | null {
  const index = analysed.plan.steps.findIndex((step) => step.label === label);
  return index === -1 ? null : suggestionsAt(analysed, analysed.plan.steps[index]!.firstLine, breadth);
}

/** What was worked out for a transfer, without the place of its step. */
interface Worked extends Omit<Suggestions, 'line' | 'list'> {
  readonly list: readonly Tried[];
}

/** Remembered as long as the step is: working a transfer out takes long, and the cursor asks for it again and again. */
const remembered = new WeakMap<TransferFact, Map<Breadth, Worked | null>>();

function suggestionsFor(
  analysed: Analysed,
  step: AnalysedStep,
  firstLine: number,
  fact: TransferFact,
  breadth: Breadth,
): Suggestions | null {
  const known = remembered.get(fact) ?? new Map<Breadth, Worked | null>();
  remembered.set(fact, known);
  let worked = known.get(breadth);
  if (worked === undefined) {
    worked = workOut(analysed, step, fact, breadth);
    known.set(breadth, worked);
  }
  if (worked === null) return null;
  return {
    ...worked,
    line: firstLine + fact.statement.range.start.line,
    list: worked.list.map(({ swap, ...one }) => ({ ...one, edits: editsFor(analysed, firstLine, swap) })),
  };
}

function workOut(
  analysed: Analysed,
  step: AnalysedStep,
  fact: TransferFact,
  breadth: Breadth,
): Worked | null {
  const { facts } = step;
  const { statement, contents, ingredient, convert } = fact;
  const verdict = hardest(fact.verdicts, statement.keyword);
  if (ingredient?.molecule == null || verdict === null) return null;
  const loses = statement.keyword === 'deprotonate';
  const acting = actingOf(fact, verdict);
  const stocks = carriersOf(facts, acting);
  const solvents = contents.ingredients.filter(({ id, role }) => role === 'solvent' && !stocks.includes(id));
  const product = convert?.to[0]?.substance.smiles ?? null;
  const couples = ingredient.molecule.couples.flatMap((couple, place) =>
    couple.kind === verdict.site.couple.kind && couple.atom === verdict.site.couple.atom ? [place] : [],
  );
  const screening = screen(
    {
      contents,
      intent: {
        ingredient: ingredient.id,
        couples,
        direction: statement.keyword,
        isConsumed: convert !== null,
        product: product === null ? null : perceive(product, facts.tables),
      },
      acting: [...acting.map(({ id }) => id), ...stocks],
      solvents: solvents.map(({ id }) => id),
      equiv: equivOf(acting, ingredient, Math.max(1, statement.sites.length)),
      where: canChange(facts, solvents) ? 'anywhere' : 'as-written',
      breadth,
    },
    facts.tables,
    facts.settings.thresholds,
  );
  const { label } = facts.step.continues ?? {};
  const before = analysed.steps.find((one) => one.facts.step.label === label)?.facts ?? null;
  const trial = createTrial(facts, before, fact, acting, loses);
  const { list, refused } = tryOut(screening.options, trial, mostTried(facts.step));
  const misses = new Map<ReagentRow, Refusal>(refused.map((one) => [one.reagent!, one]));
  const offered = new Set(list.map(({ option }) => option.reagent));
  const solventsOut: Refusal[] = [];
  for (const rejection of screening.rejections) {
    const { reagent } = rejection;
    if (reagent === null) solventsOut.push(rejection);
    else if (!offered.has(reagent)) {
      const before = misses.get(reagent);
      if (before === undefined || nearness(rejection) < nearness(before)) misses.set(reagent, rejection);
    }
  }
  return {
    step: facts.step.label,
    direction: statement.keyword,
    compound: statement.substance.name,
    site: verdict.site,
    asWritten: {
      acting: acting.map(({ name }) => name),
      solvents: solvents.map(({ name }) => name),
      verdict,
    },
    list,
    refusals: [...[...misses.values()].sort(byShortfall), ...solventsOut],
    pairs: screening.rejections,
    namesOf: new Map(contents.ingredients.map(({ id, name }) => [id, name])),
  };
}

/** The site that is hardest to move. */
function hardest(verdicts: readonly Verdict[], keyword: 'deprotonate' | 'protonate'): Verdict | null {
  const sign = keyword === 'deprotonate' ? 1 : -1;
  return verdicts.reduce<Verdict | null>(
    (most, one) =>
      most === null || 0 < sign * (one.site.constant.value - most.site.constant.value) ? one : most,
    null,
  );
}

/** The bases (acids) as written; where none is called so, what acts by the judge, if it was charged for that. */
function actingOf(
  { contents, statement, ingredient }: TransferFact,
  { broughtBy, partner }: Verdict,
): Ingredient[] {
  const role = statement.keyword === 'deprotonate' ? 'base' : 'acid';
  const called = contents.ingredients.filter((one) => one.role === role && one.id !== ingredient?.id);
  if (called.length !== 0) return called;
  const id = broughtBy ?? partner?.ingredient;
  return contents.ingredients.filter((one) => one.id === id && one.role === 'reagent');
}

/** Ids of the solvents that the stock solutions of what acts brought along. */
function carriersOf({ additions }: StepFacts, acting: readonly Ingredient[]): number[] {
  const statements = additions.flatMap(({ ingredient, statement }) =>
    statement !== null && acting.some(({ id }) => id === ingredient.id) ? [statement] : [],
  );
  return additions.flatMap(({ ingredient, statement }) =>
    ingredient.role === 'solvent' && statement !== null && statements.includes(statement)
      ? [ingredient.id]
      : [],
  );
}

/** Whether the solvents stand in lines of this step, or there is none yet. */
function canChange({ additions }: StepFacts, solvents: readonly Ingredient[]): boolean {
  return solvents.every(({ id }) =>
    additions.some(({ ingredient, statement }) => ingredient.id === id && statement?.keyword === 'solvent'),
  );
}

/** mol for each mol of the site: a catalytic amount and a slight excess stay as they are. */
function equivOf(acting: readonly Ingredient[], { mol }: Ingredient, sites: number): number {
  const written = mol === 0 ? 0 : acting.reduce((sum, one) => sum + one.mol, 0) / mol;
  if (0 < written && written < CATALYTIC) return written;
  const needed = USUAL_EQUIV * sites;
  return 1 < written && written <= needed ? written : needed;
}

interface Tried extends Omit<Suggestion, 'edits'> {
  readonly swap: Swap;
  readonly cost: number;
}

/** The best solvent of each reagent that stands the checks; what falls with all that are tried is refused. */
function tryOut(
  options: readonly Option[],
  trial: Trial,
  most: number,
): { list: Tried[]; refused: Refusal[] } {
  const byReagent = new Map<ReagentRow, Option[]>();
  for (const option of options) {
    const list = byReagent.get(option.reagent);
    if (list === undefined) byReagent.set(option.reagent, [option]);
    else list.push(option);
  }
  const list: Tried[] = [];
  const refused: Refusal[] = [];
  let tried = 0;
  for (const [reagent, own] of byReagent) {
    let failure: Remark | null = null;
    for (const option of own.slice(0, TRIES)) {
      if (most <= tried) break;
      tried++;
      const { swap, errors, cautions } = trial(option);
      if (errors[0] !== undefined) {
        failure ??= errors[0];
        continue;
      }
      const others = own.filter((one) => one !== option && one.cost <= option.cost + NEAR);
      const alsoIn = others
        .flatMap(({ solvent }) => (solvent === null ? [] : [solvent.name]))
        .slice(0, MOST_ALSO);
      const title = option.solvent === null ? reagent.name : `${reagent.name} in ${option.solvent.name}`;
      const cost = option.cost + CAUTION_COST * cautions.length;
      list.push({ option, alsoIn, cautions, title, swap, cost });
      failure = null;
      break;
    }
    if (failure !== null)
      refused.push({ reagent, solvent: null, reason: { kind: 'finding', remark: failure } });
    else if (list.at(-1)?.option.reagent !== reagent)
      refused.push({ reagent, solvent: null, reason: { kind: 'not-reached' } });
  }
  return { list: list.sort((a, b) => a.cost - b.cost), refused };
}

/** Long steps take long to work. */
function mostTried({ statements }: Step): number {
  const size = Math.max(1, statements.length / USUAL_LENGTH);
  return Math.max(LEAST_TRIED, Math.floor(MOST_TRIED / size ** 1.5));
}

/** Which of several refusals of one reagent says most: lower is nearer to having been a suggestion. */
function nearness({ reason }: Refusal): number {
  const order = [
    'finding',
    'slow',
    'lost-to-solvent',
    'attacks',
    'not-proposed',
    'too-weak',
    'no-constant',
    'not-reached',
    'frozen',
    'boils',
    'not-used-in',
  ];
  const place = order.indexOf(reason.kind);
  return reason.kind === 'too-weak' ? place + Math.min(0.9, reason.short / 100) : place;
}

/** The nearest miss first. */
function byShortfall(a: Refusal, b: Refusal): number {
  return shortfall(a) - shortfall(b);
}

function shortfall({ reason }: Refusal): number {
  return reason.kind === 'too-weak' ? reason.short : 0;
}
