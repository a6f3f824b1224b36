/** A line that is no statement of the language. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'unreadable-line',
  family: 'text',
  severity: 'error',
  summary: 'A line that is no statement of the language.',
  why: 'A line that is not understood is left out of the flask, so every figure after it may be wrong.',
  remedy: 'Begin the line with a keyword such as charge, base or solvent, or put // before a remark.',
  silentWhen: 'Blank lines and comments say nothing.',
  sources: [],
  wrong: `step A
  solvent THF 20 mL
  stir overnight
`,
  right: `step A
  solvent THF 20 mL
  note "stir overnight"
`,
});
