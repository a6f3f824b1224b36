/** `lyate check`: findings of plans, for people and machines. */
import { type Command, InvalidArgumentError, Option } from 'commander';
import pc from 'picocolors';
import packageFile from '../../../package.json' with { type: 'json' };
import { createAnalyser } from '../answers/analyse.ts';
import type { Severity } from '../checks/finding.ts';
import { CHECKS } from '../checks/registry.generated.ts';
import { readText } from '../host/files.ts';
import { findPlans, languageOf } from '../host/paths.ts';
import { analyseWithFiles } from '../host/plans.ts';
import { builtTables } from '../host/tables.ts';
import { githubReport, gitlabReport } from '../report/annotations.ts';
import { jsonReport } from '../report/json.ts';
import { junitReport } from '../report/junit.ts';
import { sarifReport } from '../report/sarif.ts';
import { atLeast, type FileFindings } from '../report/summary.ts';
import { type Paint, textReport, UNPAINTED } from '../report/text.ts';
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
  readonly quiet?: true;
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
    .option('--stdin', 'read one plan from standard input')
    .option('--name <file>', 'name of the plan on standard input')
    .option(
      '--ndjson',
      'read {"id","text"} records from standard input, a line each, and answer line by line',
    )
    .option('--quiet', 'errors and warnings only')
    .action(async (paths: string[], options: CheckOptions) => {
      process.exitCode = options.ndjson ? await checkRecords() : await run(paths, options);
    });
}

async function run(paths: readonly string[], options: CheckOptions): Promise<number> {
  const sources = options.stdin
    ? {
        files: [{ file: options.name ?? 'standard-input.lyate', text: await readStandardInput() }],
        failed: false,
      }
    : readAll(paths);
  const analyser = createAnalyser(builtTables());
  const files: FileFindings[] = sources.files.map(({ file, text }) => {
    const { findings } = analyseWithFiles(analyser, { file, text, language: languageOf(file) });
    return { file, text, findings: findings.filter((finding) => isWanted(finding, options)) };
  });
  process.stdout.write(print(files, options));
  if (sources.failed) return 2;
  return fails(files, options) ? 1 : 0;
}

function isWanted(
  { confidence, severity }: { confidence: number; severity: Severity },
  options: CheckOptions,
): boolean {
  return options.minConfidence <= confidence && (!options.quiet || atLeast(severity, 'warning'));
}

/** The text of every plan that can be read; says what cannot on standard error. */
function readAll(paths: readonly string[]): { files: { file: string; text: string }[]; failed: boolean } {
  const { files, missing } = findPlans(paths.length === 0 ? ['.'] : paths);
  let failed = missing.length !== 0;
  for (const path of missing) process.stderr.write(`lyate: ${path} does not exist\n`);
  const read: { file: string; text: string }[] = [];
  for (const file of files) {
    const { text, problem } = readText(file);
    if (text === undefined) {
      process.stderr.write(`lyate: ${file} ${problem}\n`);
      failed = true;
    } else {
      read.push({ file, text });
    }
  }
  return { files: read, failed };
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
  if (!(0 <= value && value <= 1)) throw new InvalidArgumentError('Give a number from 0 to 1.');
  return value;
}

function count(text: string): number {
  if (!/^\d{1,9}$/.test(text)) throw new InvalidArgumentError('Give a whole number.');
  return Number(text);
}
