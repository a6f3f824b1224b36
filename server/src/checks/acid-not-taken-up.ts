/** The acid that a conversion or an ammonium salt brings is not taken up, and the amine waits as its salt. */
import { constantsIn } from '../chemistry/constants.ts';
import { perceive } from '../chemistry/perceive.ts';
import { solveFlask } from '../flask/solve.ts';
import type { Contents, Ingredient } from '../flask/state.ts';
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'acid-not-taken-up',
  family: 'conversion',
  severity: 'warning',
  summary:
    'The acid that a conversion or an ammonium salt brings is not taken up, and the amine waits as its salt.',
  why: 'A protonated amine is no nucleophile; the conversion stops half way.',
  remedy: 'Charge at least one equivalent of base for each equivalent of acid set free and for each salt.',
  silentWhen:
    'Where less than half of the nitrogen nucleophile is protonated, and where other bases cover all the acid: the exchange between amines is fast.',
  sources: ['common-practice'],
  *inStep({ conversions, tables }) {
    for (const { statement, before, conversion } of conversions) {
      const released = before.ingredients.reduce(
        (sum, { reagent, mol, role }) => sum + (role === 'solvent' ? 0 : (reagent?.acidReleased ?? 0) * mol),
        0,
      );
      const amine = statement.from.find(
        ({ substance }) =>
          substance.smiles !== null &&
          perceive(substance.smiles, tables).couples.some(
            ({ family, kind }) => kind === 'base' && family === 'ammonium',
          ),
      );
      const one = before.ingredients.find(({ name }) => name === amine?.substance.name);
      if (amine === undefined || one === undefined || statement.from.length < 2) continue;
      const scale = Math.min(released, one.mol) / 2;
      const acid = {
        id: -2,
        name: 'acid set free',
        molecule: perceive('Cl', tables),
        mol: scale,
        volume: null,
        role: 'by-product' as const,
        reagent: null,
        solvent: null,
        assumed: false,
        qualifier: null,
      };
      const state = solveFlask(
        { ...before, ingredients: scale === 0 ? before.ingredients : [...before.ingredients, acid] },
        tables,
        constantsIn,
      );
      const couple = state.couples.find(
        ({ ingredient, couple }) =>
          ingredient === one.id && couple.kind === 'base' && couple.family === 'ammonium',
      );
      if (
        couple === undefined ||
        couple.protonated < 0.5 ||
        released + acidOfSalt(one) < uptakeOf(before, one) ||
        (conversion.acidReleased === 0 && released === 0)
      )
        continue;
      yield {
        range: amine.substance.range,
        message: `${Math.round(100 * couple.protonated)} % of ${one.name} is protonated half way through: the acid set free is not taken up.`,
        figures: { protonated: couple.protonated },
      };
    }
  },
});

/** mol of strong acid that a salt of the amine brings along. */
function acidOfSalt({ molecule, mol }: Ingredient): number {
  const held =
    molecule?.couples.filter(({ family, holdsProton }) => family === 'mineral-acid' && holdsProton) ?? [];
  return held.length * mol;
}

/** mol of acid that the bases of the flask take up beside the amine itself. */
function uptakeOf({ ingredients }: Contents, amine: Ingredient): number {
  return ingredients.reduce((sum, { id, reagent, mol, role }) => {
    const isBase =
      role !== 'solvent' && role !== 'inert' && (reagent?.roles.some((own) => BASES.has(own)) ?? false);
    return id !== amine.id && isBase ? sum + mol * (reagent?.protonCapacity ?? 1) : sum;
  }, 0);
}

/** Roles of reagents that take up an acid set free. */
const BASES: ReadonlySet<string> = new Set([
  'amine-base',
  'solid-base',
  'carbonate',
  'hydroxide',
  'alkoxide',
]);
