/**
 * Judges one proton transfer: does this site lose (take) its proton in this flask, how far, and how sure is that.
 *
 * The one place where direction is decided; every check reads its answer.
 * Knows: solved flasks, allowances.  Must not know: findings, text.
 * Units: mol; log K decimal; probability of an extent below half of what the amounts allow.
 * Invariants:
 *  1. A stronger base never lowers the extent.                              (tests/flask/judge.test.ts)
 *  2. Scaling all amounts and volumes leaves the verdict.                   (same)
 *  3. A wider sd of a constant never makes a verdict surer.                 (same)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Constant, Couple, Perceived, ProtonStep } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import { endSite, STEADY_FROM } from './allowances/intent.ts';
import { formsIonPair, LEAST_ION_PAIR_SD } from './allowances/ion-pair.ts';
import { isHelpedByMetal } from './allowances/lewis-acid.ts';
import { hasPhaseTransfer } from './allowances/phase-transfer.ts';
import { HIGHEST_PH, LOWEST_PH, solveBalance, stepShares } from './balance.ts';
import type { FlaskSystem } from './flask-acid.ts';
import { constantInWater } from './ion-pairing.ts';
import { rateOf } from './kinetics.ts';
import { isSolidBase } from './medium.ts';
import { normalBelow } from './numbers.ts';
import { broughtBy, candidatesIn, capacityOf, isLevelled, partnerOf } from './partner.ts';
import { type Direction, type Placed, placeSite } from './placing.ts';
import { heldInSalt } from './salts.ts';
import { mediumFor, stepsIn } from './scale-choice.ts';
import { chargedShare, type Solved } from './solve.ts';
import type { Allowance, ConstantsIn, Contents, Ingredient, Site, Verdict } from './state.ts';
import { differenceSd } from './uncertainty.ts';

export interface Intent {
  readonly ingredient: number;
  /** Indices into the molecule's couples, any of which will do; empty for whichever the flask takes. */
  readonly couples: readonly number[];
  readonly direction: Direction;
  /** A conversion after it uses up what forms. */
  readonly isConsumed?: boolean;
  /** What that conversion makes. */
  readonly product?: Perceived | null;
}

export interface VerdictThresholds {
  readonly error: number;
  readonly warning: number;
  readonly undecided: number;
}

const THRESHOLDS: VerdictThresholds = { error: 0.95, warning: 0.8, undecided: 0.2 };
const HALF = 0.5;
/** Where a metal or a phase-transfer catalyst helps, a failure is no surer than this. */
const MOST_DOUBT = 0.5;
/** Nothing in the flask takes the proton: as far uphill as the scale reaches. */
const NO_PARTNER = -40;

/**
 * The verdict on one intended transfer; null where the molecule has no such couple with a constant.
 *
 * @param thresholds from which probability of failure the answer is no, and undecided
 */
export function judgeTransfer(
  contents: Contents,
  intent: Intent,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
  thresholds: VerdictThresholds = THRESHOLDS,
): Verdict | null {
  const one = contents.ingredients.find(({ id }) => id === intent.ingredient);
  if (one?.molecule == null) return null;
  const meant = chooseCouple(one, intent, contents, tables, constantsIn);
  if (meant === null) return null;
  const placed = placeSite(contents, one, meant, intent.direction, tables, constantsIn);
  if (placed === null) return null;
  return weigh(placed, intent, tables, constantsIn, thresholds);
}

/** The answer that a probability of failure stands for. */
export function answerFor(
  probability: number,
  thresholds: VerdictThresholds = THRESHOLDS,
): Verdict['answer'] {
  if (thresholds.warning <= probability) return 'no';
  return thresholds.undecided <= probability ? 'undecided' : 'yes';
}

/** Among the couples that will do, the one that moves most easily. */
function chooseCouple(
  { molecule, own }: Ingredient,
  { couples, direction }: Intent,
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn,
): Couple | null {
  const medium = mediumFor(contents, tables, constantsIn);
  const steps = stepsIn(molecule!, own, medium, tables, constantsIn);
  const holds = heldCouples(molecule!, steps);
  const loses = direction === 'deprotonate';
  let best: { couple: Couple; value: number } | null = null;
  const candidates = couples.length === 0 ? molecule!.couples.map((_, place) => place) : couples;
  for (const place of candidates) {
    const couple = molecule!.couples[place];
    const constant = couple === undefined ? null : constantOf(couple, steps, loses);
    if (couple === undefined || constant === null) continue;
    // Unless a site is named, only one that can still move is meant.
    if (couples.length === 0 && holds(couple) !== loses) continue;
    const isEasier = best === null || (loses ? constant.value < best.value : best.value < constant.value);
    if (isEasier) best = { couple, value: constant.value };
  }
  return (best as { couple: Couple } | null)?.couple ?? null;
}

