/** The reagent reacts with its solvent reversibly, whose own ion then does the work. */
import { constantsIn } from '../chemistry/constants.ts';
import { reagentFates } from '../flask/fates.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'levelled',
  family: 'direction',
  severity: 'information',
  summary: 'The reagent reacts with its solvent reversibly, whose own ion then does the work.',
  why: 'No base stronger than the solvent’s own anion and no acid stronger than its own cation lasts in it.',
  remedy: 'Nothing, if the solvent’s ion is meant; otherwise choose a solvent that does not react.',
  silentWhen: 'Where the exchange costs less than a tenth of the reagent.',
  sources: ['reichardt-2011'],
  *inStep(facts) {
    const last = facts.moments.at(-1);
    if (last === undefined || facts.transfers.length === 0) return;
    for (const fate of reagentFates(facts.transfers[0]!.contents, facts.tables, constantsIn)) {
      if (!fate.isLevelled || fate.share < 0.5) continue;
      const addition = facts.additions.find(({ ingredient }) => ingredient.id === fate.ingredient);
      if (
        addition?.statement?.keyword !== 'base' ||
        addition.ingredient.role !== 'base' ||
        addition.ingredient.reagent?.roles.includes('hydroxide')
      )
        continue;
      yield {
        range: addition.range,
        message: `${addition.ingredient.name} is levelled: in this solvent the solvent’s own anion does the work.`,
        severity: 'information',
      };
    }
  },
});
