/** Acid sets a toxic gas free from one of its salts. */

import { defineCheck } from './define.ts';
import { isTriggered } from './triggers.ts';

export default defineCheck({
  name: 'toxic-gas',
  family: 'cautions',
  severity: 'error',
  summary: 'Acid sets a toxic gas free from one of its salts.',
  why: 'Cyanide, azide and sulfide give lethal gases as soon as the flask is acidic enough, and the proton balance says when.',
  remedy: 'Keep the flask basic, destroy the salt first, and follow local rules.',
  silentWhen:
    'Where less than a twentieth of the salt is protonated, or no acid has been added; silence never means that a plan is safe.',
  sources: ['bretherick'],
  *inStep({ moments, additions, tables }) {
    const said = new Set<string>();
    for (const { statement, contents, state } of moments) {
      if (statement.keyword !== 'acid' && statement.keyword !== 'quench' && statement.keyword !== 'charge')
        continue;
      for (const row of tables.cautions) {
        if (row.check !== 'toxic-gas' || said.has(row.id)) continue;
        const { ingredients } = contents;
        const gas =
          row.group === ''
            ? undefined
            : state().couples.find(
                ({ couple, protonated, charged }) =>
                  couple.group === row.group && LEAST < protonated && charged < LEAST,
              );
        const pair =
          row.group === '' &&
          ingredients.some((one) => isTriggered(row.first, one)) &&
          ingredients.some((one) => isTriggered(row.second, one));
        if (gas === undefined && !pair) continue;
        if (row.aboveTemperature !== null && contents.temperature - ZERO_CELSIUS < row.aboveTemperature)
          continue;
        said.add(row.id);
        const amount =
          gas === undefined
            ? ''
            : ` (${(1000 * gas.amount * gas.protonated).toPrecision(2)} mmol, ${(24.5 * gas.amount * gas.protonated).toPrecision(2)} L as gas)`;
        const range =
          additions.find((addition) => addition.statement === statement)?.range ?? statement.range;
        yield { range, message: `This sets free ${row.hazard}${amount}: ${row.advice}.` };
      }
    }
  },
});

/** Share that has to be protonated before the caution speaks. */
const LEAST = 0.05;
/** K */
const ZERO_CELSIUS = 273.15;
