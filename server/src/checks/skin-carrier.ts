/** Something in the flask goes through the skin or takes something toxic through it. */
import { dangersOf } from './dangers.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'skin-carrier',
  family: 'cautions',
  severity: 'information',
  summary: 'Something in the flask goes through the skin or takes something toxic through it.',
  why: 'Dimethyl sulfoxide carries what is dissolved in it through skin and many gloves; hydrogen fluoride goes deep without pain at first.',
  remedy: 'Choose gloves that hold the solvent, change them at once when wet, and follow local rules.',
  silentWhen:
    'Dimethyl sulfoxide without a toxic solute, and fluoride with enough base to keep hydrogen fluoride below a tenth; silence never means that a plan is safe.',
  sources: ['prudent-practices'],
  wrong: `step A
  solvent DMSO 20 mL
  charge NaCN 10 mmol
`,
  right: `step A
  solvent DMF 20 mL
  charge NaCN 10 mmol
`,
  *inStep(facts) {
    for (const { row, range } of dangersOf('skin-carrier', facts))
      yield { range, message: `This can cause ${row.hazard}: ${row.advice}.` };
  },
});
