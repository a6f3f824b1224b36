/** `lyate flask`: the proton balance of a step, line by line, its titration and its forms over pH. */
import { type Command, InvalidArgumentError, Option } from 'commander';
import { type FlaskPlot, type NamedTitration, speciationAt, titrationAt } from '../answers/flask-plots.ts';
import { flaskStates } from '../answers/flask-states.ts';
import type { FormCurves } from '../answers/speciation.ts';
import type { Analysed } from '../answers/types.ts';
import type { CurvePoint } from '../flask/titration-curve.ts';
import { createPlanDesk } from '../host/configured.ts';
import { readText, writeWhole } from '../host/files.ts';
import { languageOf } from '../host/paths.ts';
import { plainLine } from '../report/plain.ts';

interface FlaskOptions {
  readonly step: string;
  readonly line?: number;
  readonly format: 'text' | 'json';
  readonly plot?: 'titration' | 'speciation';
  readonly with?: string;
  readonly svg?: string;
}

const ZERO_CELSIUS = 273.15;
const MMOL = 1000;

/** Adds the command. */
export function addFlask(program: Command): void {
  program
    .command('flask')
    .description('the proton balance of a step, its titration and its forms over pH')
    .argument('<plan>')
    .requiredOption('--step <label>', 'label of the step')
    .option('--line <number>', 'only the state at this line, counted from 1', lineNumber)
    .addOption(new Option('--plot <plot>', 'numbers of a curve').choices(['titration', 'speciation']))
    .option('--with <reagent>', 'what the flask is titrated with')
    .option('--svg <file>', 'draw the curve; a titration unless --plot says otherwise')
    .addOption(new Option('--format <format>').choices(['text', 'json']).default('text'))
    .action((file: string, options: FlaskOptions) => {
      const { text, problem } = readText(file);
      if (text === undefined) throw new Error(`${file} ${problem}`);
      const source = { file, text, language: languageOf(file) };
      const analysed = createPlanDesk().analyse(source);
      const step = analysed.plan.steps.find(({ label }) => label === options.step);
      if (step === undefined) throw new Error(`${file} has no step ${options.step}`);
      const line = options.line === undefined ? step.firstLine : options.line - 1;
      if (line < step.firstLine || step.firstLine + step.lineCount <= line)
        throw new Error(`line ${line + 1} is not in step ${options.step}`);
      if (options.plot === undefined && options.svg === undefined) printStates(analysed, options);
      else if (options.plot === 'speciation')
        show(speciationAt(analysed, line), options, formsText, formsRecord);
      else show(titrationAt(analysed, line, options.with), options, curveText, curveRecord);
    });
}

function printStates(analysed: Analysed, { step, line, format }: FlaskOptions): void {
  const states = flaskStates(analysed, step)!.filter(
    (state) => line === undefined || state.line === line - 1,
  );
  if (format === 'json') {
    process.stdout.write(`${JSON.stringify({ step, states })}\n`);
    return;
  }
  for (const state of states) {
    const pH = state.pH === null ? 'no pH' : `pH ${state.pH.toFixed(2)} on the ${state.scale} scale`;
    process.stdout.write(
      `line ${state.line + 1}: ${pH}, ${(state.temperature - ZERO_CELSIUS).toFixed(0)} °C, ${(state.volume * MMOL).toFixed(1)} mL\n`,
    );
    for (const { name, group, pKa, sd, amount, protonated } of state.couples) {
      process.stdout.write(
        `  ${plainLine(name).slice(0, 24).padEnd(25)}${group.padEnd(26)}pKa ${pKa.toFixed(2).padStart(6)} ± ${sd.toFixed(2)}  ${(amount * MMOL).toPrecision(3).padStart(7)} mmol  ${(100 * protonated).toFixed(2).padStart(6)} % protonated\n`,
      );
    }
  }
}

/** Writes the picture where one is asked for, and the numbers. */
function show<Numbers>(
  plot: FlaskPlot<Numbers> | null,
  { step, svg, format }: FlaskOptions,
  write: (numbers: Numbers) => string,
  record: (numbers: Numbers) => object,
): void {
  if (plot === null) throw new Error(`step ${step} has nothing there that gives or takes a proton`);
  if (svg !== undefined) writeWhole(svg, plot.svg);
  process.stdout.write(
    format === 'json'
      ? `${JSON.stringify({ step, line: plot.line, ...record(plot.numbers) })}\n`
      : `step ${plainLine(step)}, after line ${plot.line + 1}\n${write(plot.numbers)}`,
  );
}

const ROWS = 24;

function curveText({ titrant, points, halves, scale, names }: NamedTitration): string {
  const rows = readable(points).map(
    ({ mol, pH }) => `  ${(mol * MMOL).toPrecision(4).padStart(10)} mmol  pH ${pH.toFixed(2).padStart(6)}\n`,
  );
  const marks = halves.map(
    ({ mol, pH, pKa, sd, groupName, ingredient }) =>
      `  half of ${plainLine(names.get(ingredient) ?? '')} ${groupName}: pKa ${pKa.toFixed(2)} ± ${sd.toFixed(2)}, at ${(mol * MMOL).toPrecision(4)} mmol and pH ${pH.toFixed(2)}\n`,
  );
  return [`titration with ${titrant}, ${scale} scale\n`, ...rows, ...marks].join('');
}

/** Points of a curve a step apart in amount or in pH, so that a jump keeps its shape. */
function readable(points: NamedTitration['points']): CurvePoint[] {
  const step = (points.at(-1)?.mol ?? 0) / ROWS;
  const kept: CurvePoint[] = [];
  for (const point of points) {
    const last = kept.at(-1);
    if (last === undefined || step <= point.mol - last.mol || 1 <= Math.abs(point.pH - last.pH))
      kept.push(point);
  }
  return kept;
}

function curveRecord({
  titrant,
  kind,
  scale,
  volume,
  temperature,
  points,
  halves,
  names,
}: NamedTitration): object {
  const marks = halves.map(({ ingredient, ...mark }) => ({ name: names.get(ingredient) ?? null, ...mark }));
  return { plot: 'titration', titrant, kind, scale, volume, temperature, points, halves: marks };
}

function formsText({ pHs, forms, scale, now }: FormCurves): string {
  const every = Math.max(1, Math.floor(pHs.length / ROWS));
  const head = forms.map(({ name }, place) => `  ${place + 1}: ${plainLine(name)}\n`);
  const rows = pHs.flatMap((pH, place) =>
    place % every === 0
      ? [
          `  pH ${pH.toFixed(1).padStart(5)} ${forms.map(({ shares }) => `${(100 * shares[place]!).toFixed(1).padStart(6)} %`).join('')}\n`,
        ]
      : [],
  );
  const here = now === null ? '' : `  this flask: pH ${now.toFixed(2)}\n`;
  return [`forms over pH, ${scale} scale\n`, ...head, ...rows, here].join('');
}

function formsRecord({ scale, pHs, forms, now }: FormCurves): object {
  return { plot: 'speciation', scale, pH: now, pHs, forms };
}

function lineNumber(text: string): number {
  if (!/^[1-9]\d{0,8}$/.test(text)) throw new InvalidArgumentError('Give a whole number from 1.');
  return Number(text);
}
