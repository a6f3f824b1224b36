/** A file of compounds that cannot be brought in. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'bad-use',
  family: 'text',
  severity: 'error',
  summary: 'A file of compounds that cannot be brought in.',
  why: 'Its compounds are missing here, so their names will be unknown.',
  remedy: 'Give a relative path inside the workspace to a plan that does not bring this one in again.',
  silentWhen: 'A file that is read twice by different ways is read once.',
  sources: [],
  wrong: `use "../../../elsewhere.lyate"
`,
  right: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
});
