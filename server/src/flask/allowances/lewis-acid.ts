/**
 * Lewis acids: together with an amine base they acidify what they bind, so that a transfer that looks uphill may go.
 *
 * Masamune and Roush run Horner–Wadsworth–Emmons reactions with lithium chloride and DBU, Sonogashira couplings take the
 * proton of an alkyne with copper(I) and an amine. How much a given metal gives is not tabulated: at most undecided.
 */
import type { Couple } from '../../chemistry/couple.ts';
import type { Contents, Ingredient } from '../state.ts';

const METALS = new Set(['Mg', 'Zn', 'Cu', 'Ag', 'Ti', 'Sn', 'Sc', 'Al', 'In', 'Yb', 'Fe', 'Ce', 'La']);
const HALIDES = new Set(['Cl', 'Br', 'I']);

/** Whether a Lewis acid and an amine work together in this flask. */
export function isHelpedByMetal(base: Couple, { ingredients }: Contents): boolean {
  return base.kind === 'base' && base.element === 'N' && ingredients.some(isLewisAcid);
}

function isLewisAcid({ role, reagent, molecule }: Ingredient): boolean {
  if (role === 'inert') return false;
  if (reagent?.roles.includes('lewis-acid')) return true;
  const atoms = molecule?.graph?.atoms ?? [];
  if (reagent?.roles.includes('organometallic') || reagent?.roles.includes('metal-amide')) return false;
  if (atoms.some(({ element }) => METALS.has(element))) return true;
  const isLithiumHalide = atoms.length === 2 && atoms.some(({ element }) => element === 'Li');
  return isLithiumHalide && atoms.some(({ element }) => HALIDES.has(element));
}
