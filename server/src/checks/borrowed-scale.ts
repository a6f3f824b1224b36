/** The verdict hangs on a scale that this solvent borrows. */

import { defineCheck } from './define.ts';
import { judgedTransfers } from './verdicts.ts';

export default defineCheck({
  name: 'borrowed-scale',
  family: 'data',
  severity: 'information',
  quiet: true,
  summary: 'The verdict hangs on a scale that this solvent borrows.',
  why: 'Few solvents have measured constants of their own; the others lean on a measured scale at a cost in certainty.',
  remedy:
    'Check the value in this solvent, or choose one with a scale of its own (water, DMSO, acetonitrile).',
  silentWhen: 'Off unless turned on; wherever the verdict would be the same with a scale of its own.',
  sources: [],
  *inStep(facts) {
    for (const { verdict, range } of judgedTransfers(facts)) {
      if (verdict.borrowed)
        yield {
          range,
          message: `This verdict rests on the ${verdict.scale} scale, borrowed for this solvent.`,
          severity: 'information',
        };
    }
  },
});
