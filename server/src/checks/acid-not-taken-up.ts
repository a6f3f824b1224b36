/** The acid that a conversion or an ammonium salt brings is not taken up, and the amine waits as its salt. */
import { constantsIn } from '../chemistry/constants.ts';
import { perceive } from '../chemistry/perceive.ts';
import type { Contents, Ingredient } from '../flask/state.ts';
import { acidOfReagents, acidUptake } from '../flask/uptake.ts';
import type { Substance } from '../route/plan.ts';
import type { Tables } from '../tables/tables.ts';
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
  wrong: `compound amine = NCCCc1ccccc1
compound amide = O=C(NCCCc1ccccc1)c1ccccc1
step A
  solvent CH2Cl2 20 mL
  charge amine 5 mmol
  charge BzCl 1.0 equiv
  convert amine + BzCl to amide
`,
  right: `compound amine = NCCCc1ccccc1
compound amide = O=C(NCCCc1ccccc1)c1ccccc1
step A
  solvent CH2Cl2 20 mL
  charge amine 5 mmol
  base Et3N 1.2 equiv
  charge BzCl 1.0 equiv
  convert amine + BzCl to amide
`,
  *inStep({ conversions, tables }) {
    for (const { statement, before, conversion } of conversions) {
      const amine = statement.from.find(
        ({ substance }) =>
          substance.smiles !== null &&
          perceive(substance.smiles, tables).couples.some(
            ({ family, kind }) => kind === 'base' && family === 'ammonium',
          ),
      );
      const find = ({ name }: Substance) => before.ingredients.find((other) => other.name === name);
      const one = amine === undefined ? undefined : find(amine.substance);
      if (amine === undefined || one === undefined || statement.from.length < 2) continue;
      const extent = Math.min(
        ...statement.from.flatMap(({ substance, count }) => (find(substance)?.mol ?? Infinity) / count),
      );
      const released = Math.max(acidOfReagents(spent(before, extent)), conversion.acidReleased * extent);
      if (!(0 < released) || released + acidOfSalt(one) < uptakeOf(before, one)) continue;
      const { after } = halfWay(before, one, { released, used: amine.count * extent }, tables);
      if (after === null || after < MOST) continue;
      yield {
        range: amine.substance.range,
        message: `${Math.round(100 * after)} % of the ${one.name} that is left half way through is protonated: the acid set free is not taken up.`,
        figures: { protonated: after },
      };
    }
  },
});

/** Share of the nucleophile that may wait as its salt. */
const MOST = 0.5;

/** The contents with no more of each reagent than the conversion can use up; the rest releases nothing. */
function spent(contents: Contents, extent: number): Contents {
  return {
    ...contents,
    ingredients: contents.ingredients.map((one) => ({ ...one, mol: Math.min(one.mol, extent) })),
  };
}

/** How much of the nucleophile still there is protonated when half of the conversion is done. */
function halfWay(
  before: Contents,
  one: Ingredient,
  { released, used }: { readonly released: number; readonly used: number },
  tables: Tables,
) {
  const left = { ...one, mol: Math.max(one.mol - used / 2, one.mol / 2) };
  const contents = {
    ...before,
    ingredients: before.ingredients.map((other) => (other === one ? left : other)),
  };
  return acidUptake(contents, one.id, perceive('Cl', tables), released / 2, tables, constantsIn);
}

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
