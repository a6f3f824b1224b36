/** `lyate window`: how acidic and how basic a solvent can be. */
import type { Command } from 'commander';
import { oneDecimal } from '../answers/figures.ts';
import { windowsPlot, windowWords } from '../answers/plots.ts';
import { placedWindow } from '../flask/window.ts';
import { writeWhole } from '../host/files.ts';
import { builtTables } from '../host/tables.ts';
import { lookUpName } from '../tables/names.ts';
import type { SolventRow } from '../tables/rows.ts';

interface WindowOptions {
  readonly absolute?: true;
  readonly svg?: string;
  readonly format: 'text' | 'json';
}

const NOTE =
  'absolute: pH counted from the standard proton in water (Himmel, Goll, Leito, Krossing 2010); estimated ends come from the pKa of the solvent and of its protonated form.\n';

/** Adds the command. */
export function addWindow(program: Command): void {
  program
    .command('window')
    .description('acidity windows of solvents')
    .argument('<solvents...>')
    .option('--absolute', 'also on the unified absolute scale, counted from the proton in water')
    .option('--svg <file>', 'draw them on one axis of the absolute scale')
    .addOption(program.createOption('--format <format>').choices(['text', 'json']).default('text'))
    .action((names: string[], options: WindowOptions) => {
      const tables = builtTables();
      const rows = names.map((name) => {
        const solvent = lookUpName(tables, name.split(/\s+/))?.solvent ?? null;
        if (solvent === null) throw new Error(`no solvent is called ${name}`);
        return { solvent, window: placedWindow(solvent, tables) };
      });
      if (options.svg !== undefined) {
        const windows = rows.map(({ solvent, window }) => ({ solvent: solvent.name, window }));
        writeWhole(options.svg, windowsPlot(windows, { title: 'Windows of solvents on the absolute scale' }));
      }
      if (options.format === 'json') {
        process.stdout.write(`${JSON.stringify({ solvents: rows.map(record) })}\n`);
        return;
      }
      const width = Math.max(...rows.map(({ solvent }) => solvent.name.length));
      for (const { solvent, window } of rows) {
        const absolute = options.absolute ? `   absolute: ${windowWords(window)}` : '';
        process.stdout.write(
          `${solvent.name.padEnd(width)}  ${ownWords(solvent).padEnd(46)}${absolute}`.trimEnd(),
        );
        process.stdout.write('\n');
      }
      if (options.absolute) process.stdout.write(NOTE);
    });
}

function record({ solvent, window }: { solvent: SolventRow; window: ReturnType<typeof placedWindow> }) {
  const { name, pKs, lyoniumPKa, lyatePKa, scale, scaleSd, protonTransferEnergy, sources, basis } = solvent;
  return {
    name,
    own: pKs === null ? null : { low: 0, high: pKs },
    lyoniumPKa,
    lyatePKa,
    scale,
    scaleSd,
    protonTransferEnergy,
    absolute: window,
    sources,
    basis,
  };
}

/** "own: 0 to 33.3 (DMSO scale ± 0.0)" */
function ownWords({ pKs, scale, scaleSd }: SolventRow): string {
  const range = pKs === null ? 'no autoprotolysis constant known' : `0.0 to ${oneDecimal(pKs)}`;
  const borrowed = scaleSd === 0 ? `${scale} scale` : `${scale} scale ± ${oneDecimal(scaleSd)}`;
  return `own: ${range}; ${borrowed}`;
}
