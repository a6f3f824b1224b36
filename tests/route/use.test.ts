import { describe, expect, it } from 'vitest';
import { joinPath } from '../../server/src/route/use.ts';
import { plan, problemsOf } from './draw.ts';

const STEP = 'step A\n charge 7 1 mmol\n';

describe('use', () => {
  it('brings compounds with their measured values, through other files', () => {
    const files = {
      'lib/b.lyate': 'use "../c.lyate"\ncompound 6 = CC\n',
      'c.lyate': 'compound 7 = CC[OH:1]\n measured pKa 15 at :1 in water\n',
    };
    const resolved = plan(`use "lib/b.lyate"\n${STEP}`, { files });
    expect(resolved.problems).toEqual([]);
    expect(resolved.compounds.map(({ name, file, measured }) => [name, file, measured.length])).toEqual([
      ['6', 'lib/b.lyate', 0],
      ['7', 'c.lyate', 1],
    ]);
    expect(resolved.steps[0]!.problems).toEqual([]);
  });

  it('asks for files one level at a time', () => {
    expect(plan('use "b.lyate"\n').needs).toEqual(['b.lyate']);
    expect(plan('use "b.lyate"\n', { files: { 'b.lyate': 'use "d/c.lyate"' } }).needs).toEqual(['d/c.lyate']);
    expect(plan('use "b.lyate"\n', { file: 'x/y/plan.lyate' }).needs).toEqual(['x/y/b.lyate']);
  });

  it('reads the fences of a page', () => {
    const files = { 'b.md': 'compound 1 = CC\n```lyate\ncompound 7 = CCO\n```\n' };
    expect(plan(`use "b.md"\n${STEP}`, { files }).compounds).toMatchObject([
      { name: '7', nameRange: { start: { line: 2 } } },
    ]);
  });

  it.each([
    ['use "../x.lyate"', {}],
    ['use "/etc/passwd"', {}],
    ['use "a/../../x.lyate"', {}],
    ['use "file:///x.lyate"', {}],
    ['use "C:\\\\x.lyate"', {}],
    ['use "gone.lyate"', { 'gone.lyate': null }],
    ['use "b.lyate"', { 'b.lyate': 'use "plan.lyate"\n' }],
    ['use "b.lyate"', { 'b.lyate': 'use "c.lyate"\n', 'c.lyate': 'use "b.lyate"\n' }],
    ['use "plan.lyate"', {}],
    ['use "b.lyate"', { 'b.lyate': 'use "../x.lyate"\n' }],
  ])('is a problem at the path: %s %o', (line, files) => {
    const text = `${line}\n`;
    const resolved = plan(text, { files });
    expect(problemsOf(text, resolved)).toEqual([{ check: 'bad-use', text: line.slice(4), line: 0 }]);
  });

  it('reads a file once that comes by two ways, without calling it a cycle', () => {
    const files = {
      'b.lyate': 'use "d.lyate"\n',
      'c.lyate': 'use "d.lyate"\n',
      'd.lyate': 'compound 7 = CC\n',
    };
    const resolved = plan(`use "b.lyate"\nuse "c.lyate"\n${STEP}`, { files });
    expect(resolved.problems).toEqual([]);
    expect(resolved.compounds).toHaveLength(1);
  });

  it('lets the own definition count and says where the other one is', () => {
    const files = { 'b.lyate': 'compound 7 = CCN\n' };
    const resolved = plan(`use "b.lyate"\ncompound 7 = CCO\n${STEP}`, { files });
    expect(resolved.problems).toMatchObject([
      {
        check: 'defined-twice',
        range: { start: { line: 1 } },
        related: [{ file: 'b.lyate', range: { start: { line: 0 } } }],
      },
    ]);
    expect(resolved.steps[0]!.reference?.smiles).toBe('CCO');
  });

  it('ends on a long chain', () => {
    const files = Object.fromEntries(
      Array.from({ length: 900 }, (_, at) => [`f${at}.lyate`, `use "f${at + 1}.lyate"\n`]),
    );
    expect(plan('use "f0.lyate"\n', { files }).needs).toEqual(['f900.lyate']);
  });
});

describe('joinPath', () => {
  it.each([
    ['a/b.lyate', '../c.lyate', 'c.lyate'],
    ['a/b.lyate', './c/./d.lyate', 'a/c/d.lyate'],
    ['/w/b.lyate', 'c.lyate', '/w/c.lyate'],
    ['/b.lyate', '../c.lyate', null],
    ['b.lyate', '', null],
  ])('%s + %s', (file, path, wanted) => {
    expect(joinPath(file, path)).toBe(wanted);
  });
});
