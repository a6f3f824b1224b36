/**
 * What becomes of each reagent and of the solvent by proton transfer, and which sites go first.
 *
 * Knows: solved flasks, ledgers, roles.  Must not know: findings, text.
 * Units: mol; shares 0 … 1.
 * Invariants: shares lost add up to no more than one; a reagent never eats itself.   (tests/flask/fates.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Couple } from '../chemistry/couple.ts';
import type { Tables } from '../tables/tables.ts';
import type { Participation } from './flask-acid.ts';
import { rateOf } from './kinetics.ts';
import { ledgerOf, type Transfer } from './ledger.ts';
import { normalBelow } from './numbers.ts';
import { chargedShare, type Solved, solveContents } from './solve.ts';
import type { ConstantsIn, Contents, Ingredient, Medium, Site, Verdict } from './state.ts';
import { differenceSd } from './uncertainty.ts';

/** What one ingredient loses of itself to another by taking (giving) protons. */
export interface ReagentFate {
  readonly ingredient: number;
  /** base: it took protons; acid: it gave them. */
  readonly as: 'base' | 'acid';
  readonly own: Site;
  readonly other: Site;
  readonly mol: number;
  /** Share of what this ingredient could take (give) as charged. */
  readonly share: number;
  /** By a solvent, the one that governs or another of the mixture. */
  readonly bySolvent: boolean;
  /** A reversible exchange with the solvent, whose own ion then acts; never true of hydrides, amides, organometallics. */
  readonly isLevelled: boolean;
  /** P(the transfer goes the other way), from the sds of both constants. */
  readonly doubt: number;
}

export interface SolventFate {
  readonly medium: Medium;
  /** mol/L of the solvent's own ions. */
  readonly lyate: number;
  readonly lyonium: number;
  /** Transfers in which the solvent gave (lost) or took protons. */
  readonly loses: readonly Transfer[];
  readonly takes: readonly Transfer[];
}

/** Another site of the flask beside the one that is meant. */
export interface OtherSite {
  readonly site: Site;
  /** mol of its protons as charged. */
  readonly amount: number;
  /** pKa of the other − pKa of the meant site, signed so that a negative one goes first. */
  readonly difference: number;
  readonly sd: number;
  /** P(this one goes first). */
  readonly probability: number;
  /** Share of it that has moved in the solved flask. */
  readonly moved: number;
  readonly sameMolecule: boolean;
}

/** Roles that never come back once a proton has been taken. */
const FOR_GOOD = new Set([
  'metal-hydride',
  'metal-amide',
  'organometallic',
  'aluminium-hydride',
  'borohydride',
]);
/** Less than this share of a reagent lost is nobody's business. */
const LEAST_LOST = 5e-3;

/** What every reagent and compound of the flask loses by proton transfer, the largest share first. */
export function reagentFates(
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
  participation: Participation = {},
): ReagentFate[] {
  const solved = solveContents(contents, tables, constantsIn, participation);
  return fatesOf(solved);
}

/** The same from a flask that has been solved already. */
export function fatesOf(solved: Solved): ReagentFate[] {
  const byId = new Map(solved.contents.ingredients.map((one) => [one.id, one]));
  const fates: ReagentFate[] = [];
  for (const transfer of ledgerOf(solved)) {
    if (transfer.isIdentity) continue;
    const sd = differenceSd(transfer.from, transfer.to, solved.medium.scaleSd);
    const doubt = normalBelow(-transfer.gap / Math.max(sd, Number.MIN_VALUE));
    const add = (as: 'base' | 'acid') => {
      const [own, other] = as === 'base' ? [transfer.to, transfer.from] : [transfer.from, transfer.to];
      const isSolvent = byId.get(own.ingredient)?.role === 'solvent';
      const bySolvent = byId.get(other.ingredient)?.role === 'solvent';
      if (isSolvent) return;
      const whole = ableAsCharged(solved, own, as);
      const share = whole === 0 ? 0 : transfer.mol / whole;
      if (share < LEAST_LOST) return;
      const isLevelled = bySolvent && !isForGood(byId.get(own.ingredient));
      fates.push({
        ingredient: own.ingredient,
        as,
        own,
        other,
        mol: transfer.mol,
        share,
        bySolvent,
        isLevelled,
        doubt,
      });
    };
    add('base');
    add('acid');
  }
  return fates.sort((a, b) => b.share - a.share || a.ingredient - b.ingredient);
}

