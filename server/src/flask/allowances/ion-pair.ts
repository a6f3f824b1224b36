/**
 * Ion pairs: between an O–H, N–H or S–H acid and a neutral amine in an aprotic solvent.
 *
 * The pair stays together, so the free ions of the solvent's own scale do not decide; the difference in water does, with
 * a doubt of at least 1.5 units (common practice; triethylamine takes phenols and carboxylic acids in dichloromethane).
 * Carbon acids stay on the solvent's scale, because their charge is spread out and pairs weakly.
 */
import type { Couple } from '../../chemistry/couple.ts';
import type { Medium } from '../state.ts';

export const LEAST_ION_PAIR_SD = 1.5;

const CARRIERS = new Set(['O', 'N', 'S']);
const AMINES = new Set([
  'ammonium',
  'anilinium',
  'pyridinium',
  'azolium',
  'amidinium',
  'imine',
  'phosphazenium',
]);

/** Whether an acid and a base of this medium are judged as a pair. */
export function formsIonPair(acid: Couple, base: Couple, medium: Medium): boolean {
  return (
    !medium.protic &&
    !medium.aqueous &&
    acid.kind === 'acid' &&
    CARRIERS.has(acid.element) &&
    base.kind === 'base' &&
    base.element === 'N' &&
    AMINES.has(base.family)
  );
}
