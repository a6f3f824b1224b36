/**
 * The forms of a molecule over pH: for each component the share of every state of protonation.
 *
 * Knows: stepwise constants.  Must not know: flasks, text.
 * Invariant: the shares of a component add up to one at every pH.   (tests/flask/shares.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { OwnValue, Perceived } from '../chemistry/couple.ts';
import type { ScaleId } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import { formShares } from './balance.ts';
import type { ConstantsIn } from './state.ts';

export interface Form {
  readonly component: number;
  /** Protons held of those that the steps count. */
  readonly protons: number;
  readonly charge: number;
  /** Parallel to the pH values asked for. */
  readonly shares: readonly number[];
}

/** All forms of a molecule at the given pH values; components without steps have one form. */
export function speciate(
  molecule: Perceived,
  scale: ScaleId,
  pHs: readonly number[],
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
  own: readonly OwnValue[] = [],
): Form[] {
  const { steps } = constantsIn(molecule, scale, tables, { own });
  return molecule.components.flatMap(({ index, charge }) => {
    const list = [...(steps[index] ?? [])].sort((a, b) => a.constant.value - b.constant.value);
    const pKa = list.map(({ constant }) => constant.value);
    const held = list.filter(({ couple }) => couple.holdsProton).length;
    const columns = pHs.map((pH) => formShares(pKa, pH));
    return Array.from(
      { length: pKa.length + 1 },
      (_, protons): Form => ({
        component: index,
        protons,
        charge: charge - held + protons,
        shares: columns.map((shares) => shares[protons]!),
      }),
    );
  });
}
