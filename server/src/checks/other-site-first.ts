/** Another site in the flask gives (takes) its proton before the intended one, and the amount does not cover both. */

import { defineCheck } from './define.ts';
import { nameOf, reportKind, unit } from './verdicts.ts';

export default defineCheck({
  name: 'other-site-first',
  family: 'direction',
  severity: 'error',
  summary:
    'Another site in the flask gives (takes) its proton before the intended one, and the amount does not cover both.',
  why: 'The base is gone before it reaches the site that is meant, and the wrong ion reacts.',
  remedy: 'Protect the other site, or add an equivalent for each site that goes first.',
  silentWhen: 'Where there is enough base for all sites up to the intended one.',
  sources: ['bordwell-1988'],
  inStep: (facts) =>
    reportKind(facts, 'other-site', ({ verdict, ahead }) => ({
      message: `${ahead.map((site) => `The ${nameOf(facts, site)} (pKa ${unit(site)})`).join(' and ')} goes before the ${nameOf(facts, verdict.site)} (pKa ${unit(verdict.site)}): the amount does not cover both.`,
      severity: 'error',
    })),
});
