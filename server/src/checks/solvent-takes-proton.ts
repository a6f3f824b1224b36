/** The solvent takes the proton of an acid that was meant for something else. */
import { constantsIn } from '../chemistry/constants.ts';
import { reagentFates } from '../flask/fates.ts';
import { defineCheck, type Report } from './define.ts';
import type { StepFacts } from './facts.ts';
import {
  figuresOf,
  isSpentOnSolvent,
  judgedTransfers,
  nameOf,
  percent,
  severityOf,
  unit,
} from './verdicts.ts';

export default defineCheck({
  name: 'solvent-takes-proton',
  family: 'solvent',
  severity: 'warning',
  summary: 'The solvent takes the proton of an acid that was meant for something else.',
  why: 'No acid stronger than the protonated solvent lasts in it, so in a basic solvent a strong acid is only the solvent’s salt.',
  remedy: 'Choose a solvent less basic than the site: dichloromethane, acetonitrile, toluene or an ester.',
  silentWhen:
    'Where the protonated solvent still protonates what is meant, as in water, alcohols and ethers, and acids that no base has to be protonated by.',
  sources: ['reichardt-2011'],
  wrong: `compound N = O=[N+]([O-])c1ccc[n:1]c1
step A
  solvent DMSO 20 mL
  charge N 5 mmol
  acid MsOH 1 equiv
  protonate N at :1
`,
  right: `compound N = Cc1ccc[n:1]c1
step A
  solvent DMSO 20 mL
  charge N 5 mmol
  acid MsOH 1 equiv
  protonate N at :1
`,
  *inStep(facts) {
    yield* failedTransfers(facts);
    yield* acidsOfNoUse(facts);
  },
});

/** An intended protonation that the solvent stands before. */
function* failedTransfers(facts: StepFacts): Iterable<Report> {
  for (const { fact, verdict, range } of judgedTransfers(facts)) {
    const { partner, site } = verdict;
    if (fact.statement.keyword !== 'protonate' || verdict.answer !== 'no' || partner === null) continue;
    if (!isSpentOnSolvent(facts, verdict)) continue;
    const solvent = facts.additions.find(({ ingredient }) => ingredient.id === partner.ingredient);
    yield {
      range: solvent?.range ?? range,
      severity: severityOf(verdict, facts),
      confidence: verdict.probability,
      figures: figuresOf(verdict),
      message: `${solvent?.ingredient.name ?? 'The solvent'} (pKa of its conjugate acid ${unit(partner)}) takes the proton before the ${nameOf(facts, site)} (pKa ${unit(site)}): at these amounts ${percent(verdict.extent)} of it is protonated.`,
      related: [{ range, message: 'the protonation that is meant' }],
    };
  }
}

/** An acid in an amine: all of it is the amine’s salt before anything else sees it. */
function* acidsOfNoUse(facts: StepFacts): Iterable<Report> {
  const said = new Set<number>();
  for (const { statement, contents } of facts.moments) {
    if (statement.keyword !== 'acid') continue;
    const amine = contents.ingredients.find(
      ({ role, solvent }) => role === 'solvent' && solvent?.kind === 'amine',
    );
    if (amine === undefined) continue;
    for (const fate of reagentFates(contents, facts.tables, constantsIn)) {
      const acid = facts.additions.find(({ ingredient }) => ingredient.id === fate.ingredient);
      if (fate.as !== 'acid' || !fate.bySolvent || fate.share < MOST || said.has(fate.ingredient)) continue;
      if (acid?.statement !== statement || acid.ingredient.role !== 'acid') continue;
      said.add(fate.ingredient);
      yield {
        range:
          facts.additions.find(({ ingredient }) => ingredient.id === fate.other.ingredient)?.range ??
          acid.range,
        confidence: 1 - fate.doubt,
        figures: { extent: fate.share },
        message: `${amine.name} takes ${percent(fate.share)} of the protons of ${acid.ingredient.name}: what is left is no stronger than its salt (pKa ${unit(fate.other)}).`,
        related: [{ range: acid.range, message: 'the acid that is lost' }],
      };
    }
  }
}

/** Share of an acid lost to an amine solvent that leaves nothing to count on. */
const MOST = 0.5;
