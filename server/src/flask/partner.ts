/**
 * Finds what takes (gives) the proton of a judged site: the acting base (acid), what it can do, and where it came from.
 *
 * Knows: solved flasks without the site.  Must not know: verdicts, text.
 * Units: mol.
 * Invariant: the acting base is the strongest that is there in an amount that matters.   (tests/flask/everyday.test.ts)
 */
import { ledgerOf } from './ledger.ts';
import type { Placed } from './placing.ts';
import { chargedShare } from './solve.ts';
import type { Site } from './state.ts';

/** Share of the site's amount from which a base counts as the one that acts. */
const ACTING_SHARE = 0.05;
/** The same for one that was charged as such; less forms by itself in any salt. */
const CATALYTIC_SHARE = 1e-3;
/** The same for the solvent's own ion: a weak base sets a few per cent of it free and still acts itself. */
const LEVELLED_SHARE = 0.3;
/** Bases this much weaker than the acting one do not count as capacity. */
const CAPACITY_SPAN = 4;
/** mol/L of a solvent's own ion that cannot come from its autoprotolysis. */
const LEVELLED_MOLAR = 1e-3;

/** A couple on the other side of the transfer, with what it can take (give). */
export interface Candidate {
  readonly site: Site;
  readonly able: number;
  /** mol that it could take (give) as charged. */
  readonly charged: number;
  readonly isSolvent: boolean;
}

/** Every other couple that can take (give) the proton, as it stands before the site takes part. */
export function candidatesIn({ rest }: Placed, loses: boolean): Candidate[] {
  const { system, shares } = rest;
  return system.acids.flatMap((acid, place) =>
    acid.steps.map(({ couple, constant }, step) => {
      const held = shares[place]![step]!;
      const charged = chargedShare(acid, step);
      return {
        site: { ingredient: acid.ingredient, couple, constant },
        able: acid.amount * (loses ? 1 - held : held),
        charged: acid.amount * (loses ? 1 - charged : charged),
        isSolvent: acid.isSolvent,
      };
    }),
  );
}

/** The strongest base (acid) that is there in an amount that matters; the strongest of all where none is. */
export function partnerOf(candidates: readonly Candidate[], amount: number, loses: boolean): Site | null {
  const byStrength = [...candidates].sort((a, b) =>
    loses ? b.site.constant.value - a.site.constant.value : a.site.constant.value - b.site.constant.value,
  );
  const strongerThan = (a: Site, b: Site) =>
    loses ? b.constant.value < a.constant.value : a.constant.value < b.constant.value;
  const solvent = byStrength.find(
    ({ isSolvent, site }) => isSolvent && site.couple.kind === (loses ? 'base' : 'acid'),
  );
  // The solvent itself takes (gives) a proton only where nothing stronger is dissolved in it.
  const dissolved = byStrength.filter(
    (one) => one !== solvent && (solvent === undefined || strongerThan(one.site, solvent.site)),
  );
  const acting =
    dissolved.find(
      ({ able, charged, isSolvent }) =>
        (isSolvent ? LEVELLED_SHARE : charged === 0 ? ACTING_SHARE : CATALYTIC_SHARE) * amount <= able,
    ) ??
    dissolved.find(({ able }) => CATALYTIC_SHARE * amount <= able) ??
    byStrength.find(({ able }) => ACTING_SHARE * amount <= able);
  if (acting !== undefined) return acting.site;
  const strength = ({ able, site }: Candidate) =>
    Math.log10(Math.max(able, Number.MIN_VALUE)) + (loses ? site.constant.value : -site.constant.value);
  const best = byStrength.reduce<Candidate | null>(
    (most, next) => (0 < next.able && (most === null || strength(most) < strength(next)) ? next : most),
    null,
  );
  return best?.site ?? null;
}

/** mol of proton that bases (acids) about as strong as the acting one can move. */
export function capacityOf(candidates: readonly Candidate[], partner: Site, loses: boolean): number {
  const limit = partner.constant.value + (loses ? -CAPACITY_SPAN : CAPACITY_SPAN);
  return candidates.reduce((sum, { site, able }) => {
    const counts = loses ? limit <= site.constant.value : site.constant.value <= limit;
    return counts ? sum + able : sum;
  }, 0);
}

/** The ingredient that turned the solvent into the ion that acts; null where the partner is no solvent. */
export function broughtBy({ rest }: Placed, partner: Site, loses: boolean): number | null {
  const solvent = rest.system.acids.find(({ isSolvent }) => isSolvent);
  if (solvent === undefined || solvent.ingredient !== partner.ingredient) return null;
  const makers = ledgerOf(rest).filter((one) =>
    loses ? one.fromSolvent && !one.toSolvent : one.toSolvent && !one.fromSolvent,
  );
  if (makers.length === 0) return null;
  const most = makers.reduce((best, one) => (best.mol < one.mol ? one : best));
  return (loses ? most.to : most.from).ingredient;
}

/** Whether the solvent took over what a stronger reagent brought: its own ion is what acts. */
export function isLevelled({ rest }: Placed, loses: boolean): boolean {
  const place = rest.system.acids.findIndex(({ isSolvent }) => isSolvent);
  if (place === -1) return false;
  const { steps, amount } = rest.system.acids[place]!;
  const own = steps.findIndex(({ couple }) => couple.kind === (loses ? 'acid' : 'base'));
  if (own === -1) return false;
  const held = rest.shares[place]![own]!;
  return LEVELLED_MOLAR * rest.medium.volume < amount * (loses ? 1 - held : held);
}
