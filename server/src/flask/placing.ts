/**
 * Puts the site that is to be judged into its flask: once taking part, once with its proton held fast.
 *
 * Knows: solved flasks.  Must not know: verdicts, text.
 * Invariant: both flasks hold the same amounts and the same protons.   (tests/flask/judge.test.ts)
 */
import type { Couple, ProtonStep } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import type { FlaskAcid, FlaskSystem } from './flask-acid.ts';
import { chargedShare, type Solved, solveContents, solveSystem } from './solve.ts';
import type { ConstantsIn, Contents, Ingredient } from './state.ts';

export type Direction = 'deprotonate' | 'protonate';

/** More of a proton's share than this counts as there. */
const HALF = 0.5;

/** A flask with the judged site in it and without it. */
export interface Placed {
  readonly contents: Contents;
  readonly one: Ingredient;
  readonly site: ProtonStep;
  readonly amount: number;
  /** Where the site's step stands in `full`. */
  readonly acid: number;
  readonly step: number;
  readonly full: Solved;
  /** The same flask with the site's proton held fast where it was charged. */
  readonly rest: Solved;
}

/** Places a couple of an ingredient; null where no constant reaches it. */
export function placeSite(
  contents: Contents,
  one: Ingredient,
  couple: Couple,
  direction: Direction,
  tables: Tables,
  constantsIn: ConstantsIn,
): Placed | null {
  const participation = { intended: [{ ingredient: one.id, couple }] };
  const first = solveContents(contents, tables, constantsIn, participation);
  const system = withSite(first, one, couple, direction, tables, constantsIn);
  if (system === null) return null;
  const full = system === first.system ? first : solveSystem(contents, first.medium, system);
  const acid = system.acids.findIndex(
    (candidate) => candidate.ingredient === one.id && stepOf(candidate, couple, direction) !== -1,
  );
  if (acid === -1) return null;
  const step = stepOf(system.acids[acid]!, couple, direction);
  const rest = solveSystem(contents, first.medium, withoutStep(system, acid, step));
  return {
    contents,
    one,
    site: system.acids[acid]!.steps[step]!,
    amount: system.acids[acid]!.amount,
    acid,
    step,
    full,
    rest,
  };
}

/**
 * The step of an acid that a couple stands for: among several the one that moves next.
 *
 * Equal groups of one component share their protons, so dihydrogen phosphate takes a proton at its most acidic step,
 * whichever oxygen the drawing left bare.
 */
function stepOf(acid: FlaskAcid, couple: Couple, direction: Direction): number {
  const own = acid.steps.flatMap((step, place) => (isSame(step.couple, couple) ? [place] : []));
  if (own.length === 0) return -1;
  const loses = direction === 'deprotonate';
  const isReady = (place: number) => HALF < chargedShare(acid, place) === loses;
  const kin = acid.steps.flatMap((step, place) => (isKin(step.couple, couple) ? [place] : []));
  const open =
    [own, kin].map((places) => places.filter(isReady)).find((places) => places.length !== 0) ?? own;
  return loses ? open[0]! : open.at(-1)!;
}

function isKin(a: Couple, b: Couple): boolean {
  return a.element !== 'C' && a.group === b.group && a.kind === b.kind && a.component === b.component;
}

function isSame(a: Couple, b: Couple): boolean {
  return (
    a.kind === b.kind && a.component === b.component && (a.atom === b.atom || a.equivalents.includes(b.atom))
  );
}

/** The system with a step for the couple; a couple that is no step of its own gets one with its own constant. */
function withSite(
  { system, medium }: Solved,
  { id, molecule, own, mol }: Ingredient,
  couple: Couple,
  direction: Direction,
  tables: Tables,
  constantsIn: ConstantsIn,
): FlaskSystem | null {
  if (system.acids.some((acid) => acid.ingredient === id && stepOf(acid, couple, direction) !== -1))
    return system;
  const constants = constantsIn(molecule!, medium.scale, tables, own ? { own } : {}).couples;
  const constant = constants[molecule!.couples.indexOf(couple)];
  if (constant == null) return null;
  const place = system.acids.findIndex(
    (acid) => acid.ingredient === id && acid.component === couple.component,
  );
  const held = couple.holdsProton ? 1 : 0;
  const before: FlaskAcid = system.acids[place] ?? {
    ingredient: id,
    component: couple.component,
    steps: [],
    shifts: [],
    amount: mol,
    protonsCharged: 0,
    fullCharge: molecule!.components[couple.component]?.charge ?? 0,
    gas: null,
    isSolvent: false,
    isSolventIon: false,
  };
  const at = before.steps.filter((step) => step.constant.value <= constant.value).length;
  const after: FlaskAcid = {
    ...before,
    steps: [...before.steps.slice(0, at), { couple, constant }, ...before.steps.slice(at)],
    shifts: [...before.shifts.slice(0, at), 0, ...before.shifts.slice(at)],
    protonsCharged: before.protonsCharged + held,
    fullCharge: before.fullCharge + 1 - held,
  };
  const acids = [...system.acids];
  if (place === -1) acids.push(after);
  else acids[place] = after;
  return { ...system, acids };
}

function withoutStep(system: FlaskSystem, acid: number, step: number): FlaskSystem {
  const before = system.acids[acid]!;
  const held = chargedShare(before, step);
  const drop = <T>(list: readonly T[]) => list.filter((_, place) => place !== step);
  const after: FlaskAcid = {
    ...before,
    steps: drop(before.steps),
    shifts: drop(before.shifts),
    protonsCharged: before.protonsCharged - held,
    fullCharge: before.fullCharge - 1 + held,
    gas: null,
  };
  return { ...system, acids: system.acids.map((one, place) => (place === acid ? after : one)) };
}
