/** `lyate explain`: the page of a check, or the list of all. */
import type { Command } from 'commander';
import { explanation, overview } from '../answers/explain.ts';

/** Adds the command. */
export function addExplain(program: Command): void {
  program
    .command('explain')
    .description('explain a check, or list all checks')
    .argument('[check]', 'name of a check')
    .action((name: string | undefined) => {
      const page = name === undefined ? overview() : explanation(name);
      if (page === null) {
        process.stderr.write(`lyate: there is no check called ${name}; lyate explain lists them\n`);
        process.exitCode = 2;
        return;
      }
      process.stdout.write(page);
    });
}
