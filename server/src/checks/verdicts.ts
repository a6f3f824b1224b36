/**
 * What the checks of direction share: the kind of failure of a transfer, its figures and its words.
 *
 * Knows: facts.  Must not know: findings of single checks.
 * Invariant: each judged transfer has exactly one kind, so one root cause gives one finding.
 */
import { constantsIn } from '../chemistry/constants.ts';
import { firstSites, siteOrder } from '../flask/fates.ts';
import type { Site, Verdict } from '../flask/state.ts';
import type { Range, TransferStatement } from '../route/plan.ts';
import type { Report } from './define.ts';
import type { StepFacts, TransferFact } from './facts.ts';
import type { Related, Severity } from './finding.ts';

export type Kind = 'fine' | 'uphill' | 'partial' | 'slow' | 'other-site' | 'short' | 'undecided';

export interface Judged {
  readonly fact: TransferFact;
  readonly verdict: Verdict;
  readonly kind: Kind;
  /** Where the finding points: the site as written, or the name. */
  readonly range: Range;
  /** The sites that go before, where `kind` is other-site. */
  readonly ahead: readonly Site[];
}

const FAILED = 0.1;
/** Reagents that never come back once a proton has been taken. */
const FOR_GOOD = new Set<string>(['metal-hydride', 'metal-amide', 'organometallic', 'aluminium-hydride']);
/** Solvents in which an acid is used as their own cation as a matter of course. */
const LEVELLING = new Set(['water', 'alcohol', 'acid']);
/** Sites of less than this share of the intended one take no base worth naming. */
const WORTH_NAMING = 0.05;
/** A base that covers this share of the sites covers them. */
const COVERED = 0.95;
/** Less than this share of an equivalent is meant as a catalyst where a conversion follows. */
const CATALYTIC = 0.35;

/** Every transfer of the step with the kind of its failure. */
export function judgedTransfers(facts: StepFacts): Judged[] {
  return facts.transfers.flatMap((fact) =>
    fact.verdicts.map((verdict, place) => {
      const { kind, ahead } = kindOf(facts, fact, verdict);
      return {
        fact,
        verdict,
        kind,
        ahead,
        range: fact.statement.sites[place]?.range ?? fact.statement.substance.range,
      };
    }),
  );
}

function kindOf(
  facts: StepFacts,
  fact: TransferFact,
  verdict: Verdict,
): { kind: Kind; ahead: readonly Site[] } {
  const none: readonly Site[] = [];
  if (verdict.allowances.includes('already')) return { kind: 'fine', ahead: none };
  if (isSpentOnSolvent(facts, verdict)) return { kind: 'fine', ahead: none };
  if (verdict.kinetics !== 'instant' && verdict.allowances.includes('slow'))
    return { kind: 'slow', ahead: none };
  // All that is left to act is the ion of an equal site: what was charged reaches no further.
  if (isTwin(verdict) && !isCatalytic(fact, verdict))
    return { kind: coveredBy(fact, verdict) < COVERED ? 'short' : 'fine', ahead: none };
  const spent = spentOn(fact, verdict);
  if (spent !== null) return { kind: 'other-site', ahead: [spent] };
  const ahead = sitesAhead(facts, fact, verdict);
  const needed = ahead.reduce((sum, { share }) => sum + share, 0);
  if (0 < verdict.logK && needed !== 0 && verdict.capacity < needed + COVERED && verdict.extent < COVERED) {
    return { kind: 'other-site', ahead: ahead.map(({ site }) => site) };
  }
  if (0 < verdict.logK && verdict.capacity < COVERED && !isCatalytic(fact, verdict))
    return { kind: 'short', ahead: none };
  if (verdict.answer === 'yes') return { kind: 'fine', ahead: none };
  if (verdict.answer === 'undecided') return { kind: 'undecided', ahead: none };
  if (needed !== 0 && 0 < verdict.logK) return { kind: 'other-site', ahead: ahead.map(({ site }) => site) };
  return { kind: verdict.extent < FAILED ? 'uphill' : 'partial', ahead: none };
}

