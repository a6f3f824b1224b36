/**
 * Finds the measured constants of a molecule's couples.
 *
 * Knows: couples, rows of `measured`.  Must not know: estimates, flasks, plans.
 * Invariants: what is found does not depend on how the molecule is written or charged.   (tests/chemistry/measured.test.ts)
 * A row fits a couple when the neutral molecules have one key, the sites one symmetry class, and both are acid or both base.
 */
import type { MeasuredRow } from '../tables/rows.ts';
import type { Constant, Couple, Perceived } from './couple.ts';
import type { MeasuredConstant } from './couple-constants.ts';
import { neutralForm } from './neutral.ts';
import { canonicalKey, symmetryClasses } from './toolkit.ts';

export interface MeasuredTables {
  readonly measuredByKey: ReadonlyMap<string, readonly MeasuredRow[]>;
}

/** Answers by molecule; a molecule met again is not looked up again. */
const remembered = new WeakMap<MeasuredTables, WeakMap<Perceived, readonly MeasuredConstant[]>>();

/** All measured constants of a molecule, on every scale, with the index of their couple. */
export function measuredConstants(perceived: Perceived, tables: MeasuredTables): readonly MeasuredConstant[] {
  let known = remembered.get(tables);
  if (known === undefined) {
    known = new WeakMap();
    remembered.set(tables, known);
  }
  let found = known.get(perceived);
  if (found === undefined) {
    found = lookUp(perceived, tables);
    known.set(perceived, found);
  }
  return found;
}

function lookUp(perceived: Perceived, { measuredByKey }: MeasuredTables): MeasuredConstant[] {
  if (perceived.graph === null) return [];
  const { graph } = neutralForm(perceived.graph);
  const single = perceived.components.length === 1;
  return perceived.components.flatMap(({ index, atoms, spectator }) => {
    if (spectator) return [];
    const rows = measuredByKey.get((single ? perceived.key : canonicalKey(graph, atoms)) ?? '');
    if (rows === undefined) return [];
    const classes = symmetryClasses(graph, atoms);
    return rows.flatMap((row) =>
      perceived.couples.flatMap((couple, place) =>
        couple.component === index && isSite(row, couple, classes)
          ? [{ couple: place, step: row.step, constant: constantOf(row) }]
          : [],
      ),
    );
  });
}

function isSite(row: MeasuredRow, couple: Couple, classes: ReadonlyMap<number, number>): boolean {
  return couple.kind === row.direction && row.classes.includes(classes.get(couple.atom) ?? -1);
}

function constantOf({ value, sd, scale, sources, note }: MeasuredRow): Constant {
  const what = note === '' ? `measured in ${scale}` : `measured in ${scale}, ${note}`;
  return { value, sd, scale, origin: 'measured', sources, hops: [{ what, value, sd, sources }] };
}
