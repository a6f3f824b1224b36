/** A configuration or a house file that cannot be read as it stands. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'bad-configuration',
  family: 'program',
  severity: 'error',
  summary: 'A configuration or a house file that cannot be read as it stands.',
  why: 'What cannot be read does not hold: plans are checked as if the entry or the row were not there.',
  remedy: 'Correct the entry of lyate.json, or the line of the house file, at the place named.',
  silentWhen: 'Speaks only of lyate.json and the files that it names, never of a plan.',
  sources: [],
});
