/**
 * Bundles one of the tools beside this file and runs it: `node server/tools/run.mjs NAME ARGUMENT…`.
 */
import { execFileSync } from 'node:child_process';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = join(dirname(fileURLToPath(import.meta.url)), '../..');
const [tool, ...rest] = process.argv.slice(2);
const outfile = join(root, `dist/tools/${tool}.mjs`);
await build({
  bundle: true,
  platform: 'node',
  format: 'esm',
  target: 'node20',
  packages: 'external',
  logLevel: 'warning',
  absWorkingDir: root,
  entryPoints: [`server/tools/${tool}.ts`],
  outfile,
});
try {
  execFileSync(process.execPath, [outfile, ...rest], { stdio: 'inherit', cwd: root });
} catch (error) {
  process.exitCode = error.status ?? 1;
}
