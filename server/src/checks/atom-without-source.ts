/** An atom of the product that nothing in the flask can have brought. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'atom-without-source',
  family: 'conversion',
  severity: 'warning',
  summary: 'An atom of the product that nothing in the flask can have brought.',
  why: 'Either a reagent is missing from the flask or the product is drawn wrong.',
  remedy: 'Charge the reagent that brings it, or correct the structure.',
  silentWhen: 'Atoms that a reagent, a solvent or a later quench may bring.',
  sources: ['common-practice'],
  *inStep({ conversions }) {
    for (const { statement, conversion } of conversions) {
      for (const { product, element, count } of conversion.missing) {
        const target = statement.to[product];
        if (target !== undefined)
          yield {
            range: target.substance.range,
            message: `${count} ${element} of ${target.substance.name} has no source in this flask.`,
          };
      }
    }
  },
});
