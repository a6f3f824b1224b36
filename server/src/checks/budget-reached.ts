/** Something too large to be analysed in the time a keystroke has. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'budget-reached',
  family: 'program',
  severity: 'warning',
  summary: 'Something too large to be analysed in the time a keystroke has.',
  why: 'Part of the plan was left out of the analysis, and it is better to know.',
  remedy: 'Split the molecule, the line or the step.',
  silentWhen: 'Everything of ordinary size.',
  sources: [],
});
