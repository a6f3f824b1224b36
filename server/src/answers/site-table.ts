/**
 * The sites of a substance with the constants they have in a flask of the plan.
 *
 * Knows: analysed plans.  Must not know: how it is shown elsewhere; the table is Markdown.
 * Units: pKa on the scale named beside it.
 */

import type { StepFacts } from '../checks/facts.ts';
import type { CoupleState } from '../flask/state.ts';
import { oneDecimal, percent } from './figures.ts';
import { cell } from './markdown-text.ts';
import type { Analysed } from './types.ts';

export interface SitesInFlask {
  readonly step: string;
  readonly couples: readonly CoupleState[];
}

/** pKa further out than these say nothing to a chemist. */
const LOWEST = -15;
const HIGHEST = 60;
const MOST_ROWS = 12;

/** The sites of a substance in the last flask of a step that holds it; null where none does. */
export function sitesOf(facts: StepFacts, name: string): SitesInFlask | null {
  for (const moment of [...facts.moments].reverse()) {
    const ids = new Set(moment.contents.ingredients.filter((each) => each.name === name).map(({ id }) => id));
    if (ids.size === 0) continue;
    const couples = moment
      .state()
      .couples.filter(
        ({ ingredient, constant }) =>
          ids.has(ingredient) && LOWEST <= constant.value && constant.value <= HIGHEST,
      );
    return couples.length === 0 ? null : { step: facts.step.label, couples };
  }
  return null;
}

/** The same for a compound wherever it is first charged. */
export function sitesOfCompound({ steps }: Analysed, name: string): SitesInFlask | null {
  for (const { facts } of steps) {
    if (!facts.additions.some(({ substance }) => substance?.compound?.name === name)) continue;
    const found = sitesOf(facts, name);
    if (found !== null) return found;
  }
  return null;
}

/** A Markdown table, most acidic first. */
export function siteTable({ step, couples }: SitesInFlask): string {
  const rows = [...couples].sort((a, b) => a.constant.value - b.constant.value);
  const lines = rows.slice(0, MOST_ROWS).map(({ couple, constant, protonated }) => {
    const value = `${oneDecimal(constant.value)} ± ${oneDecimal(constant.sd)}`;
    const source = constant.sources.join(', ');
    return `| ${cell(couple.element)}${couple.atom + 1} | ${cell(couple.groupName)} | ${value} | ${cell(constant.scale)} | ${constant.origin}${source === '' ? '' : `, ${cell(source)}`} | ${percent(protonated)} |`;
  });
  const more = rows.length - lines.length;
  return [
    `In step ${cell(step)}:`,
    '',
    '| atom | group | pKa | scale | origin | protonated |',
    '| --- | --- | --- | --- | --- | --- |',
    ...lines,
    ...(more < 1 ? [] : ['', `and ${more} more`]),
  ].join('\n');
}
