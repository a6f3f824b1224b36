/** Differences between the findings of two texts, and baselines, at the level of functions. */
import { describe, expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { baselineOf, compareWith, readBaseline } from '../../server/src/report/baseline.ts';
import { difference, differenceRecord, differenceText } from '../../server/src/report/diff.ts';
import { tables } from '../support/tables.ts';

const analyser = createAnalyser(tables);
const found = (text: string) => {
  const source = { file: 'a.lyate', text, language: 'lyate' as const };
  return { file: 'a.lyate', text, findings: analyseNow(analyser, source).findings };
};
const PLAN = `compound 1 = CCOC(=O)[CH2:1]C(=O)OCC
step A
  solvent EtOH 50 mL
  charge 1 10 mmol
  base NaHCO3 1.1 equiv
  deprotonate 1 at :1
step B
  solvent EtOH 50 mL
  charge 1 10 mmol
  base NaHCO3 1.1 equiv
  deprotonate 1 at :1
`;

describe('a difference', () => {
  it('is none against itself, moved or not', () => {
    for (const text of [PLAN, `// above\n\n${PLAN}`]) {
      const { appeared, gone, changed, same } = difference(found(PLAN), found(text));
      expect([appeared, gone, changed]).toEqual([[], [], []]);
      expect(same).toBe(found(PLAN).findings.length);
    }
  });

  it('tells a base that mends one step and a solvent that spoils another', () => {
    const mended = difference(found(PLAN), found(PLAN.replace('base NaHCO3', 'base NaOEt')));
    expect(mended.gone.map(({ check, step }) => [check, step])).toEqual([['transfer-uphill', 'A']]);
    expect(mended.appeared).toEqual([]);
    expect(differenceText(mended)).toMatch(/^- error transfer-uphill \(step A, line 6\)/);
    const back = difference(found(PLAN.replace('base NaHCO3', 'base NaOEt')), found(PLAN));
    expect(back.appeared.map(({ check }) => check)).toEqual(['transfer-uphill']);
  });

  it('pairs what is still there with other figures, or accepted since', () => {
    const other = difference(found(PLAN), found(PLAN.replace('NaHCO3', 'NaOAc')));
    expect(other.changed.map(({ before, after }) => [before.step, before.message === after.message])).toEqual(
      [['A', false]],
    );
    const accepted = difference(found(PLAN), found(`${PLAN}  accept transfer-uphill "agreed"\n`));
    expect(accepted.changed.map(({ after }) => [after.step, after.accepted])).toEqual([['B', true]]);
    expect(differenceText(accepted)).toContain('accepted: agreed');
    expect(JSON.parse(JSON.stringify(differenceRecord(accepted)))).toMatchObject({
      version: 1,
      appeared: [],
      gone: [],
    });
  });
});

describe('a baseline', () => {
  it('counts findings that look alike', () => {
    const once = found(PLAN);
    const baseline = baselineOf([once]);
    const twice = { ...once, findings: [...once.findings, ...once.findings] };
    const { files, gone } = compareWith(baseline, [twice], () => true);
    expect(files[0]!.findings.length).toBe(once.findings.length);
    expect(files[0]!.known!.length).toBe(once.findings.length);
    expect(gone).toEqual([]);
  });

  it('names what is gone with a file, and keeps quiet about files that were not looked at', () => {
    const baseline = readBaseline(JSON.stringify(baselineOf([found(PLAN)])));
    expect(compareWith(baseline, [], () => true).gone).toEqual([]);
    expect(compareWith(baseline, [], () => false).gone.length).toBe(baseline.files[0]!.findings.length);
  });

  it('leaves accepted findings out and to themselves', () => {
    const accepted = found(`${PLAN}  accept transfer-uphill "agreed"\n`);
    expect(baselineOf([accepted]).files[0]!.findings.map(({ step }) => step)).toEqual(['A']);
    const { files } = compareWith(baselineOf([found(PLAN)]), [accepted], () => true);
    expect(files[0]!.findings.map(({ accepted: yes }) => yes)).toEqual([true]);
  });

  it('refuses what is none', () => {
    for (const text of ['{', 'null', '[]', '{"version":2,"files":[]}', '{"version":1,"files":[{"file":1}]}'])
      expect(() => readBaseline(text)).toThrow(/^is no/);
  });
});
