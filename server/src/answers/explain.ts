/**
 * The page of a check in Markdown, made from what the check says about itself.
 *
 * Knows: checks.  Must not know: findings, how the page is shown.
 */
import type { CheckPages, Family } from '../checks/define.ts';
import { CHECKS } from '../checks/registry.generated.ts';

const FAMILIES: readonly Family[] = [
  'text',
  'direction',
  'solvent',
  'reagents',
  'conversion',
  'cautions',
  'data',
  'program',
];
const RULE =
  'Lyate supports a decision; local safety rules and the judgement of a qualified chemist come first.';

/** The page of one check; null where there is none of that name. */
export function explanation(name: string): string | null {
  const check = CHECKS.find((candidate) => candidate.name === name);
  return check === undefined ? null : page(check);
}

/** One line for each check, by family. */
export function overview(): string {
  const parts = FAMILIES.flatMap((family) => {
    const members = CHECKS.filter((check) => check.family === family);
    if (members.length === 0) return [];
    const width = Math.max(...members.map(({ name }) => name.length));
    return [
      `${family}\n${members.map(({ name, summary }) => `  ${name.padEnd(width)}  ${summary}\n`).join('')}`,
    ];
  });
  return parts.join('\n');
}

function page(check: CheckPages): string {
  const { name, family, severity, summary, why, remedy, silentWhen, sources, wrong, right, quiet } = check;
  const example = (title: string, plan: string | undefined) =>
    plan === undefined ? [] : [`## ${title}`, '', '```lyate', plan.trimEnd(), '```', ''];
  return [
    `# ${name}`,
    '',
    `${summary} Family ${family}, ${quiet ? 'off unless turned on' : severity}.`,
    '',
    '## Why it matters',
    '',
    why,
    '',
    '## What to do',
    '',
    remedy,
    '',
    '## When it stays silent',
    '',
    silentWhen,
    '',
    ...example('Raises it', wrong),
    ...example('Does not', right),
    ...(sources.length === 0 ? [] : ['## Sources', '', ...sources.map((source) => `- ${source}`), '']),
    RULE,
    '',
  ].join('\n');
}
