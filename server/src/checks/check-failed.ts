/** A check that stopped by a fault of its own. */
import { defineTextCheck } from './define.ts';

export default defineTextCheck({
  name: 'check-failed',
  family: 'program',
  severity: 'information',
  summary: 'A check that stopped by a fault of its own.',
  why: 'The other checks went on, but this one says nothing about the step.',
  remedy: 'Please report the plan line together with the message.',
  silentWhen: 'Always, unless the program has a fault.',
  sources: [],
});
