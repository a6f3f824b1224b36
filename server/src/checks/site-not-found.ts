/** A site that the named compound does not have. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'site-not-found',
  family: 'text',
  severity: 'error',
  summary: 'A site that the named compound does not have.',
  why: 'The intended proton is looked up by its atom map; without the atom there is nothing to judge.',
  remedy: 'Write the map number in the SMILES, as in [CH2:1], or correct the number.',
  silentWhen: 'Without a number the most acidic (basic) site is meant and nothing is said.',
  sources: [],
  wrong: `compound 1 = CC[OH:1]
step A
  solvent THF 20 mL
  charge 1 1 mmol
  base NaH 1.1 equiv
  deprotonate 1 at :2
`,
  right: `compound 1 = CC[OH:1]
step A
  solvent THF 20 mL
  charge 1 1 mmol
  base NaH 1.1 equiv
  deprotonate 1 at :1
`,
});
