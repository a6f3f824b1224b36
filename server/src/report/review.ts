/**
 * What a reviewer reads about plans, worked out: steps with their flasks, findings with their reasons, sources.
 *
 * Knows: answers.  Must not know: how it is printed; HTML and Markdown both print this and work out nothing.
 */
import { drawing } from '../answers/drawing.ts';
import { type FlaskPicture, flaskPictureAt } from '../answers/flask-picture.ts';
import { speciationAt } from '../answers/flask-plots.ts';
import { describe, ladderPlot } from '../answers/ladder-plot.ts';
import { sitesOf } from '../answers/site-table.ts';
import type { Analysed, AnalysedStep } from '../answers/types.ts';
import type { CheckPages } from '../checks/define.ts';
import type { StepFacts } from '../checks/facts.ts';
import type { Finding } from '../checks/finding.ts';
import { CHECKS } from '../checks/registry.generated.ts';
import type { Step } from '../route/plan.ts';
import { citation } from './citation.ts';
import type { FileFindings } from './summary.ts';

export interface ReviewFinding extends Finding {
  /** The page of the check; null for one that is no more. */
  readonly page: CheckPages | null;
  /** The line of the plan it points at. */
  readonly excerpt: string;
}

export interface ReviewStructure {
  readonly name: string;
  readonly smiles: string;
  /** Data address of the drawing; null where it is too large to draw. */
  readonly image: string | null;
}

export interface ReviewFlask {
  readonly picture: FlaskPicture;
  readonly words: string;
  readonly ladder: string | null;
  readonly speciation: string | null;
  readonly forms: readonly string[];
}

export interface ReviewStep {
  readonly label: string;
  readonly title: string | null;
  /** From 1. */
  readonly firstLine: number;
  readonly lines: readonly string[];
  readonly notes: readonly string[];
  readonly structures: readonly ReviewStructure[];
  /** At the intended transfer and at the end. */
  readonly flasks: readonly ReviewFlask[];
  readonly findings: readonly ReviewFinding[];
  readonly cautions: readonly ReviewFinding[];
  readonly accepted: readonly ReviewFinding[];
}

export interface ReviewPlan {
  readonly file: string;
  readonly title: string | null;
  readonly outside: readonly ReviewFinding[];
  readonly steps: readonly ReviewStep[];
}

export interface Review {
  readonly plans: readonly ReviewPlan[];
  /** Configurations and house files with faults. */
  readonly behind: readonly FileFindings[];
  readonly all: readonly FileFindings[];
  readonly sources: readonly { readonly id: string; readonly text: string }[];
  readonly version: string;
  readonly tables: string;
}

const PAGES = new Map<string, CheckPages>(CHECKS.map((check) => [check.name, check]));

/** Everything about some analysed plans; `version` is the program's. */
export function reviewOf(
  analysed: readonly Analysed[],
  behind: readonly FileFindings[],
  version: string,
): Review {
  const plans = analysed.map(planOf);
  const all = [
    ...behind,
    ...analysed.map(({ source: { file, text }, findings }) => ({ file, text, findings })),
  ];
  const cited = new Set([
    ...plans.flatMap(({ steps }) =>
      steps.flatMap(({ flasks }) =>
        flasks.flatMap(({ picture }) => picture.rungs.flatMap(({ sources }) => sources)),
      ),
    ),
    ...all.flatMap(({ findings }) => findings.flatMap(({ check }) => PAGES.get(check)?.sources ?? [])),
  ]);
  const known = analysed[0]?.tables.sourceById;
  const sources = [...cited].sort().map((id) => {
    const work = known?.get(id);
    return { id, text: work === undefined ? id : citation(work) };
  });
  return { plans, behind, all, sources, version, tables: analysed[0]?.tables.version ?? '' };
}

function planOf(analysed: Analysed): ReviewPlan {
  const { source, plan, steps, findings } = analysed;
  const lines = source.text.split(/\r\n|\n|\r/);
  const told = findings.map((finding) => tell(finding, lines));
  return {
    file: source.file,
    title: plan.title,
    outside: told.filter(({ step }) => step === null),
    steps: plan.steps.map((step, place) => {
      const last = step.firstLine + step.lineCount;
      const own = told.filter(
        ({ step: label, range: { start } }) =>
          label !== null && step.firstLine <= start.line && start.line < last,
      );
      return stepOf(analysed, step, steps[place]!, lines, own);
    }),
  };
}

function stepOf(
  analysed: Analysed,
  step: Step,
  { facts }: AnalysedStep,
  lines: readonly string[],
  findings: readonly ReviewFinding[],
): ReviewStep {
  const { label, title, firstLine, lineCount, statements } = step;
  const open = findings.filter(({ accepted }) => !accepted);
  const text = lines.slice(firstLine, firstLine + lineCount);
  while (text.at(-1)?.trim() === '') text.pop();
  return {
    label,
    title,
    firstLine: firstLine + 1,
    lines: text,
    notes: statements.flatMap((statement) => (statement.keyword === 'note' ? [statement.text] : [])),
    structures: compoundsOf(step).map(({ name, smiles }) => {
      const image = drawing(smiles, sitesOf(facts, name));
      return { name, smiles, image: image === '' ? null : image.slice(image.indexOf('(') + 1, -1) };
    }),
    flasks: flasksOf(analysed, step, facts),
    findings: open.filter(({ page }) => page?.family !== 'cautions'),
    cautions: open.filter(({ page }) => page?.family === 'cautions'),
    accepted: findings.filter(({ accepted }) => accepted),
  };
}

/** Compounds that a step names, in its order, each once. */
function compoundsOf({ statements }: Step): { name: string; smiles: string }[] {
  const found = new Map<string, string>();
  for (const statement of statements) {
    const substances =
      statement.keyword === 'convert'
        ? [...statement.from, ...statement.to].map(({ substance }) => substance)
        : 'substance' in statement
          ? [statement.substance]
          : [];
    for (const { kind, name, smiles } of substances) {
      if ((kind === 'compound' || kind === 'structure') && smiles !== null && !found.has(name))
        found.set(name, smiles);
    }
  }
  return [...found].map(([name, smiles]) => ({ name, smiles }));
}

/** The flask at the first transfer, where it is judged, and at the end; once where they are one. */
function flasksOf(analysed: Analysed, { firstLine }: Step, { transfers }: StepFacts): ReviewFlask[] {
  const lines = transfers.slice(0, 1).map(({ statement }) => firstLine + statement.range.start.line);
  // The step's own line stands for its end.
  const flasks = [...lines, firstLine].flatMap((line) => flaskOf(analysed, line));
  return flasks.filter(({ picture }, place) => place === 0 || picture.line !== flasks[0]!.picture.line);
}

function flaskOf(analysed: Analysed, line: number): ReviewFlask[] {
  const picture = flaskPictureAt(analysed, line);
  if (picture === null || picture.rungs.length === 0) return [];
  const curves = speciationAt(analysed, line);
  return [
    {
      picture,
      words: describe(picture),
      ladder: ladderPlot(picture),
      speciation: curves?.svg ?? null,
      forms: curves?.numbers.forms.map(({ name }) => name) ?? [],
    },
  ];
}

function tell(finding: Finding, lines: readonly string[]): ReviewFinding {
  const page = PAGES.get(finding.check) ?? null;
  return { ...finding, page, excerpt: (lines[finding.range.start.line] ?? '').trim() };
}
