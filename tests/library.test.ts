/** The door for programs: plain data, remembered work, nothing thrown, types that stand by themselves. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import * as library from '../server/src/library/library.ts';

const PLAN = `use "shared.lyate"
step A
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
`;
const SHARED = 'compound K = O=C([CH3:1])c1ccccc1\n';

describe('analyse', () => {
  it('gives findings, steps, flasks and what it still needs', () => {
    const without = library.analyse(PLAN);
    expect(without.needs).toEqual(['shared.lyate']);
    expect(without.findings.map(({ check }) => check)).toContain('bad-use');
    const { findings, steps, needs, flask } = library.analyse(PLAN, { files: { 'shared.lyate': SHARED } });
    expect(findings.map(({ check, severity, step }) => [check, severity, step])).toEqual([
      ['transfer-uphill', 'error', 'A'],
    ]);
    expect(steps).toEqual(['A']);
    expect(needs).toEqual([]);
    expect(flask('A')!.at(-1)!.pH).toBeGreaterThan(13);
    expect(flask('Z')).toBeNull();
  });

  it('heeds settings, and starts from the file it is given', () => {
    const options = { files: { 'shared.lyate': SHARED } };
    const quiet = library.analyse(PLAN, { ...options, severities: { 'transfer-uphill': 'off' } });
    expect(quiet.findings).toEqual([]);
    expect(library.analyse(PLAN, { file: 'plans/a.lyate' }).needs).toEqual(['plans/shared.lyate']);
    const page = `Text.\n\n\`\`\`lyate\n${SHARED}${PLAN.slice(PLAN.indexOf('step'))}\`\`\`\n`;
    expect(library.analyse(page, { language: 'markdown' }).findings[0]!.range.start.line).toBe(8);
  });

  it('gives answers that nobody can spoil for the next one', () => {
    const options = { files: { 'shared.lyate': SHARED } };
    const first = library.analyse(PLAN, options);
    const copy = structuredClone(first.findings);
    (first.findings[0]! as { message: string }).message = 'spoilt';
    (first.findings[0]!.range.start as { line: number }).line = 99;
    expect(library.analyse(PLAN, options).findings).toEqual(copy);
  });

  it('throws for what is no text only', () => {
    expect(() => library.analyse(7 as unknown as string)).toThrow(TypeError);
    for (const text of ['', '\0', 'step', 'compound 1 = C(', '\ud800'])
      expect(library.analyse(text, { severities: { __proto__: 'off' } as never }).findings).toBeInstanceOf(
        Array,
      );
  });
});

describe('the types', () => {
  it('name every value that the library has, and import nothing', () => {
    const types = readFileSync('server/src/library/types.ts', 'utf8');
    const declared = [...types.matchAll(/^export declare function (\w+)/gm)].map(([, name]) => name);
    expect(declared).toEqual(Object.keys(library));
    expect(types).not.toMatch(/^import /m);
    const { exports } = JSON.parse(readFileSync('package.json', 'utf8'));
    expect(exports['.']).toEqual({ types: './dist/library.d.ts', default: './dist/library.js' });
  });

  it('are those of the function', () => {
    const declared: typeof import('../server/src/library/types.ts').analyse = library.analyse;
    expect(declared).toBe(library.analyse);
  });
});
