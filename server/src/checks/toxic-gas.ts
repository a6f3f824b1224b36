/** A toxic gas is set free. */
import { dangersOf, gasWords, isGrave } from './dangers.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'toxic-gas',
  family: 'cautions',
  severity: 'error',
  summary: 'A toxic gas is set free.',
  why: 'Cyanide, azide, sulfide and their like give lethal gases as soon as the flask is acidic enough, and the proton balance says when; some pairs make one whatever the acidity.',
  remedy: 'Keep the flask basic, destroy the salt first, and follow local rules.',
  silentWhen:
    'Where the flask stays four pH units above the pKa of what would leave, and pairs that never meet; between that and a twentieth set free it informs. Silence never means that a plan is safe.',
  sources: ['bretherick'],
  wrong: `step A
  solvent water 20 mL
  charge NaCN 5 mmol
  acid HCl 10 mmol
`,
  right: `step A
  solvent water 20 mL
  charge NaCN 5 mmol
  base NaOH 20 mmol
`,
  *inStep(facts) {
    for (const danger of dangersOf('toxic-gas', facts)) {
      const { row, range, share, mol, pH } = danger;
      const acidity = pH === null ? '' : `At pH ${pH.toFixed(1)} `;
      const figures = { share, mol };
      if (share !== null && !isGrave(danger))
        yield {
          range,
          severity: 'information',
          figures,
          message: `${acidity}${percent(share)} stands in the form that leaves as ${row.hazard}: ${row.advice}.`,
        };
      else
        yield {
          range,
          figures,
          message: `${acidity === '' ? 'This' : `${acidity}this`} sets free ${row.hazard}${gasWords(mol, row)}: ${row.advice}.`,
        };
    }
  },
});

function percent(share: number): string {
  return `${(100 * share).toPrecision(1)} %`;
}
