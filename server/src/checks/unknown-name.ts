/** A name that is neither a compound of the plan nor in the tables. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'unknown-name',
  family: 'text',
  severity: 'error',
  summary: 'A name that is neither a compound of the plan nor in the tables.',
  why: 'What the flask does not know cannot take part in the proton balance.',
  remedy:
    'Declare it as a compound, write its SMILES in angle brackets, or say inert where it takes no part.',
  silentWhen: 'Names after inert are never questioned; after charge the finding is a warning.',
  sources: [],
  wrong: `step A
  solvent THF 20 mL
  base Nonsensium 1 mmol
`,
  right: `step A
  solvent THF 20 mL
  base DBU 1 mmol
`,
});
