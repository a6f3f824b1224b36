/** An amount or temperature that cannot be: a negative or absurd number, or a unit of the wrong kind. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'bad-unit',
  family: 'text',
  severity: 'error',
  summary:
    'An amount or temperature that cannot be: a negative or absurd number, or a unit of the wrong kind.',
  why: 'A wrong number goes straight into the proton balance.',
  remedy: 'Write a positive number with a unit of mass, volume, substance or equivalents.',
  silentWhen: 'Every unit that measures the right kind of thing is taken.',
  sources: [],
  wrong: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 -3 mmol
`,
  right: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 3 mmol
`,
});
