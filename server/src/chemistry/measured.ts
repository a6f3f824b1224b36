/**
 * Finds the measured constants of a molecule's couples.
 *
 * Knows: couples, rows of `measured`.  Must not know: estimates, flasks, plans.
 * Invariants: what is found does not depend on how the molecule is written or charged.   (tests/chemistry/measured.test.ts)
 * A row fits a couple when the neutral molecules have one key, the sites one name, and both are acid or both base.
 */
import type { MeasuredRow } from '../tables/rows.ts';
import type { Constant, Perceived } from './couple.ts';
import type { MeasuredConstant } from './couple-constants.ts';
import { neutralForm } from './neutral.ts';
import { siteNames } from './site-names.ts';

export interface MeasuredTables {
  readonly measuredByKey: ReadonlyMap<string, readonly MeasuredRow[]>;
}

/** All measured constants of a molecule, on every scale, with the index of their couple. */
export function measuredConstants(
  { graph, components, couples }: Perceived,
  { measuredByKey }: MeasuredTables,
): readonly MeasuredConstant[] {
  return components.flatMap(({ index, key, spectator, atoms }) => {
    const rows = spectator || key === undefined ? undefined : measuredByKey.get(key);
    if (rows === undefined || graph === null) return [];
    const names = siteNames(neutralForm(graph).graph, atoms);
    return rows.flatMap((row) =>
      // Equivalent atoms make one couple, unless the drawing has taken the proton from some of them only.
      couples.flatMap(({ component, kind, atom }, couple) => {
        const fits = component === index && kind === row.direction && row.classes.includes(names.get(atom)!);
        return fits ? [{ couple, step: row.step, constant: constantOf(row) }] : [];
      }),
    );
  });
}

function constantOf({ name, value, sd, scale, sources, note, temperature, house }: MeasuredRow): Constant {
  const at = temperature === null || temperature === 25 ? '' : ` at ${temperature} °C`;
  const remark = note === '' ? '' : `, ${note}`;
  const from = house ? ', from the house file' : '';
  const what = `measured for ${name} in ${scale}${at}${remark}${from}`;
  return {
    value,
    sd,
    scale,
    origin: house ? 'house' : 'measured',
    sources,
    hops: [{ what, value, sd, sources }],
  };
}