/** The step of a couple that moves first; null where none reaches it. */
function constantOf(
  couple: Couple,
  steps: readonly (readonly ProtonStep[])[],
  loses: boolean,
): Constant | null {
  const own = (steps[couple.component] ?? [])
    .filter((step) => step.couple.kind === couple.kind && step.couple.atom === couple.atom)
    .map(({ constant }) => constant)
    .sort((a, b) => a.value - b.value);
  return (loses ? own[0] : own.at(-1)) ?? null;
}

/** Which couples hold a proton once acids and bases of the same salt have met. */
function heldCouples(
  { components }: Perceived,
  steps: readonly (readonly ProtonStep[])[],
): (couple: Couple) => boolean {
  const drawn = components.map((_, place) => {
    const list = [...(steps[place] ?? [])].sort((a, b) => a.constant.value - b.constant.value);
    return { steps: list, held: list.filter(({ couple }) => couple.holdsProton).length };
  });
  // By value: a remembered answer may hold the couples of an earlier perception.
  const name = ({ kind, atom, holdsProton }: Couple) => `${kind} ${atom} ${holdsProton}`;
  const gained = new Set<string>();
  const lost = new Set<string>();
  for (const [place, now] of heldInSalt(drawn).entries()) {
    const { steps: list, held } = drawn[place]!;
    for (let protons = held; protons < now; protons++)
      gained.add(name(list[list.length - 1 - protons]!.couple));
    for (let protons = held; now < protons; protons--) lost.add(name(list[list.length - protons]!.couple));
  }
  return (couple) => gained.has(name(couple)) || (couple.holdsProton && !lost.has(name(couple)));
}

function weigh(
  placed: Placed,
  intent: Intent,
  tables: Tables,
  constantsIn: ConstantsIn,
  thresholds: VerdictThresholds,
): Verdict {
  const { contents, rest, one, amount } = placed;
  const { medium } = rest;
  const loses = intent.direction === 'deprotonate';
  const allowances: Allowance[] = [];
  const candidates = candidatesIn(placed, loses);
  const partner = partnerOf(candidates, amount, loses);
  const site: Site = { ingredient: one.id, ...pick(placed.site) };
  const rate = rateOf(site.couple, loses ? 'leaves' : 'arrives', contents, tables);
  const base = { site, scale: medium.scale, kinetics: rate };
  const charged = chargedShare(placed.full.system.acids[placed.acid]!, placed.step);
  if (loses ? charged < HALF : HALF < charged) allowances.push('already');
  if (partner === null) {
    const extent = extentOf(placed.full, placed, loses);
    const sd = differenceSd(site, site, medium.scaleSd);
    const sure = allowances.includes('already') ? 1 - extent : 1;
    return {
      ...base,
      answer: answerFor(sure, thresholds),
      logK: NO_PARTNER,
      sd,
      extent,
      margin: NO_PARTNER,
      probability: sure,
      partner,
      broughtBy: null,
      allowances,
      borrowed: false,
      capacity: 0,
      net: null,
    };
  }
  const pair = compare(site, partner, placed, loses, tables, constantsIn);
  allowances.push(...pair.allowances);
  const { shift } = pair;
  const extent = shift === 0 ? extentOf(placed.full, placed, loses) : extentShifted(placed, shift, loses);
  const capacity = capacityOf(candidates, partner, loses) / amount;
  if (capacity < 1 && !allowances.includes('already')) allowances.push('stoichiometric');
  const margin = marginOf(placed, shift, capacity, loses);
  const plain = normalBelow(-margin / pair.sd);
  if (medium.organic !== null) allowances.push('phases');
  if (rate !== 'instant' && loses) allowances.push('slow');
  if (isLevelled(placed, loses)) allowances.push('levelled');
  if (placed.full.left.some((left) => 0 < left)) allowances.push('gas');
  let probability = allowances.includes('already') ? Math.min(plain, 1 - extent) : plain;
  let answer = answerFor(probability, thresholds);
  if (loses && answer === 'no') {
    if (isHelpedByMetal(partner.couple, contents)) allowances.push('lewis-acid');
    if (medium.organic !== null && hasPhaseTransfer(contents)) allowances.push('phase-transfer');
    if (allowances.includes('lewis-acid') || allowances.includes('phase-transfer')) {
      probability = Math.min(probability, MOST_DOUBT);
      answer = 'undecided';
    }
  }
  const net = loses && answer !== 'yes' ? netOf(intent, partner, placed, tables, constantsIn) : null;
  if (net !== null) {
    allowances.push('net-reaction');
    answer = 'yes';
  } else if (loses && answer !== 'yes' && intent.isConsumed && STEADY_FROM <= pair.logK + pair.sd) {
    allowances.push('steady-amount');
    answer = 'yes';
  }
  const ownSd = differenceSd(site, partner, 0);
  const borrowed =
    0 < medium.scaleSd &&
    answerFor(normalBelow(-margin / Math.max(ownSd, 1e-9)), thresholds) !== answerFor(plain, thresholds);
  return {
    ...base,
    answer,
    logK: pair.logK,
    sd: pair.sd,
    extent,
    margin,
    probability,
    partner,
    broughtBy: broughtBy(placed, partner, loses),
    allowances,
    borrowed,
    capacity,
    net,
  };
}

