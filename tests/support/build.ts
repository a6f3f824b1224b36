/** Builds the generated tables once before any test, so that a test never sees yesterday's. */
import { execFileSync } from 'node:child_process';

export default function setup(): void {
  execFileSync(process.execPath, ['server/tools/build.mjs', 'tables'], { stdio: 'inherit' });
}
