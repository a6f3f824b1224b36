/** An accept that matches no finding. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'accept-without-effect',
  family: 'text',
  severity: 'warning',
  summary: 'An accept that matches no finding.',
  why: 'It hides nothing today and would hide a new mistake tomorrow.',
  remedy: 'Take the line out, or correct the name of the check.',
  silentWhen: 'An accept that matches at least one finding of its step says nothing.',
  sources: [],
  wrong: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
  accept transfer-uphill "long ago"
`,
  right: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
});
