/** SARIF reports against the JSON Schema that was published with the standard. */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import Ajv from 'ajv-draft-04';
import addFormats from 'ajv-formats';
import { describe, expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { CHECKS } from '../../server/src/checks/registry.generated.ts';
import { sarifReport } from '../../server/src/report/sarif.ts';
import { tables } from '../support/tables.ts';

const schemaFile = join(
  dirname(createRequire(import.meta.url).resolve('@microsoft/jest-sarif/package.json')),
  'lib/schemas/sarif-2.1.0-rtm.5.json',
);
const ajv = new Ajv({ strict: false, allErrors: true, unicodeRegExp: false });
addFormats(ajv as never);
const validate = ajv.compile(JSON.parse(readFileSync(schemaFile, 'utf8')));

const PLAN = `compound 1 = CCOC(=O)[CH2:1]C(=O)OCC
step A
  solvent EtOH 50 mL
  charge 1 10 mmol
  base NaHCO3 1.1 equiv
  deprotonate 1 at :1
  accept transfer-uphill "tested on 2 g: it goes \\"by surprise\\""
step B
  solvent EtOH 20 mL
  charge 1 10 mmol
  base NaHCO3 1.1 equiv
  deprotonate 1 at :1
  charge mystery-powder 1 g
`;

function report(file: string, text: string) {
  const { findings } = analyseNow(createAnalyser(tables), { file, text, language: 'lyate' });
  return { findings, log: JSON.parse(sarifReport([{ file, text, findings }], CHECKS, '1.2.3')) };
}

function problems(log: unknown): string[] {
  return validate(log)
    ? []
    : (validate.errors ?? []).map(({ instancePath, message }) => `${instancePath} ${message}`);
}

describe('a SARIF report', () => {
  const { findings, log } = report('plans/side chain.lyate', PLAN);
  const [run] = log.runs;

  it('fits the published schema, with and without findings', () => {
    expect(problems(log)).toEqual([]);
    expect(run.results.length).toBe(findings.length);
    expect(findings.length).toBeGreaterThan(1);
    expect(problems(report('empty.lyate', '').log)).toEqual([]);
    expect(problems(JSON.parse(sarifReport([], CHECKS, '1.2.3')))).toEqual([]);
  });

  it('would be caught by the schema if it were wrong', () => {
    const broken = structuredClone(log);
    broken.runs[0].results[0].level = 'fatal';
    expect(problems(broken)).not.toEqual([]);
  });

  it('describes every check as a rule and points each result at its own', () => {
    expect(run.tool.driver.rules.map(({ id }: { id: string }) => id)).toEqual(CHECKS.map(({ name }) => name));
    for (const result of run.results) expect(run.tool.driver.rules[result.ruleIndex].id).toBe(result.ruleId);
    for (const rule of run.tool.driver.rules) {
      expect(rule.shortDescription.text).not.toBe('');
      expect(rule.help.markdown).toContain('Why it matters');
    }
  });

  it('ranks by probability and levels by severity', () => {
    run.results.forEach((result: { rank: number; level: string }, place: number) => {
      expect(result.rank).toBeCloseTo(100 * findings[place]!.confidence, 1);
      expect(result.level).toBe(
        { error: 'error', warning: 'warning', information: 'note', hint: 'note' }[findings[place]!.severity],
      );
    });
  });

  it('carries what was accepted as a suppression with its reason, and an empty list where nothing was', () => {
    const uphill = run.results.filter(({ ruleId }: { ruleId: string }) => ruleId === 'transfer-uphill');
    expect(uphill.length).toBe(2);
    expect(uphill[0].suppressions).toEqual([
      { kind: 'inSource', status: 'accepted', justification: 'tested on 2 g: it goes "by surprise"' },
    ]);
    expect(uphill[1].suppressions).toEqual([]);
  });

  it('points at base, site and solvent as related places', () => {
    const { relatedLocations } = run.results.find(
      ({ ruleId }: { ruleId: string }) => ruleId === 'transfer-uphill',
    );
    expect(relatedLocations.length).toBeGreaterThan(1);
    for (const { physicalLocation, message } of relatedLocations) {
      expect(physicalLocation.region.startLine).toBeGreaterThan(1);
      expect(message.text).not.toBe('');
    }
  });

  it('writes paths as addresses', () => {
    const { uri } = run.results[0].locations[0].physicalLocation.artifactLocation;
    expect(uri).toBe('plans/side%20chain.lyate');
    expect(report('/a b/c.lyate', PLAN).log.runs[0].artifacts[0].location.uri).toBe('file:///a%20b/c.lyate');
  });

  it('keeps the fingerprint of a finding when lines are added above it', () => {
    const prints = (log: typeof run.results) =>
      log.map((each: { partialFingerprints: unknown }) => each.partialFingerprints);
    expect(prints(report('x.lyate', `// a remark\n\n${PLAN}`).log.runs[0].results)).toEqual(
      prints(run.results),
    );
  });
});
