/**
 * Bases that act by what the trade knows of them rather than by a constant: solids from their surface, complex hydrides.
 *
 * Knows: rows of reagents and `hydrides`.  Must not know: other ingredients, text.
 * Units: mol; pKa on the medium's scale.
 * Basis: common practice; a solid base is held to reach its ceiling for sure and 3 units more perhaps.
 */
import type { Constant, Couple } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import type { FlaskAcid } from './flask-acid.ts';
import { isCalled } from './kinetics.ts';
import type { Ingredient, Medium } from './state.ts';

/** Below the ceiling failure is 20 % likely at most, 3 units above it 80 % at least: a normal line through both. */
const SURFACE_DOUBT = { above: 1.5, sd: 1.78 };

/** A solid base in an aprotic solvent: one couple at the practical ceiling of its surface. */
export function surfaceAcid(one: Ingredient, amount: number, medium: Medium): FlaskAcid[] {
  const couple = one.molecule!.couples.find(({ holdsProton }) => !holdsProton);
  if (couple === undefined) return [];
  const ceiling = one.reagent!.surfaceCeiling!;
  const value = ceiling + SURFACE_DOUBT.above;
  const { sd } = SURFACE_DOUBT;
  const what = `practical ceiling of solid ${one.reagent!.name} on the DMSO scale, ${ceiling}`;
  const { sources } = one.reagent!;
  const constant: Constant = {
    value,
    sd,
    scale: medium.scale,
    origin: 'estimated',
    sources,
    hops: [{ what, value, sd, sources }],
  };
  return [
    {
      ingredient: one.id,
      component: couple.component,
      steps: [{ couple, constant }],
      shifts: [0],
      amount: amount * (one.reagent!.protonCapacity ?? 1),
      protonsCharged: 0,
      fullCharge: 0,
      gas: null,
      isSolvent: false,
      isSolventIon: false,
    },
  ];
}

/** A reagent whose protons its structure does not show: a complex hydride. */
export function hydrideAcid(one: Ingredient, amount: number, medium: Medium, tables: Tables): FlaskAcid[] {
  const row = tables.hydrides.find(({ reagent }) => isCalled(one, reagent));
  if (row === undefined) return [];
  // In alcohols neutral acids lie some five units above water, near their values in DMSO.
  const limit = medium.aqueous ? row.water : row.dmso;
  if (limit === null) return [];
  const couple: Couple = {
    atom: 0,
    element: 'H',
    group: row.id,
    groupName: row.id.replaceAll('-', ' '),
    kind: 'base',
    family: 'hydride',
    holdsProton: false,
    equivalents: [0],
    component: 0,
  };
  const what = `acids that eat ${one.name} in practice, pKa up to ${limit}`;
  const constant: Constant = {
    value: limit,
    sd: row.sd,
    scale: medium.scale,
    origin: 'estimated',
    sources: row.sources,
    hops: [{ what, value: limit, sd: row.sd, sources: row.sources }],
  };
  return [
    {
      ingredient: one.id,
      component: 0,
      steps: [{ couple, constant }],
      shifts: [0],
      amount: amount * (one.reagent?.protonCapacity ?? row.capacity),
      protonsCharged: 0,
      fullCharge: 0,
      // Its limit says what eats it in practice, so the gas that leaves must not pull once more.
      gas: null,
      isSolvent: false,
      isSolventIon: false,
    },
  ];
}
