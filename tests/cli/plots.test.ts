/** `lyate flask` and `lyate window` from arguments to output and pictures. */
import { mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Command } from 'commander';
import { afterEach, expect, test, vi } from 'vitest';
import { addFlask } from '../../server/src/cli/flask.ts';
import { addWindow } from '../../server/src/cli/window.ts';

const folder = mkdtempSync(join(tmpdir(), 'lyate-'));
const file = join(folder, 'plan.lyate');
writeFileSync(
  file,
  'compound A = CC(=O)O\nstep A\n  solvent water 100 mL\n  charge A 10 mmol\nstep B\n  note "empty"\n',
);

afterEach(() => vi.restoreAllMocks());

async function run(...words: string[]): Promise<string> {
  let out = '';
  vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
    out += String(text);
    return true;
  });
  const program = new Command().exitOverride().configureOutput({ writeErr: () => {} });
  addFlask(program);
  addWindow(program);
  await program.parseAsync(words, { from: 'user' });
  return out;
}

test('the balance line by line', async () => {
  expect(await run('flask', file, '--step', 'A')).toMatch(/line 4: pH 2\.8\d on the water scale/);
  const { states } = JSON.parse(await run('flask', file, '--step', 'A', '--format', 'json'));
  expect(states.at(-1)).toMatchObject({ line: 3, scale: 'water' });
});

test('a titration as numbers and as a picture', async () => {
  const svg = join(folder, 'a.svg');
  const out = await run('flask', file, '--step', 'A', '--svg', svg);
  expect(out).toMatch(/titration with NaOH, water scale/);
  expect(out).toMatch(/half of A .*: pKa 4\.7\d ± .* at 4\.99\d mmol and pH 4\.\d+/);
  expect(readFileSync(svg, 'utf8')).toMatch(/^<svg xmlns="http:\/\/www\.w3\.org\/2000\/svg"/);
  const json = JSON.parse(
    await run('flask', file, '--step', 'A', '--plot', 'titration', '--with', 'KOH', '--format', 'json'),
  );
  expect(json).toMatchObject({ step: 'A', plot: 'titration', titrant: 'KOH', halves: [{ name: 'A' }] });
});

test('the forms over pH', async () => {
  const out = await run('flask', file, '--step', 'A', '--plot', 'speciation');
  expect(out).toMatch(/1: A, −/);
  const json = JSON.parse(
    await run('flask', file, '--step', 'A', '--plot', 'speciation', '--format', 'json'),
  );
  expect(json.forms.map(({ charge }: { charge: number }) => charge)).toEqual([-1, 0]);
});

test('what cannot be drawn is said', async () => {
  await expect(run('flask', file, '--step', 'Z')).rejects.toThrow('has no step Z');
  await expect(run('flask', file, '--step', 'A', '--line', '5')).rejects.toThrow('line 5 is not in step A');
  await expect(run('flask', file, '--step', 'A', '--line', 'x')).rejects.toThrow('whole number');
  await expect(run('flask', file, '--step', 'B', '--plot', 'speciation')).rejects.toThrow('nothing there');
});

test('windows in words, as data and as a picture', async () => {
  const svg = join(folder, 'w.svg');
  const out = await run('window', 'THF', 'DMSO', 'water', 'benzene', '--absolute', '--svg', svg);
  expect(out.trim().split('\n')).toHaveLength(5);
  expect(out).toMatch(/^THF .*no autoprotolysis constant known.*\(estimated\)/);
  expect(out).toMatch(/DMSO .*0\.0 to 33\.3; DMSO scale +absolute: 3\.4 ± 0\.4 to 36\.7 ± 0\.6/);
  expect(await run('window', 'DMSO')).not.toContain('absolute');
  expect(readFileSync(svg, 'utf8')).toContain('benzene');
  const json = JSON.parse(await run('window', 'acetic acid', '--format', 'json'));
  expect(json.solvents[0]).toMatchObject({ name: 'acetic acid', own: { low: 0, high: 14.5 } });
  await expect(run('window', 'moonshine')).rejects.toThrow('no solvent is called moonshine');
});
