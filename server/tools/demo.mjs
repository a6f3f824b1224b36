/**
 * Checks the demo routes and prints what a chemist would read, then suggestions for a base that cannot, the titration of
 * a salt break, and the windows of four solvents; pictures go to `.cache/demo`. Findings are expected, so the exit code is 0.
 */
import { spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync } from 'node:fs';

const pictures = '.cache/demo';
const plans = readdirSync('data/demo')
  .filter((file) => file.endsWith('.lyate'))
  .map((file) => `data/demo/${file}`);

mkdirSync(pictures, { recursive: true });
for (const words of [
  ['check', ...plans],
  ['suggest', 'data/demo/wrong-base.lyate', '--step', 'A'],
  [
    'flask',
    'data/demo/five-steps.lyate',
    '--step',
    'A',
    '--line',
    '13',
    '--svg',
    `${pictures}/titration.svg`,
  ],
  [
    'flask',
    'data/demo/five-steps.lyate',
    '--step',
    'E',
    '--plot',
    'speciation',
    '--svg',
    `${pictures}/forms.svg`,
  ],
  ['window', 'THF', 'DMSO', 'water', 'benzene', '--absolute', '--svg', `${pictures}/windows.svg`],
]) {
  process.stdout.write(`\n$ lyate ${words[0] === 'check' ? 'check data/demo' : words.join(' ')}\n`);
  const { status } = spawnSync(process.execPath, ['dist/lyate.cjs', ...words], { stdio: 'inherit' });
  if (status !== 0 && status !== 1) process.exit(status ?? 2);
}
