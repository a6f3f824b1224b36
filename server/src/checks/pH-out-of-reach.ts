/** A pH that the named reagent cannot bring the flask to. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'pH-out-of-reach',
  family: 'conversion',
  severity: 'warning',
  summary: 'A pH that the named reagent cannot bring the flask to.',
  why: 'A weak acid or base levels off at its own buffer region; more of it changes nothing.',
  remedy: 'Take a stronger acid or base, or ask for a pH within its reach.',
  silentWhen: 'Where the flask lies there already.',
  sources: ['jencks-1971'],
  *inStep({ adjustments }) {
    for (const { statement, titration } of adjustments) {
      const { obstacle, limit, before } = titration;
      if (obstacle === null || obstacle === 'no-water') continue;
      const reach =
        obstacle === 'already-beyond'
          ? `the flask lies at ${before?.toFixed(1)} already`
          : `a great excess comes to ${limit?.toFixed(1)}`;
      yield {
        range: statement.pHRange,
        message: `${statement.substance.name} does not bring this flask to pH ${statement.pH}: ${reach}.`,
      };
    }
  },
});
