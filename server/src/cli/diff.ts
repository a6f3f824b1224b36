/** `lyate diff`: what a change of a plan did to its chemistry. */
import { type Command, Option } from 'commander';
import type { Severity } from '../checks/finding.ts';
import { createPlanDesk, type PlanDesk } from '../host/configured.ts';
import { readText } from '../host/files.ts';
import { languageOf } from '../host/paths.ts';
import { pathInRepository, type Revision, revisionOf } from '../host/revisions.ts';
import { type Difference, difference, differenceRecord, differenceText } from '../report/diff.ts';
import { atLeast, type FileFindings } from '../report/summary.ts';

interface DiffOptions {
  readonly rev?: string;
  readonly to?: string;
  readonly format: 'text' | 'json';
  readonly failOn: Severity;
}

/** Adds the command. */
export function addDiff(program: Command): void {
  program
    .command('diff')
    .description('what a change did to the findings of a plan; exit code 1 where one appeared or grew')
    .argument('<old>', 'the plan before, or with --rev the plan')
    .argument('[new]', 'the plan after')
    .option('--rev <revision>', 'git revision of the plan before')
    .option('--to <revision>', 'git revision of the plan after; the file as it is where left out')
    .addOption(new Option('--format <format>').choices(['text', 'json']).default('text'))
    .addOption(
      new Option('--fail-on <severity>', 'lowest severity that gives exit code 1')
        .choices(['error', 'warning', 'information'])
        .default('error'),
    )
    .action((old: string, fresh: string | undefined, options: DiffOptions) => {
      const found = compare(old, fresh, options);
      const record = options.format === 'json';
      process.stdout.write(record ? `${JSON.stringify(differenceRecord(found))}\n` : differenceText(found));
      process.exitCode = isWorse(found, options.failOn) ? 1 : 0;
    });
}

function compare(old: string, fresh: string | undefined, { rev, to }: DiffOptions): Difference {
  const desk = createPlanDesk();
  if (rev === undefined) {
    if (fresh === undefined) throw new Error('name two plans, or a plan and its revision with --rev');
    return difference(analysed(desk, old), analysed(desk, fresh));
  }
  if (fresh !== undefined) throw new Error('with --rev name one plan');
  const before = atRevision(old, revisionOf(old, rev), rev);
  return difference(
    before,
    to === undefined ? analysed(desk, old) : atRevision(old, revisionOf(old, to), to),
  );
}

function analysed(desk: PlanDesk, file: string): FileFindings {
  const { text, problem } = readText(file);
  if (text === undefined) throw new Error(`${file} ${problem}`);
  return findingsIn(desk, file, text);
}

/** As the revision has it, with its own configuration and the files that it uses. */
function atRevision(file: string, { root, text }: Revision, name: string): FileFindings {
  const content = text(pathInRepository(root, file));
  if (content === null) throw new Error(`${file} is not in ${name}`);
  return findingsIn(
    createPlanDesk(undefined, (path) => text(pathInRepository(root, path))),
    file,
    content,
  );
}

function findingsIn(desk: PlanDesk, file: string, text: string): FileFindings {
  const { findings } = desk.analyse({ file, text, language: languageOf(file) });
  return { file, text, findings };
}

/** Whether something appeared, grew, or lost its acceptance, at or above a severity. */
function isWorse({ appeared, changed }: Difference, limit: Severity): boolean {
  const counts = ({ severity, accepted }: { severity: Severity; accepted: boolean }) =>
    !accepted && atLeast(severity, limit);
  return appeared.some(counts) || changed.some(({ before, after }) => counts(after) && !counts(before));
}
