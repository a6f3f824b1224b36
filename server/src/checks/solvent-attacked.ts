/** The solvent reacts with a reagent in another way than by a proton. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'solvent-attacked',
  family: 'solvent',
  severity: 'error',
  summary: 'The solvent reacts with a reagent in another way than by a proton.',
  why: 'Organometallics and strong hydrides add to carbonyl groups of amides, esters, ketones and nitriles.',
  remedy: 'Use an ether or a hydrocarbon.',
  silentWhen: 'Amounts of such a compound charged as a reagent, as DMF after a lithiation.',
  sources: ['common-practice'],
  *inStep(facts) {
    for (const { ingredient, range, statement } of facts.additions) {
      if (
        statement === null ||
        !ingredient.reagent?.roles.some((role) => role === 'organometallic' || role === 'aluminium-hydride')
      )
        continue;
      for (const solvent of facts.additions) {
        if (
          solvent.ingredient.role !== 'solvent' ||
          !ATTACKED.has(solvent.ingredient.solvent?.kind ?? '') ||
          solvent.statement?.keyword !== 'solvent'
        )
          continue;
        yield {
          range: solvent.range,
          message: `${ingredient.name} adds to ${solvent.ingredient.name}: an ${solvent.ingredient.solvent?.kind} is no solvent for it.`,
          related: [{ range, message: 'the reagent that attacks' }],
        };
      }
    }
  },
});

/** Classes of solvents with a carbonyl group or the like that takes an organometallic or a strong hydride. */
const ATTACKED = new Set(['amide', 'ester', 'carbonate', 'urea']);
