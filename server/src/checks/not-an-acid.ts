/** A substance charged as an acid that has no proton to give. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'not-an-acid',
  family: 'reagents',
  severity: 'warning',
  summary: 'A substance charged as an acid that has no proton to give.',
  why: 'The writer expects it to act, and the flask knows no site that could.',
  remedy: 'Write charge or inert, or name the acid that is meant.',
  silentWhen: 'Lewis acids, and everything with a site of the right kind within reach.',
  sources: ['common-practice'],
  *inStep(facts) {
    for (const { ingredient, range, statement } of facts.additions) {
      if (statement?.keyword !== 'acid' || ingredient.role !== 'acid' || ingredient.molecule === null)
        continue;
      const roles: readonly string[] = ingredient.reagent?.roles ?? [];
      if (roles.some((role) => ACTS.has(role))) continue;
      const able = ingredient.molecule.couples.some(
        ({ holdsProton, family }) => holdsProton && family !== 'carbon-acid' && family !== 'amine-nh',
      );
      if (!able) yield { range, message: `${ingredient.name} has no site that gives a proton here.` };
    }
  },
});

/** Roles that act as acid whatever their structure shows. */
const ACTS = new Set(['lewis-acid', 'mineral-acid', 'organic-acid', 'coupling-agent']);
