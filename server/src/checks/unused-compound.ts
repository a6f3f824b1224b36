/** A compound that no step mentions. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'unused-compound',
  family: 'text',
  severity: 'hint',
  summary: 'A compound that no step mentions.',
  why: 'It may be left over from an earlier version of the route, or a step may use a wrong name.',
  remedy: 'Use it, or take the line out.',
  silentWhen: 'Compounds brought in by use are never counted.',
  sources: [],
  wrong: `compound 1 = CCO
compound 2 = CCCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
  right: `compound 1 = CCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
});
