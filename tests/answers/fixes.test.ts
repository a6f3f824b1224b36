/** Fixes mend what they are offered for, and the safe ones touch nothing else. */
import { describe, expect, it } from 'vitest';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import type { Fix } from '../../server/src/answers/fix.ts';
import { fixesFor } from '../../server/src/answers/fixes.ts';
import { builtTables } from '../../server/src/host/tables.ts';

const analyser = createAnalyser(builtTables());
const read = (text: string) => analyseNow(analyser, { file: 'plan.lyate', text, language: 'lyate' });
const allFixes = (text: string): Fix[] => {
  const analysed = read(text);
  return analysed.findings.flatMap((finding) => fixesFor(analysed, finding));
};
function apply(text: string, { edits }: Fix): string {
  const document = TextDocument.create('file:///plan.lyate', 'lyate', 1, text);
  return TextDocument.applyEdits(
    document,
    edits.map(({ range, text: newText }) => ({ range, newText })),
  );
}
const checksOf = (text: string) =>
  read(text)
    .findings.filter(({ accepted }) => !accepted)
    .map(({ check }) => check);

const BROKEN = `compound ketone = CC(=O)c1ccccc1
compound spare = CC(=O
compound never = CCC

step A
  accept toxic-gas "there is none"
  SOLVENT THF 20 mL
  charge ketone 10 mmol
  base LDDA 1.05 equiv
  temprature -78 °C
  deprotonate ketone
step B
  solvent water 20 mL
  charge ketone 10 mmol
  base NaOH 1.1 equiv
  deprotonate ketone`;

const SHORT = `compound acid = O=C([OH:1])c1ccccc1
step A
  solvent water 20 mL
  charge acid 10 mmol
  base NaOH 0.5 equiv
  deprotonate acid at :1`;

describe('fixes', () => {
  it('top a short base up to what the sites take', () => {
    const fix = allFixes(SHORT).find(({ finding }) => finding.check === 'base-short');
    expect(fix?.title).toBe('Write 1.05 equiv');
    expect(checksOf(apply(SHORT, fix!))).not.toContain('base-short');
  });

  it('offer other bases and solvents for a transfer that does not go, none of them as safe', () => {
    const fixes = allFixes(BROKEN).filter(
      ({ finding, title }) => finding.check === 'transfer-uphill' && title.startsWith('Take'),
    );
    expect(fixes.length).toBeGreaterThan(0);
    expect(fixes.every(({ safe }) => !safe)).toBe(true);
  });

  it('take away the finding they are offered for', () => {
    const fixes = allFixes(BROKEN);
    expect(fixes.length).toBeGreaterThan(6);
    for (const fix of fixes) {
      const before = checksOf(BROKEN).filter((check) => check === fix.finding.check).length;
      const after = checksOf(apply(BROKEN, fix)).filter((check) => check === fix.finding.check).length;
      expect(after, fix.title).toBeLessThan(before);
    }
  });

  it('that are safe leave every other line as it is', () => {
    const safe = allFixes(BROKEN).filter((fix) => fix.safe);
    expect(safe.map(({ title }) => title).sort()).toEqual(['Take this line out', 'Write solvent']);
    for (const fix of safe) {
      const gone = new Set(fix.edits.map(({ range }) => range.start.line));
      const others = BROKEN.split('\n').filter((_, line) => !gone.has(line));
      const after = apply(BROKEN, fix).split('\n');
      for (const line of others) expect(after).toContain(line);
    }
  });

  it('accept a finding on the last step of a file that ends without a line break', () => {
    const fix = allFixes(BROKEN).find(({ title }) => title === 'Accept transfer-uphill in this step')!;
    expect(apply(BROKEN, fix)).toContain('step B\n  accept transfer-uphill "reason"\n  solvent water');
  });

  it('never offer to accept what cannot be read', () => {
    const titles = allFixes(BROKEN).map(({ title }) => title);
    for (const check of ['unreadable-line', 'unreadable-structure', 'unknown-name']) {
      expect(titles.filter((title) => title.startsWith(`Accept ${check}`))).toEqual([]);
    }
  });
});
