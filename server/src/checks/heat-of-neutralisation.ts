/** An addition sets free more heat than the flask can hold. */
import { constantsIn } from '../chemistry/constants.ts';
import { heatOfAddition } from '../flask/heat.ts';
import type { Contents } from '../flask/state.ts';
import { defineCheck } from './define.ts';
import type { Moment, StepFacts } from './facts.ts';

export default defineCheck({
  name: 'heat-of-neutralisation',
  family: 'cautions',
  severity: 'warning',
  summary: 'An addition sets free more heat than the flask can hold.',
  why: 'Neutralisation and hydrolysis are over as fast as the liquids mix; what cooling does not carry off boils the solvent.',
  remedy: 'Add slowly with cooling, dilute, quench in two stages, and follow local rules.',
  silentWhen:
    'Where the adiabatic rise stays below 30 K, or below 50 K and the boiling point, where no volume is written, and where the flask is cooled and the rise does not reach the boiling point. The figure is an estimate for planning, never a safety assessment.',
  sources: ['stoessel-2008', 'goldberg-2002'],
  wrong: `step A
  solvent water 20 mL
  base NaOH 100 mmol
  quench H2SO4 60 mmol
`,
  right: `step A
  solvent water 500 mL
  base NaOH 100 mmol
  quench H2SO4 60 mmol
`,
  *inStep(facts) {
    for (const [place, moment] of facts.moments.entries()) {
      const { statement } = moment;
      if (!ADDING.has(statement.keyword)) continue;
      const before = facts.moments[place - 1]?.contents;
      if (before === undefined || !before.ingredients.some(hasVolume)) continue;
      const { rise, heat } = heatBetween(before, moment, facts);
      if (rise === null || rise < LEAST_RISE) continue;
      const { temperature } = moment.contents;
      const end = temperature + rise - ZERO_CELSIUS;
      const boiling = boilingPoint(moment.contents);
      const boils = boiling !== null && boiling <= end;
      const isCooled = temperature < COOLED;
      if (!boils && (isCooled || rise < SEVERE)) continue;
      const range =
        facts.additions.find((addition) => addition.statement === statement)?.range ?? statement.range;
      yield {
        range,
        figures: { rise, heat, end },
        message: `This sets free ${Math.abs(heat).toPrecision(2)} kJ: without cooling the flask would warm by ${Math.round(rise)} K to ${Math.round(end)} °C${boils ? `, beyond the boiling point of ${Math.round(boiling)} °C` : ''}. Add it slowly with cooling, following local rules.`,
      };
    }
  },
});

const ADDING = new Set(['quench', 'acid', 'base', 'wash', 'adjust']);
/** K below which the solvent boils gently at most, and from which a rise counts as severe (Stoessel 2008). */
const LEAST_RISE = 30;
const SEVERE = 50;
/** K below which the writer has put the flask into a bath that carries heat off. */
const COOLED = 283;
const ZERO_CELSIUS = 273.15;
/** Share of the liquid from which a solvent's boiling point counts. */
const BOILING_SHARE = 0.1;

function hasVolume({ role, volume }: Contents['ingredients'][number]): boolean {
  return role === 'solvent' && volume !== null && 0 < volume;
}

function heatBetween(before: Contents, { contents }: Moment, { tables }: StepFacts) {
  const known = new Set(before.ingredients.map(({ id }) => id));
  const added = contents.ingredients.filter(({ id }) => !known.has(id));
  // A wash draws the old aqueous layer off first, so what is there now counts.
  const kept = contents.ingredients.filter(({ id }) => known.has(id));
  return heatOfAddition({ ...contents, ingredients: kept }, added, tables, constantsIn);
}

/** °C at which the first solvent that matters boils. */
function boilingPoint({ ingredients }: Contents): number | null {
  const liquids = ingredients.filter(hasVolume);
  const total = liquids.reduce((sum, { volume }) => sum + volume!, 0);
  const points = liquids.flatMap(({ solvent, volume }) =>
    solvent?.boilingPoint != null && BOILING_SHARE * total <= volume! ? [solvent.boilingPoint] : [],
  );
  return points.length === 0 ? null : Math.min(...points);
}
