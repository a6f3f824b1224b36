/** One name for two different structures, or one label for two steps. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'defined-twice',
  family: 'text',
  severity: 'error',
  summary: 'One name for two different structures, or one label for two steps.',
  why: 'A reader cannot tell which of the two a later line means.',
  remedy: 'Give each its own name; the first definition is used meanwhile.',
  silentWhen: 'The same structure declared again under the same name is fine.',
  sources: [],
  wrong: `compound 1 = CCO
compound 1 = CCCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
`,
  right: `compound 1 = CCO
compound 2 = CCCO
step A
  solvent THF 20 mL
  charge 1 1 mmol
  charge 2 1 mmol
`,
});
