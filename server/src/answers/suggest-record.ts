/**
 * Suggestions as plain data for other programs.
 *
 * Knows: suggestions.  Must not know: how they are shown.
 * Units: K, units of pKa, shares 0 … 1; lines from 0, UTF-16.
 */
import type { Refusal, Suggestion, Suggestions } from './suggest.ts';
import { reasonWords } from './suggest-text.ts';

/** One transfer with its suggestions and refusals. */
export function suggestionsRecord({
  line,
  direction,
  compound,
  site,
  asWritten,
  list,
  refusals,
  namesOf,
}: Suggestions) {
  const { couple, constant } = site;
  const { verdict } = asWritten;
  return {
    line,
    direction,
    compound,
    site: {
      atom: couple.atom,
      group: couple.group,
      pKa: constant.value,
      sd: constant.sd,
      scale: constant.scale,
    },
    asWritten: { acting: asWritten.acting, solvents: asWritten.solvents, ...verdictRecord(verdict) },
    suggestions: list.map(suggestionRecord),
    refusals: refusals.map((one) => refusalRecord(one, namesOf)),
  };
}

function verdictRecord({
  answer,
  logK,
  sd,
  extent,
  margin,
  probability,
  scale,
}: Suggestion['option']['verdict']) {
  return { answer, logK, sd, extent, margin, probability, scale };
}

function suggestionRecord({ option, alsoIn, cautions, title, edits }: Suggestion) {
  const { reagent, solvent, equiv, temperature, usual, verdict, next, ahead, limit, halfLife, notes, cost } =
    option;
  const sites = (list: typeof ahead) =>
    list.map(({ site, difference, sd }) => ({
      group: site.couple.group,
      pKa: site.constant.value,
      difference,
      sd,
    }));
  return {
    title,
    reagent: reagent.name,
    solvent: solvent?.name ?? null,
    equiv,
    temperature,
    usual,
    ...verdictRecord(verdict),
    allowances: verdict.allowances,
    ahead: sites(ahead),
    next: next === null ? null : sites([next])[0]!,
    limit: limit === null ? null : limit.what,
    halfLifeHours: halfLife,
    notes,
    cautions,
    alsoIn,
    cost,
    edits,
  };
}

function refusalRecord({ reagent, solvent, reason }: Refusal, names: ReadonlyMap<number, string>) {
  return {
    reagent: reagent?.name ?? null,
    solvent: solvent?.name ?? null,
    reason: reason.kind,
    words: reasonWords(reason, names),
  };
}

/** Every refused pair, one entry for each reagent and reason with the solvents it holds in. */
export function pairsRecord({ pairs, namesOf }: Suggestions) {
  const grouped = new Map<
    string,
    { reagent: string | null; reason: string; words: string; solvents: string[] }
  >();
  for (const { reagent, solvent, reason } of pairs) {
    const words = reasonWords(reason, namesOf);
    const key = `${reagent?.name ?? ''}\0${reason.kind}\0${words}`;
    const before = grouped.get(key);
    const solvents = solvent === null ? [] : [solvent.name];
    if (before === undefined)
      grouped.set(key, { reagent: reagent?.name ?? null, reason: reason.kind, words, solvents });
    else before.solvents.push(...solvents);
  }
  return [...grouped.values()];
}
