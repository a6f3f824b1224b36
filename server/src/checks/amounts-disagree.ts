/** Two amounts of one addition that differ by more than 5 %. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'amounts-disagree',
  family: 'text',
  severity: 'warning',
  summary: 'Two amounts of one addition that differ by more than 5 %.',
  why: 'Mass, volume and equivalents of one addition describe one number of moles; a disagreement means that one of them was not updated.',
  remedy: 'Correct the one that is wrong or leave it out.',
  silentWhen: 'Amounts within 5 % of each other agree.',
  sources: [],
  wrong: `compound 1 = OC(=O)c1ccccc1
step A
  solvent THF 20 mL
  charge 1 10 mmol 5 g
`,
  right: `compound 1 = OC(=O)c1ccccc1
step A
  solvent THF 20 mL
  charge 1 10 mmol 1.22 g
`,
});
