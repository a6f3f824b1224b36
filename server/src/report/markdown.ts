/**
 * A review as Markdown, for a comment beside a change: what is open first, the rest folded away.
 *
 * Knows: reviews.  Must not know: plans, chemistry, files.
 * Invariant: nothing of a plan is read as Markdown or as a mention of somebody.   (tests/report/review.test.ts)
 */
import { oneDecimal, percent } from '../answers/figures.ts';
import { plain as asWritten, code } from '../answers/markdown-text.ts';
import { conditions } from './html.ts';
import { plainLine } from './plain.ts';
import type { Review, ReviewFinding, ReviewFlask, ReviewPlan, ReviewStep } from './review.ts';
import { countOpen } from './summary.ts';

const MOST_ROWS = 12;

/** The whole comment. */
export function markdownReview(review: Review): string {
  const counts = countOpen(review.all);
  const lines = [
    `### Lyate: ${counts.error} errors, ${counts.warning} warnings, ${counts.information + counts.hint} for information`,
    '',
    ...review.behind.flatMap(({ file, findings }) =>
      findings.map((finding) => item({ ...finding, page: null, excerpt: '' }, file)),
    ),
    ...review.plans.flatMap(planLines),
    ...(review.sources.length === 0
      ? []
      : folded(
          'Sources',
          review.sources.map(({ id, text }) => `- ${code(id)} ${escaped(plainLine(text))}`),
        )),
    `Lyate ${review.version}, tables ${review.tables}. It supports a decision; local safety rules and the judgement of a qualified chemist come first.`,
    '',
  ];
  return lines.join('\n');
}

function planLines({ file, title, outside, steps }: ReviewPlan): string[] {
  return [
    `#### ${escaped(plainLine(title ?? file))}`,
    '',
    ...outside.map((finding) => item(finding, file)),
    ...(outside.length === 0 ? [] : ['']),
    ...steps.flatMap((step) => stepLines(step, file)),
  ];
}

function stepLines(
  { label, title, findings, cautions, accepted, flasks, notes }: ReviewStep,
  file: string,
): string[] {
  const open = [...findings, ...cautions];
  return [
    `**Step ${escaped(plainLine(label))}**${title === null ? '' : ` ${escaped(plainLine(title))}`}: ${open.length === 0 ? 'nothing open' : `${open.length} open`}`,
    '',
    ...notes.map((note) => `> ${escaped(plainLine(note))}`),
    ...open.map((finding) => item(finding, file)),
    ...accepted.map(
      (finding) => `${item(finding, file)} Accepted: ${escaped(plainLine(finding.reason ?? ''))}`,
    ),
    ...(open.length + accepted.length === 0 ? [] : ['']),
    ...flasks.flatMap((flask) => folded(`Flask after line ${flask.picture.line + 1}`, flaskLines(flask))),
  ];
}

function item({ severity, check, message, range, confidence }: ReviewFinding, file: string): string {
  const sure = confidence < 1 ? `, ${percent(confidence)} sure` : '';
  return `- **${severity}** ${code(check)} (${escaped(plainLine(file))}, line ${range.start.line + 1}${sure}): ${escaped(plainLine(message))}`;
}

function flaskLines({ picture }: ReviewFlask): string[] {
  const rows = picture.rungs
    .slice(0, MOST_ROWS)
    .map(
      ({ substance, element, atom, group, pKa, sd, origin, protonated }) =>
        `| ${escaped(substance)} | ${escaped(`${element}${atom}, ${group}`)} | ${oneDecimal(pKa)} ± ${oneDecimal(sd)} | ${escaped(origin)} | ${percent(protonated)} |`,
    );
  const more = picture.rungs.length - rows.length;
  return [
    escaped(conditions(picture)),
    '',
    `| substance | site | pKa (${escaped(picture.scale)}) | origin | protonated |`,
    '| --- | --- | ---: | --- | ---: |',
    ...rows,
    ...(more < 1 ? [] : ['', `and ${more} more`]),
  ];
}

function folded(title: string, lines: readonly string[]): string[] {
  return [`<details><summary>${title}</summary>`, '', ...lines, '', '</details>', ''];
}

/** As written, and without calling anybody: hosts look for names after the sign even where it is escaped. */
function escaped(text: string): string {
  return asWritten(text).replaceAll('\\@', '@\u200b');
}
