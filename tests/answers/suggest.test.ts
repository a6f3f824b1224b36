/** Suggestions in their steps: the edited text reads as promised and raises no new error. */
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import type { Edit } from '../../server/src/answers/fix.ts';
import { suggestionsAt, suggestionsOf } from '../../server/src/answers/suggest.ts';
import { suggestedFixes } from '../../server/src/answers/suggest-fixes.ts';
import { pairsRecord, suggestionsRecord } from '../../server/src/answers/suggest-record.ts';
import { suggestionsText } from '../../server/src/answers/suggest-text.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);
const analyse = (text: string) => analyseNow(analyser, { file: 'plan.lyate', text, language: 'lyate' });

function edited(text: string, edits: readonly Edit[]): string {
  const starts = [0];
  for (const match of text.matchAll(/\n/g)) starts.push(match.index + 1);
  const at = ({ line, character }: { line: number; character: number }) =>
    (starts[line] ?? text.length) + character;
  return edits
    .map((edit, order) => ({ ...edit, order }))
    .sort((a, b) => at(b.range.start) - at(a.range.start) || b.order - a.order)
    .reduce(
      (now, { range, text: put }) => now.slice(0, at(range.start)) + put + now.slice(at(range.end)),
      text,
    );
}

const KETONE = `compound K = O=C([CH3:1])c1ccccc1

step A "Hydroxide against a ketone"
  solvent     water 30 mL
  charge      K 10 mmol
  base        NaOH 1.1 equiv
  deprotonate K at :1
`;

const errorsOf = (text: string) => analyse(text).findings.filter(({ severity }) => severity === 'error');

test('each suggestion, taken, mends the step', () => {
  const [one] = suggestionsOf(analyse(KETONE), 'A')!;
  expect(errorsOf(KETONE).map(({ check }) => check)).toEqual(['transfer-uphill']);
  expect(one!.list.length).toBeGreaterThan(5);
  // Each stands for one step worked, of which there are twenty at most.
  expect(one!.list.length).toBeLessThanOrEqual(20);
  for (const { title, edits, option } of one!.list) {
    const text = edited(KETONE, edits);
    expect(errorsOf(text), `${title}\n${text}`).toEqual([]);
    const [fact] = analyse(text).steps[0]!.facts.transfers;
    expect(fact!.verdicts[0]!.margin, title).toBeCloseTo(option.verdict.margin, 1);
  }
});

test('an edit replaces name, strength and solvent and keeps the rest of the line', () => {
  const text = `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent MeCN/toluene 1:1 20 mL // dry
  temperature -40 °C
  charge K 5 mmol
  base LDA 1.1 equiv 2.0 M in THF // fresh
  deprotonate K at :1
`;
  const lda = suggestionsOf(analyse(text), 'A')![0]!.list.find(({ title }) => title === 'LDA in THF')!;
  const after = edited(text, lda.edits);
  expect(after).toContain('  solvent THF 20 mL // dry\n');
  expect(after).toContain('  base LDA 1.1 equiv // fresh\n');
  expect(errorsOf(after)).toEqual([]);
});

test('a step without a base gets one on a line of its own', () => {
  const text = KETONE.replace('  base        NaOH 1.1 equiv\n', '').replace('water', 'THF');
  const [one] = suggestionsOf(analyse(text), 'A')!;
  expect(one!.asWritten.acting).toEqual([]);
  const after = edited(text, one!.list[0]!.edits);
  expect(after).toMatch(/\n {2}base \S+ 1\.1 equiv\n/);
  expect(errorsOf(after)).toEqual([]);
});

test('a compound of the plan with the name of a reagent does not take its place', () => {
  const text = `compound LiHMDS = CCO\n${KETONE}  charge LiHMDS 1 mmol\n`;
  const found = suggestionsOf(analyse(text), 'A')![0]!.list.find(
    ({ option }) => option.reagent.name === 'LiHMDS',
  )!;
  expect(found.edits.map((edit) => edit.text).join()).toContain('<');
});

test('acids are suggested for a protonation', () => {
  const text = `compound A = CCN(CC)CC
step A
  solvent water 20 mL
  charge A 5 mmol
  acid phenol 1.1 equiv
  protonate A
`;
  const [one] = suggestionsOf(analyse(text), 'A')!;
  expect(one!.direction).toBe('protonate');
  expect(one!.list.map(({ option }) => option.reagent.name)).toContain('acetic acid');
});

test('a line asks for its own transfer; outside a step there is none', () => {
  const text = `${KETONE}step B\n  solvent THF 20 mL\n  charge K 1 mmol\n  base LDA 1.1 equiv\n  deprotonate K at :1\n`;
  const analysed = analyse(text);
  expect(suggestionsAt(analysed, 6).map(({ step }) => step)).toEqual(['A']);
  expect(suggestionsAt(analysed, 11).map(({ line }) => line)).toEqual([11]);
  expect(suggestionsAt(analysed, 0)).toEqual([]);
  expect(suggestionsOf(analysed, 'Z')).toBeNull();
});

