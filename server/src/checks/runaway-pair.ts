/** Two things in one flask that run away together. */
import { dangersOf } from './dangers.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'runaway-pair',
  family: 'cautions',
  severity: 'error',
  summary: 'Two things in one flask that run away together.',
  why: 'Some pairs decompose with more heat than a flask can shed, or make explosives.',
  remedy: 'Change one of the two, the solvent or the temperature, and follow local rules.',
  silentWhen:
    'Pairs below the temperature at which the trade handles them; silence never means that a plan is safe.',
  sources: ['bretherick'],
  wrong: `step A
  solvent CH2Cl2 20 mL
  charge NaN3 10 mmol
`,
  right: `step A
  solvent DMF 20 mL
  charge NaN3 10 mmol
`,
  *inStep(facts) {
    for (const { row, range } of dangersOf('runaway-pair', facts))
      yield { range, message: `This pair can give ${row.hazard}: ${row.advice}.` };
  },
});
