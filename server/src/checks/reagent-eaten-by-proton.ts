/** An organometallic meant for a carbonyl group meets an acidic proton first. */
import { constantsIn } from '../chemistry/constants.ts';
import { reagentFates } from '../flask/fates.ts';
import { defineCheck } from './define.ts';
import { nameOf, unit } from './verdicts.ts';

export default defineCheck({
  name: 'reagent-eaten-by-proton',
  family: 'reagents',
  severity: 'warning',
  summary: 'An organometallic meant for a carbonyl group meets an acidic proton first.',
  why: 'O–H, N–H and S–H protons destroy an organometallic faster than it adds.',
  remedy: 'Protect the group, deprotonate it first, or charge an equivalent more of the reagent.',
  silentWhen:
    'Carbon acids other than 1,3-dicarbonyls, and flasks with enough of the reagent for every proton and the addition.',
  sources: ['common-practice'],
  *inStep(facts) {
    if (facts.transfers.length !== 0) return;
    const said = new Set<number>();
    for (const { statement, contents } of facts.moments) {
      if (statement.keyword === 'convert' || statement.keyword === 'quench') break;
      for (const fate of reagentFates(contents, facts.tables, constantsIn, SPARING)) {
        if (fate.as !== 'base' || fate.bySolvent || fate.share < 0.2 || said.has(fate.ingredient)) continue;
        const addition = facts.additions.find(({ ingredient }) => ingredient.id === fate.ingredient);
        if (
          addition?.statement?.keyword !== 'charge' ||
          !addition.ingredient.reagent?.roles.includes('organometallic')
        )
          continue;
        const other = contents.ingredients.find(({ id }) => id === fate.other.ingredient);
        if (other?.role !== 'compound' || fate.other.couple.element === 'C') continue;
        // What the protons leave over still adds to every molecule.
        if (other.mol <= (1 - fate.share) * addition.ingredient.mol) continue;
        said.add(fate.ingredient);
        yield {
          range: addition.range,
          confidence: 1 - fate.doubt,
          figures: {
            deltaPKa: fate.own.constant.value - fate.other.constant.value,
            logK: fate.own.constant.value - fate.other.constant.value,
            sd: Math.hypot(fate.own.constant.sd, fate.other.constant.sd),
            extent: fate.share,
          },
          message: `The ${nameOf(facts, fate.other)} (pKa ${unit(fate.other)}) eats ${Math.round(100 * fate.share)} % of ${addition.ingredient.name} before it can add.`,
        };
      }
    }
  },
});

/** An organometallic adds to a carbonyl group rather than taking the proton beside it. */
const SPARING = { sparingCarbonyls: true };
