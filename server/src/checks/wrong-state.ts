/** The compound is isolated in another state of protonation than the plan says. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'wrong-state',
  family: 'conversion',
  severity: 'warning',
  summary: 'The compound is isolated in another state of protonation than the plan says.',
  why: 'A salt taken for a free base (or the reverse) brings the wrong mass, solubility and equivalents into the next step.',
  remedy: 'Adjust the pH before isolating, or correct the state.',
  silentWhen: 'Where the expected state holds at least half of the compound.',
  sources: ['common-practice'],
  *inStep({ step, moments, additions }) {
    for (const statement of step.statements) {
      if (statement.keyword !== 'isolate') continue;
      const before = moments
        .filter((moment) => moment.statement.range.start.line < statement.range.start.line)
        .at(-1);
      const one = before?.contents.ingredients.filter(({ name }) => name === statement.substance.name).at(-1);
      if (before === undefined || one?.molecule == null || additions.length === 0) continue;
      const states = before
        .state()
        .couples.filter(({ ingredient, couple }) => ingredient === one.id && couple.family !== 'carbon-acid');
      const charged = states.some(
        ({ couple, protonated }) =>
          (couple.kind === 'base') === 0.5 < protonated &&
          (couple.kind === 'base' ? 0.5 < protonated : protonated < 0.5),
      );
      // Acid chlorides in an alcohol set free the acid that makes the salt.
      if (before.contents.ingredients.some(({ reagent }) => reagent?.roles.includes('halogenating')))
        continue;
      const wants = statement.state !== 'neutral';
      if (statement.state === 'zwitterion' || charged === wants || states.length === 0) continue;
      yield {
        range: statement.stateRange,
        message: wants
          ? `${one.name} lies here as the neutral compound, not as ${statement.state === 'salt' ? 'a salt' : `the ${statement.state}`}.`
          : `${one.name} lies here as its ion: more than half of it is charged.`,
      };
    }
  },
});
