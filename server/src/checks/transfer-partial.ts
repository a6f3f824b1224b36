/** The intended proton transfer stops half way. */

import { defineCheck } from './define.ts';
import { nameOf, percent, reportKind, severityOf, unit } from './verdicts.ts';

export default defineCheck({
  name: 'transfer-partial',
  family: 'direction',
  severity: 'warning',
  summary: 'The intended proton transfer stops half way.',
  why: 'A mixture of the compound and its ion gives mixtures of products and self-condensation.',
  remedy: 'Use a stronger base (acid), more of it, or a solvent that parts the two constants further.',
  silentWhen: 'Where a conversion consumes the ion as it forms, and where the uncertainty leaves it open.',
  sources: ['bordwell-1988'],
  inStep: (facts) =>
    reportKind(facts, 'partial', ({ verdict }) => ({
      message: `Only ${percent(verdict.extent)} of the ${nameOf(facts, verdict.site)} (pKa ${unit(verdict.site)}) reacts at these amounts; ${verdict.partner === null ? 'no partner' : nameOf(facts, verdict.partner)} is ${verdict.logK < 0 ? 'too weak' : 'spent on the way'} (log K ${verdict.logK.toFixed(1)} ± ${verdict.sd.toFixed(1)}).`,
      severity: verdict.extent < 0.5 ? severityOf(verdict, facts) : 'information',
    })),
});
