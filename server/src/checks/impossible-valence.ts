/** An atom with more bonds than its element allows. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'impossible-valence',
  family: 'text',
  severity: 'error',
  summary: 'An atom with more bonds than its element allows.',
  why: 'A carbon with five bonds is a slip of the pen; its sites cannot be valued.',
  remedy: 'Take a bond or a hydrogen away, or write the charge that the atom carries.',
  silentWhen: 'Hypervalent sulfur, phosphorus and halogens are accepted as the trade draws them.',
  sources: ['opensmiles'],
  wrong: `compound 1 = CC(C)(C)(C)C
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
  right: `compound 1 = CC(C)(C)C
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
});
