/**
 * Finds the measured constants of a molecule's couples.
 *
 * Knows: couples, rows of `measured`.  Must not know: estimates, flasks, plans.
 * Invariants: what is found does not depend on how the molecule is written or charged.   (tests/chemistry/measured.test.ts)
 * A row fits a couple when the neutral molecules have one key, the sites one symmetry class, and both are acid or both base.
 */
import type { MeasuredRow } from '../tables/rows.ts';
import type { Constant, Perceived } from './couple.ts';
import type { MeasuredConstant } from './couple-constants.ts';

export interface MeasuredTables {
  readonly measuredByKey: ReadonlyMap<string, readonly MeasuredRow[]>;
}

/** All measured constants of a molecule, on every scale, with the index of their couple. */
export function measuredConstants(
  { components, couples }: Perceived,
  { measuredByKey }: MeasuredTables,
): readonly MeasuredConstant[] {
  return components.flatMap(({ index, key, spectator }) => {
    if (spectator || key === undefined) return [];
    return (measuredByKey.get(key) ?? []).flatMap((row) => {
      // Equivalent atoms make one couple, unless the drawing has taken the proton from some of them only.
      const found = couples.flatMap(({ component, kind, symmetry }, couple) => {
        const fits = component === index && kind === row.direction && row.classes.includes(symmetry ?? -1);
        return fits ? [{ couple, step: row.step, constant: constantOf(row) }] : [];
      });
      return found;
    });
  });
}

function constantOf({ name, value, sd, scale, sources, note, temperature }: MeasuredRow): Constant {
  const at = temperature === null || temperature === 25 ? '' : ` at ${temperature} °C`;
  const remark = note === '' ? '' : `, ${note}`;
  const what = `measured for ${name} in ${scale}${at}${remark}`;
  return { value, sd, scale, origin: 'measured', sources, hops: [{ what, value, sd, sources }] };
}
