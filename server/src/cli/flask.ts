/** `lyate flask`: the proton balance of a step, line by line. */
import { type Command, Option } from 'commander';
import { createAnalyser } from '../answers/analyse.ts';
import { flaskStates } from '../answers/flask-states.ts';
import { readText } from '../host/files.ts';
import { languageOf } from '../host/paths.ts';
import { analyseWithFiles } from '../host/plans.ts';
import { builtTables } from '../host/tables.ts';
import { plainLine } from '../report/plain.ts';

/** Adds the command. */
export function addFlask(program: Command): void {
  program
    .command('flask')
    .description('the proton balance of a step')
    .argument('<plan>')
    .requiredOption('--step <label>', 'label of the step')
    .option('--line <number>', 'only the state at this line, counted from 1')
    .addOption(new Option('--format <format>').choices(['text', 'json']).default('text'))
    .action((file: string, options: { step: string; line?: string; format: 'text' | 'json' }) => {
      const { text, problem } = readText(file);
      if (text === undefined) throw new Error(`${file} ${problem}`);
      const analysed = analyseWithFiles(createAnalyser(builtTables()), {
        file,
        text,
        language: languageOf(file),
      });
      const all = flaskStates(analysed, options.step);
      if (all === null) throw new Error(`${file} has no step ${options.step}`);
      const line = options.line === undefined ? null : Number(options.line) - 1;
      const states = all.filter((state) => line === null || state.line === line);
      if (options.format === 'json') {
        process.stdout.write(`${JSON.stringify({ step: options.step, states })}\n`);
        return;
      }
      for (const state of states) {
        const pH = state.pH === null ? 'no pH' : `pH ${state.pH.toFixed(2)} on the ${state.scale} scale`;
        process.stdout.write(
          `line ${state.line + 1}: ${pH}, ${(state.temperature - 273.15).toFixed(0)} °C, ${(state.volume * 1000).toFixed(1)} mL\n`,
        );
        for (const { name, group, pKa, sd, amount, protonated } of state.couples) {
          process.stdout.write(
            `  ${plainLine(name).slice(0, 24).padEnd(25)}${group.padEnd(26)}pKa ${pKa.toFixed(2).padStart(6)} ± ${sd.toFixed(2)}  ${(amount * 1000).toPrecision(3).padStart(7)} mmol  ${(100 * protonated).toFixed(2).padStart(6)} % protonated\n`,
          );
        }
      }
    });
}
