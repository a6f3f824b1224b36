/** A heteroatom with a proton or a lone pair that no rule covers. */
import { perceive } from '../chemistry/perceive.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'no-rule',
  family: 'data',
  severity: 'warning',
  summary: 'A heteroatom with a proton or a lone pair that no rule covers.',
  why: 'A site without a value takes no part in the balance; the step may look cleaner than it is.',
  remedy: 'Write a measured value for it, and please report the structure.',
  silentWhen: 'Atoms that carry no proton and take none.',
  sources: [],
  *inStep({ additions, tables }) {
    for (const { ingredient, range, statement } of additions) {
      if (statement === null || ingredient.molecule === null || ingredient.role === 'inert') continue;
      const { uncovered, graph } = perceive(ingredient.molecule.smiles, tables);
      if (uncovered.length === 0) continue;
      const atoms = uncovered.map((atom) => `${graph!.atoms[atom]!.element} (atom ${atom})`).join(', ');
      yield {
        range,
        message: `No rule covers ${atoms} of ${ingredient.name}; it takes no part in the balance.`,
      };
    }
  },
});