/** A base that its solvent has eaten for good, or an acid that it levels, is the solvent's finding, not the transfer's. */
export function isSpentOnSolvent({ additions }: StepFacts, { partner, broughtBy, site }: Verdict): boolean {
  const find = (id: number | null | undefined) =>
    additions.find(({ ingredient }) => ingredient.id === id)?.ingredient;
  const solvent = find(partner?.ingredient);
  if (solvent?.role !== 'solvent' || solvent.solvent === null) return false;
  if (partner?.couple.kind === 'base' && !site.couple.holdsProton)
    return !LEVELLING.has(solvent.solvent.kind);
  return find(broughtBy)?.reagent?.roles.some((role) => FOR_GOOD.has(role)) ?? false;
}

/** The site of another compound that the base (acid) was spent on, where only that one's ion is left to act. */
function spentOn(
  { contents, statement }: TransferFact,
  { partner, extent, broughtBy }: Verdict,
): Site | null {
  if (partner === null || broughtBy !== null || 0.5 < extent) return null;
  const role = statement.keyword === 'deprotonate' ? 'base' : 'acid';
  const one = contents.ingredients.find(({ id }) => id === partner.ingredient);
  const hasOther = contents.ingredients.some(
    (other) => other.role === role && other.id !== partner.ingredient,
  );
  return one?.role === 'compound' && hasOther ? partner : null;
}

/** Whether what acts is an equal site of the same molecule. */
function isTwin({ partner, site }: Verdict): boolean {
  return (
    partner !== null &&
    partner.ingredient === site.ingredient &&
    partner.couple.kind === site.couple.kind &&
    partner.couple.equivalents.includes(site.couple.atom)
  );
}

function isCatalytic({ convert }: TransferFact, { capacity, allowances }: Verdict): boolean {
  return (convert !== null && capacity < CATALYTIC) || allowances.includes('steady-amount');
}

/** Sites that surely give (take) their proton first, with their amount for each mol of the intended one. */
function sitesAhead(facts: StepFacts, fact: TransferFact, verdict: Verdict): { site: Site; share: number }[] {
  if (verdict.partner === null) return [];
  const order = siteOrder(fact.contents, verdict, fact.statement.keyword, facts.tables, constantsIn);
  const amount = fact.ingredient?.mol ?? 0;
  return firstSites(order, facts.settings.thresholds.warning)
    .map((other) => ({ site: other.site, share: amount === 0 ? 0 : other.amount / amount }))
    .filter(({ share }) => WORTH_NAMING <= share);
}

/** The figures that every finding about a transfer carries. */
export function figuresOf({ logK, sd, extent }: Verdict): Record<string, number> {
  return { deltaPKa: logK, sd, logK, extent };
}

/** Error where failure is sure and complete, warning where it is likely. */
export function severityOf({ probability, extent }: Verdict, { settings }: StepFacts): Severity {
  const { error, warning } = settings.thresholds;
  if (error <= probability && extent < FAILED) return 'error';
  return warning <= probability ? 'warning' : 'information';
}

/** Base or acid that acts and the solvent, as related places. */
export function placesOf(facts: StepFacts, { verdict, fact }: Judged): Related[] {
  const places: Related[] = [];
  const add = (id: number | null | undefined, message: string) => {
    const addition = facts.additions.find(({ ingredient }) => ingredient.id === id);
    if (addition?.statement != null) places.push({ range: addition.range, message });
  };
  const { partner, site } = verdict;
  if (partner !== null)
    add(verdict.broughtBy ?? partner.ingredient, `${nameOf(facts, partner)}: pKa ${unit(partner)}`);
  add(site.ingredient, `${nameOf(facts, site)}: pKa ${unit(site)}`);
  const solvent = fact.contents.ingredients.find(({ role }) => role === 'solvent');
  add(solvent?.id, `solvent; acidities on the ${verdict.scale} scale`);
  return places;
}

/** "18.3 ± 0.4 in water" */
export function unit({ constant }: Site): string {
  return `${constant.value.toFixed(1)} ± ${constant.sd.toFixed(1)} on the ${constant.scale} scale`;
}