/**
 * What the solvent does to hydrides, metal amides and organometallics before they find anything else.
 *
 * The solvent is there in great excess and meets them first; where the proton ends up in the end is another question.
 */
export function lostToSolvent(
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): ReagentFate[] {
  const alone = contents.ingredients.filter((one) => one.role === 'solvent' || isForGood(one));
  return reagentFates({ ...contents, ingredients: alone }, tables, constantsIn).filter(
    ({ as, bySolvent }) => as === 'base' && bySolvent,
  );
}

/** What becomes of the solvent itself. */
export function solventFate(
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
  participation: Participation = {},
): SolventFate {
  const solved = solveContents(contents, tables, constantsIn, participation);
  const transfers = ledgerOf(solved).filter(({ isIdentity }) => !isIdentity);
  const place = solved.system.acids.findIndex(({ isSolvent }) => isSolvent);
  const ion = (kind: Couple['kind']) => {
    const acid = solved.system.acids[place];
    const step = acid?.steps.findIndex(({ couple }) => couple.kind === kind) ?? -1;
    if (acid === undefined || step === -1) return 0;
    const held = solved.shares[place]![step]!;
    return (acid.amount * (kind === 'acid' ? 1 - held : held)) / solved.medium.volume;
  };
  return {
    medium: solved.medium,
    lyate: ion('acid'),
    lyonium: ion('base'),
    loses: transfers.filter(({ fromSolvent, toSolvent }) => fromSolvent && !toSolvent),
    takes: transfers.filter(({ fromSolvent, toSolvent }) => toSolvent && !fromSolvent),
  };
}

/**
 * The other sites of the flask in the order in which they give (take) a proton, those before the judged one first.
 *
 * Left out: the solvent, dead sites, sites that do not hold (lack) a proton as charged.
 */
export function siteOrder(
  contents: Contents,
  verdict: Verdict,
  direction: 'deprotonate' | 'protonate',
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): OtherSite[] {
  const loses = direction === 'deprotonate';
  const { site } = verdict;
  const participation = { intended: [{ ingredient: site.ingredient, couple: site.couple }] };
  const solved = solveContents(contents, tables, constantsIn, participation);
  const others: OtherSite[] = [];
  solved.system.acids.forEach((acid, place) => {
    if (acid.isSolvent) return;
    acid.steps.forEach(({ couple, constant }, step) => {
      const charged = chargedShare(acid, step);
      if (loses ? charged <= 0 : 1 <= charged) return;
      if (acid.ingredient === site.ingredient && isOneSite(couple, site.couple)) return;
      if (loses && rateOf(couple, 'leaves', contents, tables) !== 'instant') return;
      const gap = constant.value - site.constant.value;
      const difference = loses ? gap : -gap;
      const other: Site = { ingredient: acid.ingredient, couple, constant };
      const sd = differenceSd(other, site, solved.medium.scaleSd);
      const held = solved.shares[place]![step]!;
      others.push({
        site: other,
        amount: acid.amount * (loses ? charged : 1 - charged),
        difference,
        sd,
        probability: normalBelow(-difference / Math.max(sd, Number.MIN_VALUE)),
        moved: Math.abs(charged - held),
        sameMolecule: acid.ingredient === site.ingredient,
      });
    });
  });
  return others.sort((a, b) => a.difference - b.difference);
}

/** The sites that go before the judged one with at least this probability. */
export function firstSites(order: readonly OtherSite[], probability = 0.5): OtherSite[] {
  return order.filter((other) => probability <= other.probability);
}

function isOneSite(a: Couple, b: Couple): boolean {
  return a.kind === b.kind && (a.atom === b.atom || a.equivalents.includes(b.atom));
}

function isForGood(one: Ingredient | undefined): boolean {
  return one?.reagent?.roles.some((role) => FOR_GOOD.has(role)) ?? false;
}

/** mol of protons that the couple's ingredient could take (give) as charged at all steps of this kind. */
function ableAsCharged({ system }: Solved, { ingredient, couple }: Site, as: 'base' | 'acid'): number {
  let mol = 0;
  for (const acid of system.acids) {
    if (acid.ingredient !== ingredient) continue;
    acid.steps.forEach((step, place) => {
      if (!isOneSite(step.couple, couple)) return;
      const charged = chargedShare(acid, place);
      mol += acid.amount * (as === 'base' ? 1 - charged : charged);
    });
  }
  return mol;
}
