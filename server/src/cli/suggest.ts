/** `lyate suggest`: bases (acids) and solvents that make the intended transfer of a step. */
import { type Command, InvalidArgumentError, Option } from 'commander';
import { type Suggestions, suggestionsAt, suggestionsOf } from '../answers/suggest.ts';
import { pairsRecord, suggestionsRecord } from '../answers/suggest-record.ts';
import { suggestionsText } from '../answers/suggest-text.ts';
import { createPlanDesk } from '../host/configured.ts';
import { readText } from '../host/files.ts';
import { languageOf } from '../host/paths.ts';
import { plain } from '../report/plain.ts';

interface SuggestOptions {
  readonly step: string;
  readonly line?: number;
  readonly all?: true;
  readonly format: 'text' | 'json';
}

const FEW = { rows: 10, named: 8 };
const ALL = { rows: Number.POSITIVE_INFINITY, named: Number.POSITIVE_INFINITY };

/** Adds the command. */
export function addSuggest(program: Command): void {
  program
    .command('suggest')
    .description('bases or acids and solvents that make the intended transfer of a step, best first')
    .argument('<plan>')
    .requiredOption('--step <label>', 'label of the step')
    .option('--line <number>', 'only the transfer on this line, counted from 1', lineNumber)
    .option('--all', 'rare bases, acids and solvents too, every suggestion and every reason')
    .addOption(new Option('--format <format>').choices(['text', 'json']).default('text'))
    .action((file: string, options: SuggestOptions) => {
      const { text, problem } = readText(file);
      if (text === undefined) throw new Error(`${file} ${problem}`);
      const source = { file, text, language: languageOf(file) };
      const analysed = createPlanDesk().analyse(source);
      const breadth = options.all ? 'all' : 'ordinary';
      const all = suggestionsOf(analysed, options.step, breadth);
      if (all === null) throw new Error(`${file} has no step ${options.step}`);
      const line = options.line === undefined ? null : options.line - 1;
      const list =
        line === null ? all : suggestionsAt(analysed, line, breadth).filter((one) => one.line === line);
      if (list.length === 0) {
        const where = line === null ? `step ${options.step}` : `line ${line + 1}`;
        throw new Error(`${where} has no deprotonate or protonate that can be judged`);
      }
      const record = (one: Suggestions) =>
        options.all ? { ...suggestionsRecord(one), pairs: pairsRecord(one) } : suggestionsRecord(one);
      process.stdout.write(
        options.format === 'json'
          ? `${JSON.stringify({ step: options.step, transfers: list.map(record) })}\n`
          : plain(list.map((one) => suggestionsText(one, options.all ? ALL : FEW)).join('\n')),
      );
    });
}

function lineNumber(text: string): number {
  if (!/^[1-9]\d{0,8}$/.test(text)) throw new InvalidArgumentError('Give a whole number from 1.');
  return Number(text);
}
