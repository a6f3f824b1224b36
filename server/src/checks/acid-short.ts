/** The acid does not cover the intended sites. */

import { defineCheck } from './define.ts';
import { reportShort } from './verdicts.ts';

export default defineCheck({
  name: 'acid-short',
  family: 'direction',
  severity: 'warning',
  summary: 'The acid does not cover the intended sites.',
  why: 'What the acid does not reach stays as it was and ends up in the product or the waste.',
  remedy:
    'Charge at least one equivalent of acid for each site, and one more for every site that goes first.',
  silentWhen: 'Catalytic amounts where a conversion gives the acid back.',
  sources: ['common-practice'],
  inStep: (facts) => reportShort(facts, 'protonate'),
});
