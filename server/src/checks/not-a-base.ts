/** A substance charged as a base that has no proton to take. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'not-a-base',
  family: 'reagents',
  severity: 'warning',
  summary: 'A substance charged as a base that has no proton to take.',
  why: 'The writer expects it to act, and the flask knows no site that could.',
  remedy: 'Write charge or inert, or name the base that is meant.',
  silentWhen: 'Lewis acids, and everything with a site of the right kind within reach.',
  sources: ['common-practice'],
  *inStep(facts) {
    for (const { ingredient, range, statement } of facts.additions) {
      if (statement?.keyword !== 'base' || ingredient.role !== 'base' || ingredient.molecule === null)
        continue;
      const roles: readonly string[] = ingredient.reagent?.roles ?? [];
      if (roles.some((role) => ACTS.has(role))) continue;
      const able = ingredient.molecule.couples.some(
        ({ holdsProton, family }) =>
          !holdsProton && family !== 'oxygen-base' && family !== 'mineral-acid' && family !== 'sulfonic-acid',
      );
      if (!able) yield { range, message: `${ingredient.name} has no site that takes a proton here.` };
    }
  },
});

/** Roles that act as base whatever their structure shows. */
const ACTS = new Set(['metal-hydride', 'organometallic', 'metal-amide', 'fluoride', 'solid-base']);
