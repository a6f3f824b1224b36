/** `lyate window`: how acidic and how basic a solvent can be. */
import type { Command } from 'commander';
import { solventWindow } from '../flask/window.ts';
import { builtTables } from '../host/tables.ts';
import { lookUpName } from '../tables/names.ts';

/** Adds the command. */
export function addWindow(program: Command): void {
  program
    .command('window')
    .description('acidity windows of solvents')
    .argument('<solvents...>')
    .option('--absolute', 'also on the unified absolute scale')
    .action((names: string[], { absolute }: { absolute?: true }) => {
      const tables = builtTables();
      for (const name of names) {
        const solvent = lookUpName(tables, name.split(' '))?.solvent ?? null;
        if (solvent === null) throw new Error(`no solvent is called ${name}`);
        const window = solventWindow(solvent);
        process.stdout.write(
          `${solvent.name}: ${JSON.stringify(absolute ? window : { pKs: solvent.pKs, lyonium: solvent.lyoniumPKa, lyate: solvent.lyatePKa, scale: solvent.scale })}\n`,
        );
      }
    });
}
