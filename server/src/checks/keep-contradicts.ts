/** The layer that is kept is not the one that holds the compound. */
import { defineCheck } from './define.ts';
import { distributedAt } from './layers.ts';
import { percent } from './verdicts.ts';

export default defineCheck({
  name: 'keep-contradicts',
  family: 'conversion',
  severity: 'warning',
  summary: 'The layer that is kept is not the one that holds the compound.',
  why: 'The other layer goes to waste, and the compound with it.',
  remedy: 'Keep the other layer, or change the pH before the layers are parted.',
  silentWhen:
    'Where at least half of the compound is in the layer that is kept, where the doubt of the estimated log P leaves it open, and without two layers.',
  sources: ['schwarzenbach-2003', 'common-practice'],
  wrong: `compound P = CCN(CC)Cc1ccccc1
step A
  solvent EtOAc 30 mL
  charge P 5 mmol
  wash HCl 20 mmol in water 20 mL
  keep P in organic
`,
  right: `compound P = CCN(CC)Cc1ccccc1
step A
  solvent EtOAc 30 mL
  charge P 5 mmol
  wash HCl 20 mmol in water 20 mL
  keep P in aqueous
`,
  *inStep(facts) {
    let last: { readonly name: string; readonly layer: string } | null = null;
    for (const moment of facts.moments) {
      const { statement } = moment;
      if (statement.keyword !== 'keep') {
        last = null;
        continue;
      }
      const { substance, layer, layerRange } = statement;
      if (last !== null && last.name === substance.name && last.layer !== layer) {
        yield {
          range: layerRange,
          message: `The line before keeps ${substance.name} in the ${last.layer} layer, and nothing has been added since.`,
        };
        continue;
      }
      last = { name: substance.name, layer };
      const found = distributedAt(moment, substance.name, facts.tables);
      if (found === null || found.doubt[layer] < facts.settings.thresholds.warning) continue;
      const kept = layer === 'organic' ? found.organic : 1 - found.organic;
      yield {
        range: layerRange,
        confidence: found.doubt[layer],
        figures: { organic: found.organic, logD: found.logD, pH: found.pH },
        message: `At pH ${found.pH.toFixed(1)} the ${layer} layer holds ${percent(kept)} of ${substance.name} (log D ${found.logD.toFixed(1)}, estimated).`,
      };
    }
  },
});