test('the text has a row for each and says why the others are not there', () => {
  const [one] = suggestionsOf(analyse(KETONE), 'A', 'all')!;
  const text = suggestionsText(one!);
  expect(text).toMatch(/as written: NaOH in water does not go/);
  expect(text).toMatch(/LDA +1\.10 +THF/);
  expect(text).toMatch(/attacks something else: n-BuLi \(carbonyl group of K\)/);
  expect(text).toMatch(/solvents never proposed: .*benzene \(a carcinogen/);
  expect(text).toMatch(/local rules/);
});

test('the record is plain data and names every pair once', () => {
  const [one] = suggestionsOf(analyse(KETONE), 'A')!;
  const record = suggestionsRecord(one!);
  expect(JSON.parse(JSON.stringify(record))).toEqual(record);
  expect(record.suggestions[0]).toMatchObject({ answer: 'yes', edits: expect.any(Array) });
  const pairs = pairsRecord(one!);
  const seen = pairs.flatMap(({ reagent, solvents }) => solvents.map((solvent) => `${reagent} ${solvent}`));
  expect(new Set(seen).size).toBe(seen.length);
});

test('findings about direction and solvent get the best few as fixes, none of them safe', () => {
  const analysed = analyse(KETONE);
  const [finding] = analysed.findings.filter(({ check }) => check === 'transfer-uphill');
  const fixes = suggestedFixes(analysed, finding!);
  expect(fixes).toHaveLength(3);
  for (const { edits, safe, title } of fixes) {
    expect(safe).toBe(false);
    expect(title).toMatch(/^Take .+ in .+, 1\.1 equiv$/);
    expect(errorsOf(edited(KETONE, edits)), title).toEqual([]);
  }
  expect(suggestedFixes(analysed, { ...finding!, check: 'unused-compound' })).toEqual([]);
});

test('asking again gives the same list, and lines above only move it', () => {
  const [before] = suggestionsOf(analyse(KETONE), 'A')!;
  const [after] = suggestionsOf(analyse(`// a remark\n\n${KETONE}`), 'A')!;
  expect(after!.line).toBe(before!.line + 2);
  expect(after!.list.map(({ title }) => title)).toEqual(before!.list.map(({ title }) => title));
  expect(after!.list[0]!.edits[0]!.range.start.line).toBe(before!.list[0]!.edits[0]!.range.start.line + 2);
});

test('edits in Markdown stand in the host document, and a step that goes on keeps the solvent of the one before', () => {
  const text = `# A route

\`\`\`lyate
compound K = O=C([CH3:1])c1ccccc1
step A
  solvent THF 20 mL
  temperature -78 °C
  charge K 5 mmol
\`\`\`

Some words.

\`\`\`lyate
step B continues A
  base Et3N 1.1 equiv
  deprotonate K at :1
\`\`\`
`;
  const read = (now: string) => analyseNow(analyser, { file: 'a.md', text: now, language: 'markdown' });
  const [one] = suggestionsOf(read(text), 'B')!;
  expect(one!.line).toBe(15);
  // The solvent stands in another step, so none but it is offered.
  expect(new Set(one!.list.map(({ option }) => option.solvent?.name))).toEqual(new Set(['THF']));
  const lda = one!.list.find(({ option }) => option.reagent.name === 'LDA')!;
  const after = edited(text, lda.edits);
  expect(after).toContain('\n  base LDA 1.1 equiv\n');
  expect(after).toContain('\n  solvent THF 20 mL\n');
  expect(read(after).findings.filter(({ severity }) => severity === 'error')).toEqual([]);
});

test('a catalytic amount stays catalytic, and what is written and works comes first', () => {
  const text = `compound M = CCOC(=O)[CH2:1]C(=O)OCC
compound E = C=CC(C)=O
compound P = CCOC(=O)C(CCC(C)=O)C(=O)OCC
step A
  solvent MeCN 20 mL
  charge M 10 mmol
  charge E 1.05 equiv
  base DBU 10 mol%
  deprotonate M at :1
  convert M + E to P
`;
  const [one] = suggestionsOf(analyse(text), 'A')!;
  expect(one!.asWritten.verdict.answer).toBe('yes');
  expect(one!.list[0]!.option).toMatchObject({ reagent: { name: 'DBU' }, solvent: { name: 'MeCN' } });
  expect(one!.list[0]!.option.equiv).toBeCloseTo(0.1, 6);
});

test('a step without any solvent is offered one on a line of its own', () => {
  const text = KETONE.replace('  solvent     water 30 mL\n', '');
  const lda = suggestionsOf(analyse(text), 'A')![0]!.list.find(({ title }) => title === 'LDA in THF')!;
  const after = edited(text, lda.edits);
  expect(after).toMatch(/\n {2}solvent THF\n/);
  expect(errorsOf(after)).toEqual([]);
});

test.each([
  ['an unknown solvent', KETONE.replace('water', 'moonshine')],
  ['a mixture with an unknown part', KETONE.replace('water', 'moonshine/THF 1:1')],
  ['an unreadable compound', KETONE.replace('O=C(', 'O=C((')],
  ['a base without structure', KETONE.replace('NaOH', 'silica')],
  ['no amount', KETONE.replace(' 10 mmol', '').replace(' 1.1 equiv', '')],
  ['amounts that cannot be', KETONE.replace('10 mmol', '-3 mmol').replace('30 mL', '0 mL')],
  ['a site that is not there', KETONE.replace('at :1', 'at :7')],
  ['a temperature near nothing', KETONE.replace('  charge', '  temperature -270 °C\n  charge')],
])('%s never stops it', (_, text) => {
  for (const { list, refusals } of suggestionsOf(analyse(text), 'A')!) {
    for (const { option } of list) expect(Number.isFinite(option.cost)).toBe(true);
    expect(list.length + refusals.length).toBeGreaterThan(0);
  }
});
