/** `lyate check`: findings of plans, for people and machines. */
import { existsSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { type Command, InvalidArgumentError, Option } from 'commander';
import pc from 'picocolors';
import packageFile from '../../../package.json' with { type: 'json' };
import { CONFIGURATION_FILE } from '../answers/configuration.ts';
import type { Severity } from '../checks/finding.ts';
import { CHECKS } from '../checks/registry.generated.ts';
import { createPlanDesk, type PlanDesk, pathFromHere } from '../host/configured.ts';
import { readText, writeWhole } from '../host/files.ts';
import { languageOf } from '../host/paths.ts';
import { githubReport, gitlabReport } from '../report/annotations.ts';
import { baselineOf, type Compared, compareWith, readBaseline } from '../report/baseline.ts';
import { jsonReport } from '../report/json.ts';
import { junitReport } from '../report/junit.ts';
import { plainLine } from '../report/plain.ts';
import { sarifReport } from '../report/sarif.ts';
import { atLeast, type FileFindings } from '../report/summary.ts';
import { type Paint, textReport, UNPAINTED } from '../report/text.ts';
import { progressOf } from './progress.ts';
import { readAll, type Source } from './read-plans.ts';
import { checkRecords } from './records.ts';
import { readStandardInput } from './streams.ts';

interface CheckOptions {
  readonly format: 'text' | 'json' | 'sarif' | 'junit' | 'github' | 'gitlab';
  readonly failOn: Severity;
  readonly minConfidence: number;
  readonly maxWarnings?: number;
  readonly stdin?: true;
  readonly name?: string;
  readonly ndjson?: true;
  readonly jobs: number;
  readonly skipDone?: string;
  readonly quiet?: true;
  readonly baseline?: string;
  readonly writeBaseline?: true;
  readonly workspace?: string;
  readonly printConfig?: string;
}

/** Adds the command. */
export function addCheck(program: Command): void {
  program
    .command('check')
    .description('check plans; exit code 0 clean, 1 findings, 2 could not run')
    .argument('[paths...]', 'plans, Markdown files, folders or globs')
    .addOption(
      new Option('--format <format>', 'form of the report')
        .choices(['text', 'json', 'sarif', 'junit', 'github', 'gitlab'])
        .default('text'),
    )
    .addOption(
      new Option('--fail-on <severity>', 'lowest severity that gives exit code 1')
        .choices(['error', 'warning', 'information'])
        .default('error'),
    )
    .option('--min-confidence <share>', 'leave out findings less sure than this, 0 to 1', share, 0)
    .option('--max-warnings <count>', 'more open warnings than this give exit code 1', count)
    .option('--baseline <file>', 'report only what this file does not know, and what is gone')
    .option('--write-baseline', 'write what is found into the file of --baseline')
    .option('--stdin', 'read one plan from standard input')
    .option('--name <file>', 'name of the plan on standard input')
    .option(
      '--ndjson',
      'read {"id","text"} records from standard input, a line each, and answer line by line',
    )
    .option('--jobs <count>', 'workers for --ndjson', jobs, 1)
    .option('--skip-done <file>', 'with --ndjson, pass over records that this earlier output answers')
    .option('--workspace <folder>', 'look for lyate.json and for what plans use no higher than this folder')
    .option('--print-config <file>', 'print the settings that hold for a plan and where they come from')
    .option('--quiet', 'errors and warnings only')
    .action(async (paths: string[], options: CheckOptions) => {
      process.exitCode = await run(paths, options);
    });
}

async function run(paths: readonly string[], options: CheckOptions): Promise<number> {
  if (options.writeBaseline && options.baseline === undefined)
    throw new Error('--write-baseline needs the file of --baseline');
  if (options.ndjson) return checkRecords(options);
  const desk = createPlanDesk(options.workspace);
  if (options.printConfig !== undefined) {
    process.stdout.write(configReport(desk, options.printConfig));
    return 0;
  }
  const { sources, failed } = options.stdin
    ? {
        sources: [{ file: options.name ?? 'standard-input.lyate', text: await readStandardInput() }],
        failed: false,
      }
    : readAll(paths);
  const files = checked(desk, sources).map((file) => ({
    ...file,
    findings: file.findings.filter((finding) => isWanted(finding, options)),
  }));
  if (options.writeBaseline) {
    const placed = files.map((each) => ({ ...each, file: placeIn(options.baseline!, each.file) }));
    writeWhole(options.baseline!, `${JSON.stringify(baselineOf(placed), null, 1)}\n`);
    return failed ? 2 : 0;
  }
  const { files: told, gone } =
    options.baseline === undefined ? { files, gone: [] } : compared(options.baseline, files);
  process.stdout.write(print(told, options));
  sayGone(gone);
  if (failed) return 2;
  return fails(told, options) ? 1 : 0;
}

/** Findings of every plan, those of configurations and house files first. */
function checked(desk: PlanDesk, sources: readonly Source[]): FileFindings[] {
  const progress = progressOf(sources.length);
  const plans = sources.map(({ file, text }) => {
    const { findings } = desk.analyse({ file, text, language: languageOf(file) });
    progress.step();
    return { file, text, findings };
  });
  progress.end();
  const behind = [...desk.used()].flatMap(([root, { files }]) =>
    files
      .filter(({ findings }) => findings.length !== 0)
      .map((each) => ({ ...each, file: pathFromHere(root, each.file) })),
  );
  return [...behind, ...plans];
}

function isWanted(
  { confidence, severity }: { confidence: number; severity: Severity },
  options: CheckOptions,
): boolean {
  return options.minConfidence <= confidence && (!options.quiet || atLeast(severity, 'warning'));
}

/** What is new against a baseline; files in it are named from where it stands. */
function compared(baseline: string, files: readonly FileFindings[]): Compared {
  const { text, problem } = readText(baseline);
  if (text === undefined) throw new Error(`${baseline} ${problem}`);
  let known: ReturnType<typeof readBaseline>;
  try {
    known = readBaseline(text);
  } catch (error) {
    throw new Error(`${baseline} ${(error as Error).message}`);
  }
  const names = new Map(files.map(({ file }) => [placeIn(baseline, file), file]));
  const placed = files.map((each) => ({ ...each, file: placeIn(baseline, each.file) }));
  const found = compareWith(known, placed, (file) => existsSync(join(dirname(baseline), file)));
  return { ...found, files: found.files.map((each) => ({ ...each, file: names.get(each.file)! })) };
}

function placeIn(baseline: string, file: string): string {
  return relative(dirname(resolve(baseline)), resolve(file))
    .split('\\')
    .join('/');
}

function sayGone(gone: Compared['gone']): void {
  for (const { file, check, step, count: times } of gone) {
    const where = step === null ? '' : ` in step ${step}`;
    const often = times === 1 ? '' : ` (${times} times)`;
    process.stderr.write(
      plainLine(`gone since the baseline: ${file}: ${check}${where}${often}`).concat('\n'),
    );
  }
  if (gone.length !== 0) process.stderr.write('--write-baseline takes what is gone out of the baseline.\n');
}

function configReport(desk: PlanDesk, file: string): string {
  const { root, configured, settings } = desk.surroundings(file);
  const { configuration, tables, files } = configured;
  const report = {
    file,
    workspace: root,
    configuration: configuration === null ? null : join(root, CONFIGURATION_FILE),
    houseFiles: files.map((each) => each.file).filter((each) => each !== CONFIGURATION_FILE),
    problems: files.flatMap((each) =>
      each.findings.map(({ range, message }) => ({ file: each.file, range, message })),
    ),
    tables: tables.version,
    settings,
  };
  return `${JSON.stringify(report, null, 2)}\n`;
}

function fails(files: readonly FileFindings[], { failOn, maxWarnings }: CheckOptions): boolean {
  const open = files.flatMap(({ findings }) => findings.filter(({ accepted }) => !accepted));
  const warnings = open.filter(({ severity }) => severity === 'warning').length;
  return (
    open.some(({ severity }) => atLeast(severity, failOn)) ||
    (maxWarnings !== undefined && maxWarnings < warnings)
  );
}

function print(files: readonly FileFindings[], { format, failOn }: CheckOptions): string {
  switch (format) {
    case 'json':
      return jsonReport(files);
    case 'sarif':
      return sarifReport(files, CHECKS, packageFile.version);
    case 'junit':
      return junitReport(files, failOn);
    case 'github':
      return githubReport(files);
    case 'gitlab':
      return gitlabReport(files);
    default:
      return textReport(files, paint());
  }
}

/** Colours on a terminal, nothing elsewhere. */
function paint(): Paint {
  if (!process.stdout.isTTY || !pc.isColorSupported) return UNPAINTED;
  const colours: Record<Severity, (text: string) => string> = {
    error: pc.red,
    warning: pc.yellow,
    information: pc.cyan,
    hint: pc.dim,
  };
  return { severity: (severity, text) => colours[severity](text), faint: pc.dim, strong: pc.bold };
}

function share(text: string): number {
  const value = Number(text);
  if (text.trim() === '' || !(0 <= value && value <= 1))
    throw new InvalidArgumentError('Give a number from 0 to 1.');
  return value;
}

function count(text: string): number {
  if (!/^\d{1,9}$/.test(text)) throw new InvalidArgumentError('Give a whole number.');
  return Number(text);
}

function jobs(text: string): number {
  const value = count(text);
  if (value < 1 || 256 < value) throw new InvalidArgumentError('Give a number from 1 to 256.');
  return value;
}
