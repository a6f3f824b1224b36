/** Resolves a plan with the small tables and shows its problems as markers under the text. */
import type { Plan, Range, Statement } from '../../server/src/route/plan.ts';
import { resolvePlan } from '../../server/src/route/resolve.ts';
import { SMALL_TABLES } from './small-tables.ts';

export function plan(
  text: string,
  {
    file = 'plan.lyate',
    language = 'lyate' as 'lyate' | 'markdown',
    files = {} as Record<string, string | null>,
  } = {},
): Plan {
  return resolvePlan(text, { file, language, tables: SMALL_TABLES, files: new Map(Object.entries(files)) });
}

export interface Seen {
  readonly check: string;
  readonly text: string;
  readonly line: number;
}

/** Check and underlined text of every problem, in the order of the text, lines absolute. */
export function problemsOf(text: string, { steps, problems }: Plan): Seen[] {
  const lines = text.split(/\r\n|\r|\n/);
  const see = (check: string, { start, end }: Range, first: number): Seen => ({
    check,
    text: lines[first + start.line]!.slice(start.character, end.character),
    line: first + start.line,
  });
  return [
    ...problems.map(({ check, range }) => see(check, range, 0)),
    ...steps.flatMap((step) => step.problems.map(({ check, range }) => see(check, range, step.firstLine))),
  ].sort((a, b) => a.line - b.line);
}

type WithKeyword<Keyword, Each = Statement> = Each extends { keyword: infer Word }
  ? Keyword extends Word
    ? Each
    : never
  : never;

/** The first statement of a keyword in the first step. */
export function only<Keyword extends Statement['keyword']>(
  keyword: Keyword,
  { steps }: Plan,
): WithKeyword<Keyword> {
  const found = steps[0]!.statements.find((statement) => statement.keyword === keyword);
  if (found === undefined) throw new Error(`no ${keyword}`);
  return found as WithKeyword<Keyword>;
}
