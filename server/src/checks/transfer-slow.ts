/** The intended proton transfer is downhill and does not take place under these conditions. */

import { defineCheck } from './define.ts';
import { nameOf, reportKind } from './verdicts.ts';

export default defineCheck({
  name: 'transfer-slow',
  family: 'direction',
  severity: 'warning',
  summary: 'The intended proton transfer is downhill and does not take place under these conditions.',
  why: 'Protons on unactivated carbon, and some on nitrogen, move far more slowly than the constants suggest.',
  remedy:
    'Add what wakes the base (TMEDA, potassium alkoxide, a crown ether), warm up, or choose a base that is known to do it.',
  silentWhen: 'Where the flask holds the activator that the trade uses for this kind of site.',
  sources: ['whisler-2004', 'common-practice'],
  inStep: (facts) =>
    reportKind(facts, 'slow', ({ verdict }) => ({
      message: `The ${nameOf(facts, verdict.site)} is acidic enough on paper (log K ${verdict.logK.toFixed(1)}), but this proton hardly moves under these conditions.`,
      severity: 'warning',
    })),
});
