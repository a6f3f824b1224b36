/** Two things in one flask that run away together. */

import { defineCheck } from './define.ts';
import { isTriggered } from './triggers.ts';

export default defineCheck({
  name: 'runaway-pair',
  family: 'cautions',
  severity: 'error',
  summary: 'Two things in one flask that run away together.',
  why: 'Some pairs decompose with more heat than a flask can shed, or make explosives.',
  remedy: 'Change one of the two, the solvent or the temperature, and follow local rules.',
  silentWhen:
    'Pairs below the temperature at which the trade handles them; silence never means that a plan is safe.',
  sources: ['bretherick'],
  *inStep({ moments, additions, left, tables }) {
    for (const row of tables.cautions) {
      if (row.check !== 'runaway-pair') continue;
      for (const { statement, contents } of moments) {
        const { ingredients } = contents;
        const second = ingredients.find((one) => isTriggered(row.second, one));
        if (second === undefined || !ingredients.some((one) => isTriggered(row.first, one))) continue;
        if (row.aboveTemperature !== null && left.temperature - 273.15 < row.aboveTemperature) break;
        const range =
          additions.find(
            (addition) => addition.statement === statement && addition.ingredient.role !== 'solvent',
          )?.range ?? statement.range;
        yield { range, message: `This pair can give ${row.hazard}: ${row.advice}.` };
        break;
      }
    }
  },
});
