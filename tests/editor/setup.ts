/** Before any test: the workbench, and the extension packed as it would be published. */
import { execFileSync } from 'node:child_process';
import { rmSync } from 'node:fs';
import { fetchWorkbench } from './fetch.ts';

export default function setup(): void {
  rmSync('.cache/screens', { recursive: true, force: true });
  fetchWorkbench();
  execFileSync('npm', ['run', 'package'], { stdio: ['ignore', 'ignore', 'inherit'] });
}
