/**
 * Changes of the text that mend a finding, each labelled as safe or as one that needs thought.
 *
 * Knows: analysed plans, findings.  Must not know: the protocol.
 * Invariant: a safe change leaves the meaning of every other line as it is.   (tests/answers/fixes.test.ts)
 */
import type { Finding } from '../checks/finding.ts';
import { readSmiles } from '../chemistry/smiles.ts';
import { lineAt, type RouteDocument } from '../route/document.ts';
import { KEYWORDS } from '../route/parse.ts';
import type { Range } from '../route/plan.ts';
import { editDistance, nearestNames } from '../tables/names.ts';
import type { Fix } from './fix.ts';
import { inLine } from './ranges.ts';
import { written } from './rename.ts';
import { repairs } from './smiles-repair.ts';
import { suggestedFixes } from './suggest-fixes.ts';
import type { Analysed } from './types.ts';

/** Fixes for one finding, best first. */
export function fixesFor(analysed: Analysed, finding: Finding): Fix[] {
  if (finding.accepted) return [];
  const make = FIXES[finding.check];
  const own = make === undefined ? [] : make(analysed, finding);
  return [...own, ...suggestedFixes(analysed, finding), ...acceptance(analysed, finding)];
}

type Maker = (analysed: Analysed, finding: Finding) => Fix[];

const FIXES: Readonly<Record<string, Maker>> = {
  'unknown-name': nearestName,
  'unreadable-line': keywordSpelling,
  'unreadable-structure': structureRepair,
  'missing-amount': oneEquivalent,
  'base-short': enough,
  'acid-short': enough,
  'accept-without-effect': withoutLine('Take this line out', true),
  'unused-compound': withoutLine('Take the compound out', false),
};

const MOST_NAMES = 3;

function nearestName(analysed: Analysed, finding: Finding): Fix[] {
  const { plan, tables } = analysed;
  const wrong = textAt(analysed, finding.range);
  if (wrong === '') return [];
  const own = [...plan.compounds.map(({ name }) => name), ...plan.steps.map(({ label }) => label)].filter(
    (name) => editDistance(wrong.toLowerCase(), name.toLowerCase(), 1) <= 1 && 2 < name.length,
  );
  const names = [...new Set([...own, ...nearestNames(tables, wrong, MOST_NAMES)])].slice(0, MOST_NAMES);
  return names.map((name, index) => ({
    title: `Write ${name}`,
    finding,
    edits: [{ range: finding.range, text: own.includes(name) ? written(name) : name }],
    safe: false,
    preferred: index === 0 && names.length === 1,
  }));
}

/** A keyword in capitals or with a colon is written as the language has it; one that is misspelt is a guess. */
function keywordSpelling(analysed: Analysed, finding: Finding): Fix[] {
  const { line } = finding.range.start;
  const text = lineAt(analysed.plan.document, line)?.text ?? '';
  const start = text.length - text.trimStart().length;
  const word = /^\S+/.exec(text.slice(start))?.[0] ?? '';
  if (finding.range.start.character !== start || KEYWORDS.includes(word)) return [];
  const range = inLine(line, { start, end: start + word.length });
  const lower = word.toLowerCase().replace(/:$/, '');
  if (KEYWORDS.includes(lower)) {
    return [
      { title: `Write ${lower}`, finding, edits: [{ range, text: lower }], safe: true, preferred: true },
    ];
  }
  const limit = Math.min(2, Math.floor(lower.length / 3));
  const near = KEYWORDS.filter((keyword) => editDistance(lower, keyword, limit) <= limit).slice(
    0,
    MOST_NAMES,
  );
  return near.map((keyword) => ({
    title: `Write ${keyword}`,
    finding,
    edits: [{ range, text: keyword }],
    safe: false,
    preferred: near.length === 1,
  }));
}

