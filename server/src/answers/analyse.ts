/**
 * Analyses a plan: resolves it, gathers the facts of each step, runs every check, applies what the writer accepts.
 *
 * Knows: plans, facts, checks.  Must not know: files on disk, the protocol, how findings are shown.
 * Invariants:
 *  1. A step's result depends only on its content key, the state it goes on from, the tables and the settings,
 *     so a cached answer and a fresh one are equal.                             (tests/answers/analyse.test.ts)
 *  2. Never throws; a check that throws becomes one finding of its own.         (same)
 *  3. Yields after each step, so that a host can drop stale work.
 */
import type { Check, Report } from '../checks/define.ts';
import type { StepFacts } from '../checks/facts.ts';
import type { Finding, Severity } from '../checks/finding.ts';
import { gatherFacts } from '../checks/gather.ts';
import { CHECKS } from '../checks/registry.generated.ts';
import { DEFAULT_SETTINGS, type Settings } from '../checks/settings.ts';
import type { AcceptStatement, Plan, Position, Range, Step, TextProblem } from '../route/plan.ts';
import { createPlanReader, type PlanReader } from '../route/resolve.ts';
import { boundedCache } from '../tables/cache.ts';
import type { Tables } from '../tables/tables.ts';
import type { Analysed, AnalysedStep, SourceText } from './types.ts';

/** Remembers steps from one analysis to the next; belongs to one set of tables and settings. */
export interface Analyser {
  /** Yields after each step and answers with the whole; `files` holds what `use` may bring in, null where a file is missing. */
  analyse(source: SourceText, files?: ReadonlyMap<string, string | null>): Generator<void, Analysed>;
}

const CHECK_BY_NAME = new Map(CHECKS.map((check) => [check.name, check]));
const STEPS_REMEMBERED = 4000;

/** An analyser for one set of tables and settings; `remember` is how many steps it keeps, few where plans never come again. */
export function createAnalyser(
  tables: Tables,
  settings: Settings = DEFAULT_SETTINGS,
  remember = STEPS_REMEMBERED,
): Analyser {
  const remembered = boundedCache<string, AnalysedStep>(remember);
  const reader: PlanReader = createPlanReader(tables, settings);
  return {
    *analyse(source, files = new Map()) {
      const plan = reader.resolve(source, files);
      const steps: AnalysedStep[] = [];
      const byLabel = new Map<string, AnalysedStep>();
      for (const step of plan.steps) {
        let analysed = remembered.get(step.contentKey);
        if (analysed === undefined) {
          const before = step.continues ? (byLabel.get(step.continues.label)?.facts ?? null) : null;
          analysed = analyseStep(step, before, tables, settings);
          remembered.set(step.contentKey, analysed);
        }
        steps.push(analysed);
        if (!byLabel.has(step.label)) byLabel.set(step.label, analysed);
        yield;
      }
      return { source, plan, steps, findings: collect(plan, steps, settings), tables, settings };
    },
  };
}

/** Runs an analysis to its end in one go. */
export function analyseNow(
  analyser: Analyser,
  source: SourceText,
  files?: ReadonlyMap<string, string | null>,
): Analysed {
  const work = analyser.analyse(source, files);
  let turn = work.next();
  while (!turn.done) turn = work.next();
  return turn.value;
}

function analyseStep(step: Step, before: StepFacts | null, tables: Tables, settings: Settings): AnalysedStep {
  const facts = gatherFacts(step, before, tables, settings);
  const findings: Finding[] = [];
  for (const problem of facts.problems) add(findings, problem, step.label, settings);
  for (const check of CHECKS) {
    if (check.inStep === undefined || severityOf(check, undefined, settings) === 'off') continue;
    try {
      for (const report of check.inStep(facts)) findings.push(finish(check, report, step.label, settings));
    } catch (error) {
      findings.push(failure(check.name, error, step));
    }
  }
  return { facts, findings: accept(findings, step.statements.filter(isAccept), step.label, settings) };
}

function isAccept(statement: { keyword: string }): statement is AcceptStatement {
  return statement.keyword === 'accept';
}

