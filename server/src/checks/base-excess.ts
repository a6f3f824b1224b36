/** More strong base than the intended sites take, and the rest finds another site. */
import { constantsIn } from '../chemistry/constants.ts';
import { siteOrder } from '../flask/fates.ts';
import { defineCheck } from './define.ts';
import type { StepFacts, TransferFact } from './facts.ts';
import { judgedTransfers, nameOf, percent, unit } from './verdicts.ts';

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
  right: `compound P = O=C([CH3:1])CCC#[CH:2]
step A
  solvent THF 30 mL
  temperature -78 °C
  charge P 5 mmol
  base LDA 2 equiv 2.0 M in THF
  deprotonate P at :1, :2
`,
  *inStep(facts) {
    for (const { fact, verdict, kind } of judgedTransfers(facts)) {
      const { site, partner, broughtBy, capacity } = verdict;
      if (kind !== 'fine' || fact.statement.keyword !== 'deprotonate' || partner === null) continue;
      const base = facts.additions.find(
        ({ ingredient }) => ingredient.id === (broughtBy ?? partner.ingredient),
      );
      if (!base?.ingredient.reagent?.roles.some((role) => STRONG.has(role)) || fact !== lastOf(facts))
        continue;
      const amount = fact.ingredient?.mol ?? 0;
      const order = siteOrder(fact.contents, verdict, 'deprotonate', facts.tables, constantsIn);
      const found = order.filter(
        (other) =>
          0 < other.difference &&
          !isMeant(facts, other.site.couple.equivalents) &&
          LEAST_EXCESS <= other.moved,
      );
      const second = found[0];
      if (second === undefined || capacity < 1 + LEAST_EXCESS) continue;
      const share = amount === 0 ? 0 : (second.moved * second.amount) / amount;
      if (share < LEAST_EXCESS) continue;
      yield {
        range: amountRange(base.statement) ?? base.range,
        confidence: 1 - second.probability,
        figures: { equivalents: capacity, moved: second.moved },
        message: `${capacity.toFixed(1)} equiv of base for one equiv of the ${nameOf(facts, site)}: the rest takes ${percent(second.moved)} of the ${nameOf(facts, second.site)} (pKa ${unit(second.site)}) too.`,
        related: [{ range: base.range, message: 'the base in excess' }],
      };
    }
  },
});

/** Equivalents beyond the intended sites from which an excess is more than a margin. */
const LEAST_EXCESS = 0.3;
/** Reagents strong enough that nothing acidic is left in peace. */
const STRONG = new Set<string>(['metal-hydride', 'metal-amide', 'organometallic']);

/** The excess is what is left once the last of the intended sites has been served. */
function lastOf({ transfers }: StepFacts): TransferFact | undefined {
  return transfers.filter(({ statement }) => statement.keyword === 'deprotonate').at(-1);
}

function isMeant({ transfers }: StepFacts, atoms: readonly number[]): boolean {
  return transfers.some(({ statement }) =>
    statement.sites.some((site) => site.atoms.some((atom) => atoms.includes(atom))),
  );
}

function amountRange(statement: StepFacts['additions'][number]['statement']) {
  return statement !== null && 'amount' in statement ? statement.amount.range : null;
}
