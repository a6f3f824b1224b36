/** More strong base than the intended sites take, and the rest finds another site. */
import { constantsIn } from '../chemistry/constants.ts';
import { attackedBy, choicesAs } from '../flask/choices.ts';
import { siteOrder } from '../flask/fates.ts';
import type { Ingredient } from '../flask/state.ts';
import { defineCheck } from './define.ts';
import type { StepFacts } from './facts.ts';
import { type Judged, judgedTransfers, nameOf, percent, unit } from './verdicts.ts';

export default defineCheck({
  name: 'base-excess',
  family: 'direction',
  severity: 'warning',
  summary: 'More strong base than the intended sites take, and the rest finds another site.',
  why: 'A hydride, metal amide or organometallic left over after the intended site takes the next proton of the flask, or adds to a carbonyl group.',
  remedy: 'Charge one equivalent for each intended site, or name the second site if it is meant too.',
  silentWhen:
    'An excess of less than a third of an equivalent, an excess that finds nothing, and weaker bases, whose excess is harmless.',
  sources: ['common-practice'],
  wrong: `compound P = O=C([CH3:1])CCC#C
step A
  solvent THF 30 mL
  temperature -78 °C
  charge P 5 mmol
  base LDA 2 equiv 2.0 M in THF
  deprotonate P at :1
`,
  right: `compound P = O=C([CH3:1])CCC#C
step A
  solvent THF 30 mL
  temperature -78 °C
  charge P 5 mmol
  base LDA 1.05 equiv 2.0 M in THF
  deprotonate P at :1
`,
  *inStep(facts) {
    const judged = judgedTransfers(facts)
      .filter(({ fact }) => fact.statement.keyword === 'deprotonate')
      .at(-1);
    if (judged?.kind !== 'fine' || judged.verdict.capacity < 1 + LEAST_EXCESS) return;
    const { partner, broughtBy } = judged.verdict;
    const base = facts.additions.find(
      ({ ingredient }) => ingredient.id === (broughtBy ?? partner?.ingredient),
    );
    if (!base?.ingredient.reagent?.roles.some((role) => STRONG.has(role))) return;
    const found = secondSite(facts, judged) ?? electrophile(facts, judged, base.ingredient);
    if (found === null) return;
    const { capacity, site } = judged.verdict;
    yield {
      range: amountRange(base.statement) ?? base.range,
      confidence: found.confidence,
      figures: { equivalents: capacity },
      message: `${capacity.toFixed(1)} equiv of base for one equiv of the ${nameOf(facts, site)}: the rest ${found.words}.`,
      related: [{ range: base.range, message: 'the base in excess' }],
    };
  },
});

interface Found {
  readonly words: string;
  readonly confidence: number;
}

/** A site that nobody means, acidic enough for what is left of the base. */
function secondSite(facts: StepFacts, { fact, verdict }: Judged): Found | null {
  const amount = fact.ingredient?.mol ?? 0;
  const order = siteOrder(fact.contents, verdict, 'deprotonate', facts.tables, constantsIn);
  const second = order.find(
    ({ difference, moved, site, amount: own }) =>
      0 < difference &&
      LEAST_EXCESS <= moved &&
      LEAST_EXCESS * amount <= moved * own &&
      !isMeant(facts, site.couple.equivalents),
  );
  if (second === undefined) return null;
  return {
    words: `takes ${percent(second.moved)} of the ${nameOf(facts, second.site)} (pKa ${unit(second.site)}) too`,
    confidence: 1 - second.probability,
  };
}

/** A group to which what is left of the base adds. */
function electrophile(facts: StepFacts, { fact, verdict }: Judged, base: Ingredient): Found | null {
  const amount = fact.ingredient?.mol ?? 0;
  const order = siteOrder(fact.contents, verdict, 'deprotonate', facts.tables, constantsIn);
  const taken = order.reduce((sum, { moved, amount: own }) => sum + moved * own, amount);
  if (verdict.capacity * amount - taken < LEAST_EXCESS * amount) return null;
  const choice = choicesAs('base', facts.tables).find(({ reagent }) => reagent === base.reagent);
  const attacked = choice === undefined ? null : attackedBy(choice, fact.contents.ingredients, facts.tables);
  if (attacked === null) return null;
  const owner = fact.contents.ingredients.find(({ id }) => id === attacked.ingredient);
  return { words: `adds to the ${attacked.group} of ${owner?.name}`, confidence: 1 };
}

/** Equivalents beyond the intended sites from which an excess is more than a margin. */
const LEAST_EXCESS = 0.3;
/** Reagents strong enough that nothing acidic is left in peace. */
const STRONG = new Set<string>(['metal-hydride', 'metal-amide', 'organometallic']);

function isMeant({ transfers }: StepFacts, atoms: readonly number[]): boolean {
  return transfers.some(({ statement }) =>
    statement.sites.some((site) => site.atoms.some((atom) => atoms.includes(atom))),
  );
}

function amountRange(statement: StepFacts['additions'][number]['statement']) {
  return statement !== null && 'amount' in statement ? statement.amount.range : null;
}
