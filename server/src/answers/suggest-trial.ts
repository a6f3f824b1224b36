/**
 * Works a step with a suggestion in it and says which errors and warnings are new.
 *
 * Knows: facts, checks.  Must not know: how suggestions are found or shown.
 * Invariant: what the step said before is never held against a suggestion.   (tests/answers/suggest.test.ts)
 */
import type { Check, Report } from '../checks/define.ts';
import type { StepFacts, TransferFact } from '../checks/facts.ts';
import { gatherFacts } from '../checks/gather.ts';
import { CHECKS } from '../checks/registry.generated.ts';
import type { Ingredient } from '../flask/state.ts';
import type { Option } from '../flask/suggest.ts';
import { type Swap, stepWith } from './suggest-edits.ts';

/** What a check would say of the step with a suggestion in it. */
export interface Remark {
  readonly check: string;
  readonly message: string;
}

export type Trial = (option: Option) => {
  readonly swap: Swap;
  readonly errors: Remark[];
  readonly cautions: Remark[];
};

/**
 * Tries options for one transfer.
 *
 * @param before what the step goes on from
 * @param acting the bases (acids) whose place an option takes
 */
export function createTrial(
  facts: StepFacts,
  before: StepFacts | null,
  fact: TransferFact,
  acting: readonly Ingredient[],
  loses: boolean,
): Trial {
  const { step, tables, settings } = facts;
  const statements = facts.additions.flatMap(({ ingredient, statement }) =>
    statement !== null && acting.some(({ id }) => id === ingredient.id) ? [statement] : [],
  );
  const amount = fact.ingredient?.mol ?? 0;
  const perReference = amount === 0 ? 1 : amount / step.referenceMol;
  const known = countByCheck(reportsOf(facts));
  return (option) => {
    const swap: Swap = {
      option,
      transfer: fact.statement,
      temperature: fact.contents.temperature,
      acting: statements,
      loses,
      perReference,
      needsSolvent: !fact.contents.ingredients.some(({ role }) => role === 'solvent'),
      step,
    };
    const after = gatherFacts(stepWith(swap), before, tables, settings);
    const left = new Map(known);
    const errors: Remark[] = [];
    const cautions: Remark[] = [];
    for (const { check, severity, message } of reportsOf(after)) {
      const key = `${check} ${severity}`;
      const count = left.get(key) ?? 0;
      if (0 < count) left.set(key, count - 1);
      else (severity === 'error' ? errors : cautions).push({ check, message });
    }
    return { swap, errors, cautions };
  };
}

interface Said {
  readonly check: string;
  readonly severity: 'error' | 'warning';
  readonly message: string;
}

/** The errors and warnings of all checks on a step. */
function reportsOf(facts: StepFacts): Said[] {
  return CHECKS.flatMap((check) => {
    const set = facts.settings.severities[check.name];
    if (check.inStep === undefined || set === 'off' || (check.quiet && set === undefined)) return [];
    const severityOf = ({ severity }: Report) => set ?? severity ?? check.severity;
    return reports(check, facts).flatMap((report): Said[] => {
      const severity = severityOf(report);
      return severity === 'error' || severity === 'warning'
        ? [{ check: check.name, severity, message: report.message }]
        : [];
    });
  });
}

function countByCheck(said: readonly Said[]): Map<string, number> {
  const counts = new Map<string, number>();
  for (const { check, severity } of said) {
    const key = `${check} ${severity}`;
    counts.set(key, (counts.get(key) ?? 0) + 1);
  }
  return counts;
}

/** A check that stops by a fault of its own says nothing here; the analysis names it. */
function reports({ inStep }: Check, facts: StepFacts): Report[] {
  try {
    return [...(inStep?.(facts) ?? [])];
  } catch {
    return [];
  }
}
