/** The compound is isolated in another state of protonation than the plan says. */
import { mainComponent } from '../flask/layers.ts';
import type { FlaskState, Ingredient } from '../flask/state.ts';
import type { IsolateStatement } from '../route/plan.ts';
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
  *inStep({ moments, additions }) {
    for (const { statement, contents, state } of moments) {
      if (statement.keyword !== 'isolate' || additions.length === 0) continue;
      const one = contents.ingredients.filter(({ name }) => name === statement.substance.name).at(-1);
      if (one?.molecule == null) continue;
      // Acid chlorides in an alcohol set free the acid that makes the salt.
      if (contents.ingredients.some(({ reagent }) => reagent?.roles.includes('halogenating'))) continue;
      const found = formOf(one, state());
      if (found === null || fits(statement.state, found)) continue;
      yield {
        range: statement.stateRange,
        message: `${one.name} lies here as ${WORDS[found]}, not as ${EXPECTED[statement.state]}.`,
      };
    }
  },
});

type Form = 'neutral' | 'cation' | 'anion' | 'zwitterion';

const WORDS: Readonly<Record<Form, string>> = {
  neutral: 'the neutral compound',
  cation: 'its cation',
  anion: 'its anion',
  zwitterion: 'the zwitterion',
};
const EXPECTED: Readonly<Record<IsolateStatement['state'], string>> = { ...WORDS, salt: 'a salt' };

/** The commonest form of the organic part of an ingredient; null where nothing in it takes or gives a proton. */
function formOf({ id, molecule }: Ingredient, { couples }: FlaskState): Form | null {
  const main = molecule === null ? null : mainComponent(molecule);
  const own = couples.filter(
    ({ ingredient, couple }) => ingredient === id && couple.component === main && couple.element !== 'C',
  );
  if (own.length === 0) return null;
  const isCation = own.some(({ couple, protonated }) => couple.kind === 'base' && 0.5 < protonated);
  const isAnion = own.some(({ couple, protonated }) => couple.kind === 'acid' && protonated < 0.5);
  if (isCation && isAnion) return 'zwitterion';
  if (isCation) return 'cation';
  return isAnion ? 'anion' : 'neutral';
}

/** An inner salt weighs and dissolves as the neutral compound for what the writer asks. */
function fits(wanted: IsolateStatement['state'], found: Form): boolean {
  if (wanted === 'salt') return found !== 'neutral';
  if (wanted === 'neutral') return found === 'neutral' || found === 'zwitterion';
  return wanted === found;
}
