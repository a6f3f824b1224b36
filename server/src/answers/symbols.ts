/**
 * The outline of a plan: compounds, steps, and what each step is about.
 *
 * Knows: plans.  Must not know: findings, the protocol.
 */
import type { Range, Statement } from '../route/plan.ts';
import { shiftRange } from './ranges.ts';
import type { Analysed } from './types.ts';

export interface PlanSymbol {
  readonly kind: 'compound' | 'step' | 'statement';
  readonly name: string;
  readonly detail: string;
  readonly range: Range;
  readonly nameRange: Range;
  readonly children: readonly PlanSymbol[];
}

/** The plan's own compounds and steps in the order of the text. */
export function symbolsOf({ plan }: Analysed): PlanSymbol[] {
  const compounds = plan.compounds
    .filter(({ file }) => file === undefined)
    .map(({ name, smiles, nameRange, smilesRange }): PlanSymbol => {
      const range = { start: nameRange.start, end: smilesRange.end };
      return { kind: 'compound', name, detail: smiles, range, nameRange, children: [] };
    });
  const steps = plan.steps.map((step): PlanSymbol => {
    const children = step.statements.flatMap((statement) => outlined(statement, step.firstLine));
    const start = { line: step.firstLine, character: 0 };
    const last = { line: step.firstLine + Math.max(0, step.lineCount - 1), character: 0 };
    const ends = [shiftRange(step.range, step.firstLine).end, ...children.map(({ range }) => range.end)];
    const end = ends.reduce((latest, each) => (latest.line < each.line ? each : latest), last);
    return {
      kind: 'step',
      name: step.label === '' ? 'step' : step.label,
      detail: step.title ?? '',
      range: { start, end },
      nameRange: shiftRange(step.labelRange, step.firstLine),
      children,
    };
  });
  return [...compounds, ...steps].sort((a, b) => a.range.start.line - b.range.start.line);
}

function outlined(statement: Statement, firstLine: number): PlanSymbol[] {
  const words = describe(statement);
  if (words === null) return [];
  const range = shiftRange(statement.range, firstLine);
  return [
    {
      kind: 'statement',
      name: statement.keyword,
      detail: words,
      range,
      nameRange: shiftRange(statement.keywordRange, firstLine),
      children: [],
    },
  ];
}

function describe(statement: Statement): string | null {
  switch (statement.keyword) {
    case 'deprotonate':
    case 'protonate':
      return [statement.substance.name, ...statement.sites.map(({ map }) => `:${map}`)].join(' ');
    case 'convert': {
      const names = (side: typeof statement.from) => side.map(({ substance }) => substance.name).join(' + ');
      return `${names(statement.from)} → ${names(statement.to)}`;
    }
    case 'quench':
      return statement.substance.name;
    case 'adjust':
      return `pH ${statement.pH}`;
    case 'isolate':
      return `${statement.substance.name} as ${statement.state}`;
    default:
      return null;
  }
}
