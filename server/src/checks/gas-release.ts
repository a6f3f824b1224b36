/** Gas leaves in such an amount that the vessel has to be open and the addition slow. */
import { dangersOf, gasWords } from './dangers.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'gas-release',
  family: 'cautions',
  severity: 'information',
  summary: 'Gas leaves in such an amount that the vessel has to be open and the addition slow.',
  why: 'Hydrogen, carbon dioxide and hydrogen chloride burst a closed vessel and carry the contents out of an open one; hydrogen also burns.',
  remedy: 'Vent the vessel, add in portions, keep the pace that the cooling allows, and follow local rules.',
  silentWhen: 'Below 1 mmol of gas; silence never means that a plan is safe.',
  sources: ['bretherick'],
  wrong: `step A
  solvent THF 20 mL
  charge NaH 10 mmol
  quench water 5 mL
`,
  right: `step A
  solvent THF 20 mL
  charge K2CO3 10 mmol
  quench water 5 mL
`,
  *inStep(facts) {
    for (const { row, range, mol } of dangersOf('gas-release', facts)) {
      if (mol !== null && mol < LEAST) continue;
      yield {
        range,
        figures: { mol },
        message: `This gives off ${row.hazard}${gasWords(mol, row)}: ${row.advice}.`,
      };
    }
  },
});

/** mol of gas that is worth a word. */
const LEAST = 1e-3;