function add(findings: Finding[], problem: TextProblem, step: string | null, settings: Settings): void {
  const check = CHECK_BY_NAME.get(problem.check);
  if (check?.fromText === undefined || severityOf(check, undefined, settings) === 'off') return;
  findings.push(finish(check, check.fromText(problem), step, settings));
}

function severityOf(check: Check, said: Severity | undefined, settings: Settings): Severity | 'off' {
  const set = settings.severities[check.name];
  if (set !== undefined) return set;
  if (said !== undefined) return said;
  return check.quiet ? 'off' : check.severity;
}

function finish(check: Check, report: Report, step: string | null, settings: Settings): Finding {
  const severity = severityOf(check, report.severity, settings);
  return {
    check: check.name,
    severity: severity === 'off' ? 'hint' : severity,
    confidence: report.confidence ?? 1,
    step,
    range: report.range,
    message: report.message,
    figures: report.figures ?? {},
    related: report.related ?? [],
    accepted: false,
    reason: null,
  };
}

function failure(name: string, error: unknown, step: Step): Finding {
  const words = error instanceof Error ? error.message : String(error);
  return {
    check: 'check-failed',
    severity: 'information',
    confidence: 1,
    step: step.label,
    range: step.range,
    message: `The check ${name} stopped by a fault of its own (${words}); the other checks of this step went on.`,
    figures: {},
    related: [],
    accepted: false,
    reason: null,
  };
}

/** Marks what the writer accepts and adds a finding for each accept that matches nothing. */
function accept(
  findings: readonly Finding[],
  accepts: readonly AcceptStatement[],
  step: string | null,
  settings: Settings,
): Finding[] {
  const marked = findings.map((finding) => {
    const by = accepts.find(({ check }) => check === finding.check);
    return by === undefined ? finding : { ...finding, accepted: true, reason: by.reason };
  });
  for (const statement of accepts) {
    if (findings.some(({ check }) => check === statement.check)) continue;
    add(marked, withoutEffect(statement), step, settings);
  }
  return marked;
}

function withoutEffect(statement: AcceptStatement): TextProblem {
  const message = CHECK_BY_NAME.has(statement.check)
    ? `Nothing here raises ${statement.check}, so this line accepts nothing; take it out.`
    : `There is no check called ${statement.check}; lyate explain lists them.`;
  return { check: 'accept-without-effect', range: statement.checkRange, message };
}

/** Findings of the whole file in the order of the text, those of steps moved to where the step stands. */
function collect(plan: Plan, steps: readonly AnalysedStep[], settings: Settings): Finding[] {
  const outside: Finding[] = [];
  for (const problem of plan.problems) add(outside, problem, null, settings);
  const all = outside.concat(
    steps.flatMap(({ findings }, index) =>
      findings.map((finding) => shift(finding, plan.steps[index]!.firstLine)),
    ),
  );
  const open = new Set(plan.accepts);
  const marked = all.map((finding) => {
    const by = plan.accepts.find(({ check }) => check === finding.check);
    if (by === undefined) return finding;
    open.delete(by);
    return finding.accepted ? finding : { ...finding, accepted: true, reason: by.reason };
  });
  for (const statement of open) add(marked, withoutEffect(statement), null, settings);
  return marked.sort(inOrder);
}

function inOrder(a: Finding, b: Finding): number {
  const [x, y] = [a.range, b.range];
  return (
    x.start.line - y.start.line ||
    x.start.character - y.start.character ||
    x.end.line - y.end.line ||
    x.end.character - y.end.character ||
    (a.check < b.check ? -1 : a.check > b.check ? 1 : 0)
  );
}

function shift(finding: Finding, lines: number): Finding {
  return {
    ...finding,
    range: shiftRange(finding.range, lines),
    related: finding.related.map((place) =>
      place.file === undefined && !place.absolute
        ? { ...place, range: shiftRange(place.range, lines) }
        : place,
    ),
  };
}

function shiftRange({ start, end }: Range, lines: number): Range {
  const down = ({ line, character }: Position): Position => ({ line: line + lines, character });
  return { start: down(start), end: down(end) };
}
