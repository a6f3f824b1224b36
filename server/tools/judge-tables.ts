/**
 * Holds what the program itself says of one-site molecules against measured values: estimates alone, and with its tables.
 *
 * Must not know: how constants are made.
 */
import { constantsIn } from '../src/chemistry/constants.ts';
import type { Constant, Couple } from '../src/chemistry/couple.ts';
import { neutralForm } from '../src/chemistry/neutral.ts';
import { perceive } from '../src/chemistry/perceive.ts';
import type { ScaleId } from '../src/tables/rows.ts';
import type { Tables } from '../src/tables/tables.ts';
import { siteScaffold } from './scaffold.ts';
import { siteFrame } from './site-frame.ts';

/** A measured value whose site is not marked. */
export interface Reference {
  readonly smiles: string;
  readonly kind: 'acid' | 'base';
  readonly pKa: number;
  readonly scale: ScaleId;
  readonly fits: (family: string) => boolean;
}

export interface Said {
  readonly value: number;
  readonly sd: number;
}

export interface Verdict<R extends Reference> {
  readonly reference: R;
  readonly group: string;
  readonly family: string;
  readonly frame: string;
  /** Rings of the molecule with the family of the site; its group where there are none. */
  readonly scaffold: string;
  readonly estimated: Said | null;
  readonly withTables: Said | null;
}

/** The outermost site of the reference's kind, among those of its class where there are any, as a user would read it. */
export function judge<R extends Reference>(reference: R, tables: Tables): Verdict<R> {
  const nothing = {
    reference,
    group: '',
    family: '',
    frame: '',
    scaffold: '',
    estimated: null,
    withTables: null,
  };
  const molecule = perceive(reference.smiles, tables);
  if (molecule.graph === null) return nothing;
  const estimates = constantsIn(molecule, reference.scale, tables, { estimateOnly: true }).couples;
  const ofKind = molecule.couples.flatMap((couple, index) => {
    const constant = estimates[index];
    return couple.kind === reference.kind && constant != null ? [{ couple, index, constant }] : [];
  });
  const fitting = ofKind.filter(({ couple }) => reference.fits(couple.family));
  const found = outermost(fitting.length === 0 ? ofKind : fitting, reference.kind);
  if (found === null) return nothing;
  const { graph } = neutralForm(molecule.graph);
  const { group, family } = found.couple;
  const known = constantsIn(molecule, reference.scale, tables).couples[found.index];
  return {
    reference,
    group,
    family,
    frame: siteFrame(graph, found.couple),
    scaffold: siteScaffold(reference.smiles, family) ?? group,
    estimated: found.constant,
    withTables: known ?? null,
  };
}

interface Candidate {
  readonly couple: Couple;
  readonly index: number;
  readonly constant: Constant;
}

function outermost(list: readonly Candidate[], kind: 'acid' | 'base'): Candidate | null {
  const sign = kind === 'base' ? 1 : -1;
  let best: Candidate | null = null;
  for (const one of list)
    if (best === null || sign * best.constant.value < sign * one.constant.value) best = one;
  return best;
}
