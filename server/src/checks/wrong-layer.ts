/** The compound is in the other layer than the extraction or wash counts on. */
import type { Statement } from '../route/plan.ts';
import { defineCheck, type Report } from './define.ts';
import type { Moment, StepFacts } from './facts.ts';
import { isAqueous } from './gather.ts';
import { betterPH, type Distributed, distributedAt } from './layers.ts';
import { percent } from './verdicts.ts';

export default defineCheck({
  name: 'wrong-layer',
  family: 'conversion',
  severity: 'warning',
  summary: 'The compound is in the other layer than the extraction or wash counts on.',
  why: 'An ion stays in water: an acid extracted from base, or an amine from acid, is thrown away with the aqueous layer.',
  remedy: 'Bring the water to a pH at which the compound is neutral before extracting it.',
  silentWhen:
    'Where at least half of the compound is in the layer, where the doubt of the estimated log P leaves it open, and without two layers.',
  sources: ['schwarzenbach-2003', 'common-practice'],
  wrong: `compound P = OC(=O)c1ccc(Cl)cc1
step A
  solvent water 30 mL
  charge P 5 mmol
  base NaOH 2 equiv
  extract P into EtOAc 2 x 20 mL
`,
  right: `compound P = OC(=O)c1ccc(Cl)cc1
step A
  solvent water 30 mL
  charge P 5 mmol
  base NaOH 2 equiv
  adjust pH 2 with HCl
  extract P into EtOAc 2 x 20 mL
`,
  *inStep(facts) {
    for (const moment of facts.moments) {
      const { statement } = moment;
      if (statement.keyword === 'extract') yield* extraction(facts, moment);
      if (statement.keyword === 'wash') yield* wash(facts, moment);
    }
  },
});

function* extraction(facts: StepFacts, moment: Moment): Iterable<Report> {
  const { statement } = moment;
  if (statement.keyword !== 'extract') return;
  const { substance, into, amount } = statement;
  const isBack = isAqueous(into);
  const found = distributedAt(moment, substance.name, facts.tables, isBack ? 1 : amount.portions);
  const layer = isBack ? 'aqueous' : 'organic';
  if (found === null || found.doubt[layer] < facts.settings.thresholds.warning) return;
  const taken = isBack ? 1 - found.organic : found.organic;
  yield {
    range: substance.range,
    ...figuresOf(found, layer),
    message: `At pH ${found.pH.toFixed(1)} ${into.name} takes ${percent(taken)} of ${substance.name} (log D ${found.logD.toFixed(1)}, estimated)${hint(found, layer, moment, facts)}.`,
    related: [{ range: into.range, message: 'the layer that is meant' }],
  };
}

/** A wash that carries off what a later line counts on. */
function* wash(facts: StepFacts, moment: Moment): Iterable<Report> {
  const { statement } = moment;
  if (statement.keyword !== 'wash') return;
  for (const name of wantedAfter(facts, statement)) {
    const found = distributedAt(moment, name, facts.tables);
    if (found === null || found.doubt.organic < facts.settings.thresholds.warning) continue;
    yield {
      range: statement.substance.range,
      ...figuresOf(found, 'organic'),
      message: `At pH ${found.pH.toFixed(1)} this wash carries off ${percent(1 - found.organic)} of ${name} (log D ${found.logD.toFixed(1)}, estimated)${hint(found, 'organic', moment, facts)}.`,
    };
  }
}

/** Compounds that the next line about layers wants in the organic one; a `keep` speaks for itself. */
function wantedAfter({ step }: StepFacts, statement: Statement): string[] {
  const later = step.statements.slice(step.statements.indexOf(statement) + 1);
  for (const next of later) {
    if (next.keyword === 'isolate') return next.state === 'neutral' ? [next.substance.name] : [];
    if (next.keyword === 'keep' || next.keyword === 'extract' || next.keyword === 'adjust') return [];
  }
  return [];
}

function figuresOf({ organic, logD, pH, doubt }: Distributed, layer: 'organic' | 'aqueous') {
  return { confidence: doubt[layer], figures: { organic, logD, pH } };
}

function hint(found: Distributed, layer: 'organic' | 'aqueous', moment: Moment, facts: StepFacts): string {
  const better = betterPH(found, layer, moment, facts.tables);
  return better === null ? '' : `; at pH ${better} it would be there`;
}
