/** The acid does not cover the intended sites. */

import { defineCheck } from './define.ts';
import { figuresOf, judgedTransfers, nameOf } from './verdicts.ts';

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
  *inStep(facts) {
    for (const { fact, verdict, kind } of judgedTransfers(facts)) {
      if (kind !== 'short' || fact.statement.keyword !== 'protonate') continue;
      const id = verdict.broughtBy ?? verdict.partner?.ingredient;
      // Half way, the compound's own ion may be all that is left to act; the acid that was charged is what falls short.
      const acting = facts.additions.find(({ ingredient }) =>
        id === fact.ingredient?.id ? ingredient.role === 'acid' : ingredient.id === id,
      );
      const statement = acting?.statement;
      const range =
        statement != null && 'amount' in statement && statement.amount.range !== null
          ? statement.amount.range
          : (acting?.range ?? fact.statement.range);
      yield {
        range,
        message: `${verdict.capacity.toFixed(2)} equiv of acid for one equiv of the ${nameOf(facts, verdict.site)}: ${Math.round(100 * (1 - verdict.capacity))} % of it stays as it is.`,
        confidence: 1 - verdict.probability < 0.5 ? verdict.probability : 0.9,
        figures: figuresOf(verdict),
      };
    }
  },
});
