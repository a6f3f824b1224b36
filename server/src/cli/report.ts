/** `lyate report`: one page about plans, for a review or a file. */
import { type Command, Option } from 'commander';
import packageFile from '../../../package.json' with { type: 'json' };
import { createPlanDesk, pathFromHere } from '../host/configured.ts';
import { writeWhole } from '../host/files.ts';
import { languageOf } from '../host/paths.ts';
import { htmlReview } from '../report/html.ts';
import { markdownReview } from '../report/markdown.ts';
import { reviewOf } from '../report/review.ts';
import { readAll } from './read-plans.ts';

interface ReportOptions {
  readonly out?: string;
  readonly format?: 'html' | 'markdown';
  readonly workspace?: string;
}

/** Adds the command. */
export function addReport(program: Command): void {
  program
    .command('report')
    .description('one page about plans: text, structures, flasks, findings, sources')
    .argument('<plans...>')
    .option('-o, --out <file>', 'where to write it; standard output where left out')
    .addOption(
      new Option('--format <format>', 'form; by the name of the file where left out').choices([
        'html',
        'markdown',
      ]),
    )
    .option('--workspace <folder>', 'look for lyate.json and for what plans use no higher than this folder')
    .action((paths: string[], { out, format, workspace }: ReportOptions) => {
      const { sources, failed } = readAll(paths);
      if (failed || sources.length === 0) {
        if (!failed) process.stderr.write('lyate: no plan was found\n');
        process.exitCode = 2;
        return;
      }
      const desk = createPlanDesk(workspace);
      const analysed = sources.map(({ file, text }) =>
        desk.analyse({ file, text, language: languageOf(file) }),
      );
      const behind = [...desk.used()].flatMap(([root, { files }]) =>
        files
          .filter(({ findings }) => findings.length !== 0)
          .map((each) => ({ ...each, file: pathFromHere(root, each.file) })),
      );
      const review = reviewOf(analysed, behind, packageFile.version);
      const isMarkdown =
        format === 'markdown' || (format === undefined && /\.(md|markdown)$/i.test(out ?? ''));
      const page = isMarkdown ? markdownReview(review) : htmlReview(review);
      if (out === undefined) process.stdout.write(page);
      else writeWhole(out, page);
    });
}
