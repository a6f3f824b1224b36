/** Checks the demo routes and prints what a chemist would read; findings are expected there, so the exit code is 0. */
import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';

const plans = readdirSync('data/demo')
  .filter((file) => file.endsWith('.lyate'))
  .map((file) => `data/demo/${file}`);
const { status } = spawnSync(process.execPath, ['dist/lyate.cjs', 'check', ...plans], { stdio: 'inherit' });
process.exit(status === 1 ? 0 : (status ?? 2));