/** "C–H (aryl ketone) of K" */
export function nameOf({ additions }: StepFacts, { ingredient, couple }: Site): string {
  const owner =
    additions.find(({ ingredient: one }) => one.id === ingredient)?.ingredient.name ?? 'the solvent';
  return couple.kind === 'acid'
    ? `${couple.groupName} of ${owner}`
    : `${couple.groupName} (conjugate acid) of ${owner}`;
}

/** What acts: "NaOH (conjugate acid: water)" or "2,6-lutidine (conjugate acid: pyridine)". */
export function partnerName(facts: StepFacts, { partner, broughtBy }: Verdict): string {
  if (partner === null) return 'nothing in the flask';
  const owner = facts.additions.find(({ ingredient }) => ingredient.id === (broughtBy ?? partner.ingredient))
    ?.ingredient.name;
  return `${owner ?? 'the solvent'} (${partner.couple.kind === 'acid' ? 'conjugate acid' : 'site'}: ${partner.couple.groupName})`;
}

/** "0.05 %" with two figures, never 0 or 100 where it is neither. */
export function percent(share: number): string {
  const value = 100 * share;
  if (value < 0.001) return 'less than 0.001 %';
  if (value < 10) return `${Number(value.toPrecision(2))} %`;
  return 99.5 < value && value < 100 ? 'more than 99 %' : `${Math.round(value)} %`;
}

/** The finding for each transfer of one kind. */
export function reportKind(
  facts: StepFacts,
  kind: Kind,
  write: (judged: Judged) => Partial<Report> & { message: string },
): Report[] {
  return judgedTransfers(facts)
    .filter((judged) => judged.kind === kind)
    .map((judged) => ({
      range: judged.range,
      confidence: judged.verdict.probability,
      figures: figuresOf(judged.verdict),
      related: placesOf(facts, judged),
      ...write(judged),
    }));
}

/** A finding at the amount of the base (acid) for each transfer that it does not cover. */
export function* reportShort(facts: StepFacts, keyword: TransferStatement['keyword']): Iterable<Report> {
  const role = keyword === 'deprotonate' ? 'base' : 'acid';
  for (const { fact, verdict, kind } of judgedTransfers(facts)) {
    if (kind !== 'short' || fact.statement.keyword !== keyword) continue;
    const id = verdict.broughtBy ?? verdict.partner?.ingredient;
    // Half way, the compound's own ion may be all that is left to act; what was charged is what falls short.
    const acting = facts.additions.find(({ ingredient }) =>
      id === fact.ingredient?.id ? ingredient.role === role : ingredient.id === id,
    );
    const statement = acting?.statement;
    const capacity = coveredBy(fact, verdict);
    const amount = statement != null && 'amount' in statement ? statement.amount.range : null;
    yield {
      range: amount ?? acting?.range ?? fact.statement.range,
      message: `${capacity.toFixed(2)} equiv of ${role} for one equiv of the ${nameOf(facts, verdict.site)}: ${Math.round(100 * (1 - capacity))} % of it stays as it is.`,
      // What the transfer itself leaves open is not the amount's fault.
      confidence: 1 - verdict.probability,
      figures: { ...figuresOf(verdict), equivalents: capacity },
    };
  }
}

/** Equivalents of base (acid) for each site that the writer named; among equal sites by what was charged. */
function coveredBy({ contents, statement, ingredient }: TransferFact, verdict: Verdict): number {
  if (!isTwin(verdict) || ingredient === null) return verdict.capacity;
  const role = statement.keyword === 'deprotonate' ? 'base' : 'acid';
  const named = statement.sites.reduce((sum, { atoms }) => sum + atoms.length, 0);
  const sites = ingredient.mol * (named === 0 ? verdict.site.couple.equivalents.length : named);
  const able = contents.ingredients
    .filter((one) => one.role === role)
    .reduce((sum, { mol, reagent }) => sum + mol * (reagent?.protonCapacity ?? 1), 0);
  return able / sites;
}
