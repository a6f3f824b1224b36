/** The uncertainty of the constants leaves the transfer open. */

import { defineCheck } from './define.ts';
import { nameOf, reportKind, unit } from './verdicts.ts';

export default defineCheck({
  name: 'undecided',
  family: 'data',
  severity: 'information',
  summary: 'The uncertainty of the constants leaves the transfer open.',
  why: 'The two constants lie closer together than they are known; either outcome would be no surprise.',
  remedy: 'Measure the constant and write it as measured, or take a base with a larger margin.',
  silentWhen: 'Where one outcome is more than four times as likely as the other.',
  sources: [],
  inStep: (facts) =>
    reportKind(facts, 'undecided', ({ verdict }) => ({
      message: `Whether the ${nameOf(facts, verdict.site)} (pKa ${unit(verdict.site)}) reacts is open: log K is ${verdict.logK.toFixed(1)} ± ${verdict.sd.toFixed(1)}.`,
      severity: 'information',
    })),
});
