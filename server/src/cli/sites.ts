/** `lyate sites`: the acidic and basic sites of a molecule with their constants. */
import { type Command, Option } from 'commander';
import { constantsIn } from '../chemistry/constants.ts';
import { perceive } from '../chemistry/perceive.ts';
import { builtTables } from '../host/tables.ts';
import { plainLine } from '../report/plain.ts';
import { answerLines } from './streams.ts';

interface SitesOptions {
  readonly in: string;
  readonly estimateOnly?: true;
  readonly explain?: true;
  readonly format: 'text' | 'json' | 'ndjson';
}

/** Couples outside this range are left out. */
const LOWEST = -15;
const HIGHEST = 60;
const SCALES: Readonly<Record<string, string>> = {
  water: 'water',
  dmso: 'DMSO',
  mecn: 'MeCN',
  acetonitrile: 'MeCN',
};

/** Adds the command. */
export function addSites(program: Command): void {
  program
    .command('sites')
    .description('acidic and basic sites of a SMILES; - reads one a line from standard input')
    .argument('<smiles>')
    .option('--in <scale>', 'scale or solvent', 'water')
    .option('--estimate-only', 'leave measured values out')
    .option('--explain', 'print how each value was made')
    .addOption(new Option('--format <format>').choices(['text', 'json', 'ndjson']).default('text'))
    .action(async (smiles: string, options: SitesOptions) => {
      const scale = scaleOf(options.in);
      if (smiles === '-') {
        await answerLines((line) => JSON.stringify(sitesOf(line.trim(), scale, options)));
        return;
      }
      const found = sitesOf(smiles, scale, options);
      process.stdout.write(options.format === 'text' ? text(found, scale) : `${JSON.stringify(found)}\n`);
      if ('error' in found) process.exitCode = 2;
    });
}

function scaleOf(name: string): string {
  return SCALES[name.toLowerCase()] ?? builtTables().solventByName.get(name.toLowerCase())?.scale ?? name;
}

function sitesOf(smiles: string, scale: string, { estimateOnly, explain }: SitesOptions) {
  const tables = builtTables();
  try {
    const molecule = perceive(smiles, tables);
    if (molecule.problem !== null) return { smiles, error: molecule.problem.message };
    const { couples } = constantsIn(molecule, scale, tables, estimateOnly ? { estimateOnly } : {});
    const sites = molecule.couples.flatMap((couple, index) => {
      const constant = couples[index];
      if (constant == null || constant.value < LOWEST || HIGHEST < constant.value) return [];
      const { atom, element, group, holdsProton } = couple;
      const { value, sd, origin, sources, hops } = constant;
      const site = {
        atom,
        element,
        group,
        holdsProton,
        pKa: round(value),
        sd: round(sd),
        scale,
        origin,
        sources,
      };
      return [explain ? { ...site, hops } : site];
    });
    return { smiles, sites };
  } catch (error) {
    return { smiles, error: error instanceof Error ? error.message : String(error) };
  }
}

function round(value: number): number {
  return Math.round(value * 1000) / 1000;
}

function text(found: ReturnType<typeof sitesOf>, scale: string): string {
  if (found.sites === undefined) return `${plainLine(found.smiles)}: ${found.error}\n`;
  const lines = [...found.sites]
    .sort((a, b) => a.pKa - b.pKa)
    .flatMap((site) => {
      const { atom, element, group, pKa, sd, origin, sources, holdsProton } = site;
      const head = `  ${`${element}${atom}`.padEnd(6)}${group.padEnd(26)}${pKa.toFixed(2).padStart(7)} ± ${sd.toFixed(2)}  ${holdsProton ? 'holds its proton' : 'without its proton'}, ${origin} (${sources.join(', ')})`;
      const hops =
        'hops' in site
          ? site.hops.map(
              ({ what, value, sd: own }) =>
                `          ${value.toFixed(2).padStart(7)} ± ${own.toFixed(2)}  ${what}`,
            )
          : [];
      return [head, ...hops];
    });
  return [`${plainLine(found.smiles)} on the ${scale} scale`, ...lines, ''].join('\n');
}
