/** The quench does not use up what is left of a hydride, metal amide or organometallic. */
import type { Ingredient } from '../flask/state.ts';
import type { Range } from '../route/plan.ts';
import { defineCheck } from './define.ts';
import type { Moment, StepFacts } from './facts.ts';
import { shareLeft } from './left.ts';
import { percent } from './verdicts.ts';

export default defineCheck({
  name: 'quench-short',
  family: 'conversion',
  severity: 'warning',
  summary: 'The quench does not use up what is left of a hydride, metal amide or organometallic.',
  why: 'What survives the quench meets water or air in the work-up, with heat, gas or fire.',
  remedy:
    'Charge at least one proton of the quench for every base equivalent that the reaction leaves, with a margin.',
  silentWhen:
    'Where less than a tenth of the reagent is left, and reagents that the conversion may have used up: one of an organometallic, four hydrides of a complex hydride for each molecule.',
  sources: ['bretherick', 'common-practice'],
  wrong: `compound P = CCCCC#[CH:1]
step A
  solvent THF 30 mL
  temperature -78 °C
  charge P 5 mmol
  base n-BuLi 3 equiv 2.5 M in hexanes
  deprotonate P at :1
  quench AcOH 0.5 equiv
`,
  right: `compound P = CCCCC#[CH:1]
step A
  solvent THF 30 mL
  temperature -78 °C
  charge P 5 mmol
  base n-BuLi 1.05 equiv 2.5 M in hexanes
  deprotonate P at :1
  quench AcOH 1.2 equiv
`,
  *inStep(facts) {
    const moment = lastQuench(facts);
    if (moment?.statement.keyword !== 'quench') return;
    const { statement } = moment;
    for (const one of moment.contents.ingredients) {
      if (!one.reagent?.roles.some((role) => LIVELY.has(role)) || one.qualifier === 'catalytic') continue;
      const able = one.mol * (one.reagent.protonCapacity ?? 1);
      const left = shareLeft(one, moment) * able - usedUp(one, facts);
      if (left < LEAST * able) continue;
      const reagent = facts.additions.find(({ ingredient }) => ingredient.id === one.id);
      yield {
        range: statement.amount.range ?? statement.substance.range,
        figures: { left: left / able, mol: left },
        message: `After this quench ${percent(left / able)} of ${one.name} is left (${Number((1000 * left).toPrecision(2))} mmol of base): follow local rules for what it does in the work-up.`,
        related: related(reagent?.range, one),
      };
    }
  },
});

/** Share of a reagent that may be left. */
const LEAST = 0.1;
/** Reagents that water or air destroys with heat, gas or fire. */
const LIVELY = new Set<string>(['metal-hydride', 'metal-amide', 'organometallic', 'aluminium-hydride']);
/** Hydrides that one molecule of ester, nitrile or amide may take. */
const HYDRIDES_EACH = 4;

/** The flask after the last quench; what a later wash brings comes too late. */
function lastQuench({ moments }: StepFacts): Moment | undefined {
  return moments.filter(({ statement }) => statement.keyword === 'quench').at(-1);
}

/** mol of base that conversions of the step may have used up in another way than by taking a proton. */
function usedUp({ reagent }: Ingredient, { conversions }: StepFacts): number {
  const each = reagent?.roles.includes('aluminium-hydride') ? HYDRIDES_EACH : 1;
  return conversions.reduce((sum, { statement, before }) => {
    if (statement.from.some(({ substance }) => substance.reagent === reagent)) return sum;
    const compounds = before.ingredients.filter(({ name, role }) => {
      const isReactant = statement.from.some(({ substance }) => substance.name === name);
      return isReactant && role === 'compound';
    });
    return sum + each * Math.max(0, ...compounds.map(({ mol }) => mol));
  }, 0);
}

function related(range: Range | undefined, { name }: Ingredient) {
  return range === undefined ? [] : [{ range, message: `${name}, which is left over` }];
}
