/** `lyate suggest` from arguments to output. */
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Command } from 'commander';
import { afterEach, expect, test, vi } from 'vitest';
import { addSuggest } from '../../server/src/cli/suggest.ts';

const file = join(mkdtempSync(join(tmpdir(), 'lyate-')), 'plan.lyate');
writeFileSync(
  file,
  `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
step B
  solvent water 30 mL
`,
);

afterEach(() => vi.restoreAllMocks());

async function run(...words: string[]): Promise<string> {
  let out = '';
  vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
    out += String(text);
    return true;
  });
  const program = new Command().exitOverride().configureOutput({ writeErr: () => {} });
  addSuggest(program);
  await program.parseAsync(['suggest', ...words], { from: 'user' });
  return out;
}

test('prints a table', async () => {
  const out = await run(file, '--step', 'A');
  expect(out).toMatch(/^Step A, line 6: deprotonate K\n/);
  expect(out).toMatch(/LDA +1\.10 +THF/);
});

test('prints JSON with the refused pairs on request', async () => {
  const few = JSON.parse(await run(file, '--step', 'A', '--format', 'json'));
  expect(few.transfers[0].suggestions.length).toBeGreaterThan(5);
  expect(few.transfers[0].pairs).toBeUndefined();
  const all = JSON.parse(await run(file, '--step', 'A', '--format', 'json', '--all'));
  expect(all.transfers[0].pairs.length).toBeGreaterThan(100);
});

test('says what is missing', async () => {
  await expect(run(file, '--step', 'Z')).rejects.toThrow('has no step Z');
  await expect(run(file, '--step', 'B')).rejects.toThrow('step B has no deprotonate or protonate');
  await expect(run(file, '--step', 'A', '--line', '2')).rejects.toThrow('line 2 has no');
  await expect(run(file, '--step', 'A', '--line', 'x')).rejects.toThrow('whole number');
  await expect(run('nowhere.lyate', '--step', 'A')).rejects.toThrow('nowhere.lyate');
});
