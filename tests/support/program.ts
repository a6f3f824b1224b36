/** The command line as it ships, bundled once for a test file and started as a process of its own. */
import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, realpathSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { buildSync } from 'esbuild';

export interface Ended {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** Path of the bundle; the build's own settings as far as the command line needs them. */
export function bundleProgram(): string {
  const folder = resolve(`.cache/tests/program-${process.pid}`);
  mkdirSync(folder, { recursive: true });
  process.once('exit', () => rmSync(folder, { recursive: true, force: true }));
  const entries = { 'lyate.cjs': 'main.ts', 'records-worker.cjs': 'records-worker.ts' };
  for (const [outfile, entry] of Object.entries(entries)) {
    buildSync({
      bundle: true,
      platform: 'node',
      target: 'node20',
      format: 'cjs',
      logLevel: 'warning',
      define: { 'import.meta.url': 'ownAddress' },
      banner: { js: "const ownAddress=require('node:url').pathToFileURL(__filename).href;" },
      alias: { 'jsonc-parser': 'jsonc-parser/lib/esm/main.js' },
      external: ['tinypool'],
      entryPoints: [`server/src/cli/${entry}`],
      outfile: join(folder, outfile),
    });
  }
  return join(folder, 'lyate.cjs');
}

/** A new folder with files in it, by their paths. */
export function folderOf(files: Readonly<Record<string, string | Uint8Array>>): string {
  const folder = realpathSync(mkdtempSync(join(tmpdir(), 'lyate-')));
  for (const [path, content] of Object.entries(files)) {
    mkdirSync(dirname(join(folder, path)), { recursive: true });
    writeFileSync(join(folder, path), content);
  }
  return folder;
}

/** Runs the program to its end. */
export function start(
  program: string,
  words: readonly string[],
  { cwd, input, env }: { cwd?: string; input?: string | Uint8Array; env?: NodeJS.ProcessEnv } = {},
): Ended {
  const { status, stdout, stderr } = spawnSync(process.execPath, [program, ...words], {
    cwd,
    input: input ?? '',
    env: { ...process.env, ...env },
    encoding: 'utf8',
    maxBuffer: 1 << 28,
  });
  return { status, stdout, stderr };
}
