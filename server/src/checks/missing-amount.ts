/** An addition whose amount is needed and not written. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'missing-amount',
  family: 'text',
  severity: 'warning',
  summary: 'An addition whose amount is needed and not written.',
  why: 'Whether a base covers every site that takes it is a question of amounts; without them one equivalent is assumed.',
  remedy: 'Write equivalents, mmol, grams or a volume with its strength.',
  silentWhen: 'Solvents without a volume are taken at 0.2 M without a word.',
  sources: [],
  wrong: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1
`,
  right: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
});
