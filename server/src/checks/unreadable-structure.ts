/** A SMILES that does not follow the OpenSMILES grammar or has no Kekulé form. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'unreadable-structure',
  family: 'text',
  severity: 'error',
  summary: 'A SMILES that does not follow the OpenSMILES grammar or has no Kekulé form.',
  why: 'Without a structure a compound has no acidic or basic sites, and every step that uses it goes unchecked.',
  remedy: 'Close rings and brackets, and write [nH] where an aromatic nitrogen carries a hydrogen.',
  silentWhen: 'Any SMILES that can be read, however odd, is taken as written.',
  sources: ['opensmiles'],
  wrong: `compound 1 = CC(=O
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
  right: `compound 1 = CC(=O)C
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
});
