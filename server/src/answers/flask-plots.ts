/**
 * Numbers and pictures of a step's flask after one of its lines: its titration and the forms of what is in it.
 *
 * Knows: analysed plans.  Must not know: files, the protocol.
 * Units: mol, K; pH on the medium's own scale.
 */

import type { Moment, StepFacts } from '../checks/facts.ts';
import { perceive } from '../chemistry/perceive.ts';
import type { Ingredient } from '../flask/state.ts';
import { type TitrationCurve, titrationCurve, usualTitrant } from '../flask/titration-curve.ts';
import { lookUpName } from '../tables/names.ts';
import { speciationPlot, titrationPlot } from './plots.ts';
import { type FormCurves, formCurves } from './speciation.ts';
import { stepAt } from './steps.ts';
import type { Analysed } from './types.ts';

export interface FlaskPlot<Numbers> {
  readonly step: string;
  /** Line after which the flask is shown, from 0. */
  readonly line: number;
  readonly numbers: Numbers;
  readonly svg: string;
}

export interface NamedTitration extends TitrationCurve {
  readonly titrant: string;
  readonly names: ReadonlyMap<number, string>;
}

/**
 * The titration of the flask after the last statement at or above a line.
 *
 * @param titrant name of a reagent; the usual one where undefined
 * @returns null outside steps and for flasks without a pH
 * @throws Error where no reagent of that name has a structure
 */
export function titrationAt(
  analysed: Analysed,
  line: number,
  titrant?: string,
): FlaskPlot<NamedTitration> | null {
  const found = momentAt(analysed, line);
  if (found === null) return null;
  const { facts, moment, shownLine } = found;
  const name = titrant ?? usualTitrant(moment.contents, moment.state());
  const curve = titrationCurve(moment.contents, titrantOf(name, moment, analysed), analysed.tables);
  if (curve === null) return null;
  const names = namesOf(moment);
  const title = `Titration of step ${facts.step.label} with ${name}`;
  const svg = titrationPlot(curve, { title, titrant: name, nameOf: (id) => names.get(id) ?? 'the flask' });
  return { step: facts.step.label, line: shownLine, numbers: { ...curve, titrant: name, names }, svg };
}

/** The forms of what is in the flask over pH; null outside steps and where nothing has a proton to give or take. */
export function speciationAt(analysed: Analysed, line: number): FlaskPlot<FormCurves> | null {
  const found = momentAt(analysed, line);
  if (found === null) return null;
  const { facts, moment, shownLine } = found;
  const numbers = formCurves(moment.contents, moment.state(), analysed.tables);
  if (numbers.forms.length === 0) return null;
  const svg = speciationPlot(numbers, { title: `Forms over pH, step ${facts.step.label}` });
  return { step: facts.step.label, line: shownLine, numbers, svg };
}

function momentAt(
  analysed: Analysed,
  line: number,
): { facts: StepFacts; moment: Moment; shownLine: number } | null {
  const found = stepAt(analysed, line);
  if (found === null) return null;
  const { facts } = found.step;
  const within = line === found.firstLine ? Number.POSITIVE_INFINITY : line - found.firstLine;
  const moment = facts.moments.filter(({ statement }) => statement.range.start.line <= within).at(-1);
  if (moment === undefined) return null;
  return { facts, moment, shownLine: found.firstLine + moment.statement.range.start.line };
}

function titrantOf(name: string, { contents }: Moment, { tables }: Analysed): Ingredient {
  const reagent = lookUpName(tables, name.split(/\s+/))?.reagent ?? null;
  if (reagent?.smiles == null) throw new Error(`no reagent with a structure is called ${name}`);
  return {
    id: 1 + Math.max(-1, ...contents.ingredients.map(({ id }) => id)),
    name,
    molecule: perceive(reagent.smiles, tables),
    mol: 0,
    volume: null,
    role: 'quench',
    reagent,
    solvent: null,
    assumed: false,
    qualifier: null,
  };
}

function namesOf({ contents }: Moment): Map<number, string> {
  return new Map(contents.ingredients.map(({ id, name }) => [id, name]));
}
