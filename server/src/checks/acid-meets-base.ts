/** An acid and a base of the same flask destroy each other. */
import { constantsIn } from '../chemistry/constants.ts';
import { reagentFates } from '../flask/fates.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'acid-meets-base',
  family: 'reagents',
  severity: 'warning',
  summary: 'An acid and a base of the same flask destroy each other.',
  why: 'Two strong reagents charged one after the other neutralise each other before either acts.',
  remedy: 'Charge one of them later, as a quench, or leave it out.',
  silentWhen: 'Quenches, buffers of a weak acid and a weak base, and losses below a third.',
  sources: ['common-practice'],
  *inStep(facts) {
    for (const { statement, contents } of facts.moments) {
      if (statement.keyword === 'convert' || statement.keyword === 'quench' || statement.keyword === 'adjust')
        break;
      if (statement.keyword !== 'acid' && statement.keyword !== 'base') continue;
      for (const fate of reagentFates(contents, facts.tables, constantsIn)) {
        const [one, other] = [fate.ingredient, fate.other.ingredient].map((id) =>
          facts.additions.find(({ ingredient }) => ingredient.id === id),
        );
        if (one?.statement !== statement || other?.statement == null || other.statement === statement)
          continue;
        const pair = new Set([one.ingredient.role, other.ingredient.role]);
        if (
          !pair.has('acid') ||
          !pair.has('base') ||
          fate.share < 0.34 ||
          (fate.own.constant.value - fate.other.constant.value < 4 &&
            fate.other.constant.value - fate.own.constant.value < 4)
        )
          continue;
        yield {
          range: one.range,
          message: `${one.ingredient.name} and ${other.ingredient.name} neutralise each other: ${Math.round(100 * fate.share)} % of ${one.ingredient.name} is lost.`,
          related: [{ range: other.range, message: 'the reagent it meets' }],
        };
        break;
      }
    }
  },
});