function structureRepair(analysed: Analysed, finding: Finding): Fix[] {
  const { line, character } = finding.range.start;
  const tree = lineAt(analysed.plan.document, line);
  const leaf = tree?.leaves.find(
    ({ kind, start, end }) => kind === 'structure' && start <= character && character <= end,
  );
  if (tree == null || leaf === undefined) return [];
  const inner = tree.text[leaf.start] === '<' ? { start: leaf.start + 1, end: leaf.end - 1 } : leaf;
  const found = repairs(
    tree.text.slice(inner.start, inner.end),
    (text) => readSmiles(text).problem === undefined,
  );
  return found.map((text) => ({
    title: `Write ${text}`,
    finding,
    edits: [{ range: inLine(line, inner), text }],
    safe: false,
    preferred: found.length === 1,
  }));
}

function oneEquivalent(analysed: Analysed, finding: Finding): Fix[] {
  const { line } = finding.range.end;
  const tree = lineAt(analysed.plan.document, line);
  if (tree == null || tree.syntax === null || !('amounts' in tree.syntax)) return [];
  const at = inLine(line, { start: tree.span.end, end: tree.span.end });
  return [
    {
      title: 'Write 1 equiv',
      finding,
      edits: [{ range: at, text: ' 1 equiv' }],
      safe: false,
      preferred: false,
    },
  ];
}

/** Equivalents that a base or an acid that falls short is topped up to, with a margin. */
const MARGIN = 1.05;

/** As many equivalents as cover the sites, where the amount is written as equivalents. */
function enough(analysed: Analysed, finding: Finding): Fix[] {
  const covered = finding.figures.equivalents ?? null;
  const text = textAt(analysed, finding.range);
  const now = /^\d+(?:\.\d+)?(?= equiv)/.exec(text)?.[0];
  if (covered === null || covered <= 0 || now === undefined) return [];
  const wanted = String(Number(((Number(now) / covered) * MARGIN).toFixed(2)));
  const { start } = finding.range;
  const range = { start, end: { ...start, character: start.character + now.length } };
  return [
    {
      title: `Write ${wanted} equiv`,
      finding,
      edits: [{ range, text: wanted }],
      safe: false,
      preferred: true,
    },
  ];
}

function withoutLine(title: string, safe: boolean): Maker {
  return (_, finding) => {
    const { line } = finding.range.start;
    const range = { start: { line, character: 0 }, end: { line: line + 1, character: 0 } };
    return [{ title, finding, edits: [{ range, text: '' }], safe, preferred: safe }];
  };
}

/** Findings about the text itself are mended, not accepted. */
const NEVER_ACCEPTED: ReadonlySet<string> = new Set([
  'unreadable-line',
  'unreadable-structure',
  'impossible-valence',
  'unknown-name',
  'bad-use',
  'bad-unit',
  'accept-without-effect',
  'check-failed',
]);

/** A line that accepts the finding, with room for the reason. */
function acceptance({ plan }: Analysed, finding: Finding): Fix[] {
  if (NEVER_ACCEPTED.has(finding.check)) return [];
  const step = plan.steps.find(
    ({ firstLine, lineCount }) =>
      firstLine <= finding.range.start.line && finding.range.start.line < firstLine + lineCount,
  );
  const title = `Accept ${finding.check} in this ${step === undefined ? 'file' : 'step'}`;
  const statement = `accept ${finding.check} "reason"`;
  const edit =
    step === undefined
      ? { range: inLine(finding.range.start.line, { start: 0, end: 0 }), text: `${statement}\n` }
      : { range: endOfLine(plan.document, step.firstLine), text: `\n  ${statement}` };
  return [{ title, finding, edits: [edit], safe: false, preferred: false }];
}

function endOfLine(document: RouteDocument, line: number): Range {
  const end = lineAt(document, line)?.text.length ?? 0;
  return inLine(line, { start: end, end });
}

function textAt({ plan }: Analysed, { start, end }: Range): string {
  const tree = lineAt(plan.document, start.line);
  return tree === null || start.line !== end.line ? '' : tree.text.slice(start.character, end.character);
}