function pick({ couple, constant }: ProtonStep): { couple: Couple; constant: Constant } {
  return { couple, constant };
}

/** log K of the pair and its sd, by the scale or, where the two form an ion pair, by their difference in water. */
function compare(
  site: Site,
  partner: Site,
  placed: Placed,
  loses: boolean,
  tables: Tables,
  constantsIn: ConstantsIn,
): { logK: number; sd: number; shift: number; allowances: Allowance[] } {
  const { contents, rest } = placed;
  const { medium } = rest;
  const allowances: Allowance[] = [];
  const [acid, base] = loses ? [site, partner] : [partner, site];
  const plain = base.constant.value - acid.constant.value;
  const sd = differenceSd(site, partner, medium.scaleSd);
  const other = contents.ingredients.find(({ id }) => id === partner.ingredient);
  if (other !== undefined && isSolidBase(other) && !medium.protic) allowances.push('surface');
  if (!formsIonPair(acid.couple, base.couple, medium)) return { logK: plain, sd, shift: 0, allowances };
  const inWater = (one: Site) => constantInWater(one, contents, tables, constantsIn);
  const [acidInWater, baseInWater] = [inWater(acid), inWater(base)];
  if (acidInWater === null || baseInWater === null) return { logK: plain, sd, shift: 0, allowances };
  const logK = baseInWater.value - acidInWater.value;
  if (logK < plain) return { logK: plain, sd, shift: 0, allowances };
  allowances.push('ion-pair');
  const pairSd = Math.hypot(acidInWater.sd, baseInWater.sd);
  // The flask may have paired this acid already.
  const done = -shiftOf(placed.full.system, acid);
  return { logK, sd: Math.max(LEAST_ION_PAIR_SD, pairSd), shift: logK - plain - done, allowances };
}

/** What a flask adds to the constant of a site. */
function shiftOf({ acids }: FlaskSystem, { ingredient, couple }: Site): number {
  for (const acid of acids) {
    const step = acid.ingredient === ingredient ? acid.steps.findIndex((one) => one.couple === couple) : -1;
    if (step !== -1) return acid.shifts[step]!;
  }
  return 0;
}

/** Share of the site that has moved at the answer of the whole flask. */
function extentOf({ shares }: Solved, { acid, step }: Placed, loses: boolean): number {
  const held = shares[acid]![step]!;
  return loses ? 1 - held : held;
}

/** The extent with the site's constant moved so that its log K with the partner grows by `shift`. */
function extentShifted(placed: Placed, shift: number, loses: boolean): number {
  const { full, acid, step } = placed;
  const acids = full.acids.map((one, place) => {
    if (place !== acid) return one;
    const pKa = one.pKa.map((value, at) => (at === step ? value + (loses ? -shift : shift) : value));
    return { ...one, pKa };
  });
  const { pH } = solveBalance(acids);
  const held = stepShares(acids[acid]!.pKa, pH)[step]!;
  return loses ? 1 - held : held;
}

/** How many units log K may lose until the extent falls to half of what the amounts allow; negative once it has. */
function marginOf(placed: Placed, shift: number, capacity: number, loses: boolean): number {
  const { rest, full, acid, step, amount } = placed;
  const target = HALF * Math.min(1, capacity);
  if (target <= 0) return NO_PARTNER;
  const charged = chargedShare(full.system.acids[acid]!, step);
  const moved = loses ? charged - (1 - target) : target - charged;
  const { pH } = solveBalance(rest.acids, (loses ? moved : -moved) * amount);
  if (pH <= LOWEST_PH + HALF || HIGHEST_PH - HALF <= pH) return pH < 0 === loses ? NO_PARTNER : -NO_PARTNER;
  const pKa = full.acids[acid]!.pKa[step]! + (loses ? -shift : shift);
  const odds = Math.log10(target / (1 - target));
  return loses ? pH - pKa - odds : pKa - pH - odds;
}

function netOf(
  { product, isConsumed }: Intent,
  partner: Site,
  { rest }: Placed,
  tables: Tables,
  constantsIn: ConstantsIn,
): Verdict['net'] {
  if (!isConsumed || product == null) return null;
  const { couples } = constantsIn(product, rest.medium.scale, tables);
  const end = endSite(product.couples, couples, partner.constant.value);
  if (end === null) return null;
  return { logK: partner.constant.value - end.constant.value, site: { ingredient: -1, ...end } };
}
