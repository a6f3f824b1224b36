/** `lyate format`: plans in their usual layout. */
import type { Command } from 'commander';
import { readText, writeWhole } from '../host/files.ts';
import { findPlans, languageOf } from '../host/paths.ts';
import { formatText } from '../route/format.ts';

/** Adds the command. */
export function addFormat(program: Command): void {
  program
    .command('format')
    .description('lay plans out; prints them unless told otherwise')
    .argument('<paths...>')
    .option('--write', 'write the files')
    .option('--check', 'only say which files would change; exit code 1 if any')
    .action((paths: string[], { write, check }: { write?: true; check?: true }) => {
      const { files, missing } = findPlans(paths);
      for (const path of missing) process.stderr.write(`lyate: ${path} does not exist\n`);
      if (missing.length !== 0) process.exitCode = 2;
      for (const file of files) {
        const { text, problem } = readText(file);
        if (text === undefined) {
          process.stderr.write(`lyate: ${file} ${problem}\n`);
          process.exitCode = 2;
          continue;
        }
        const laidOut = formatText(text, languageOf(file));
        if (check) {
          if (laidOut !== text) {
            process.stdout.write(`${file}\n`);
            process.exitCode ??= 1;
          }
        } else if (write) {
          if (laidOut !== text) writeWhole(file, laidOut);
        } else process.stdout.write(laidOut);
      }
    });
}
