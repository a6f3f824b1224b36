/**
 * Builds everything that is generated: the tables' module, the bundles of command line, servers and extension.
 *
 * `node server/tools/build.mjs [tables]`; without a word it builds all.
 */
import { execFileSync } from 'node:child_process';
import { copyFileSync, existsSync, mkdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = join(dirname(fileURLToPath(import.meta.url)), '../..');
const at = (path) => join(root, path);
const common = {
  bundle: true,
  minify: true,
  sourcemap: false,
  logLevel: 'warning',
  absWorkingDir: root,
  legalComments: 'none',
  // Its other form asks for its own parts by names that no bundle can follow.
  alias: { 'jsonc-parser': 'jsonc-parser/lib/esm/main.js' },
};
/** Some packages ask for the address of their own file, which a bundle of this format has to be told. */
const ownAddress = "const ownAddress=require('node:url').pathToFileURL(__filename).href;";
const node = {
  ...common,
  platform: 'node',
  target: 'node20',
  format: 'cjs',
  define: { 'import.meta.url': 'ownAddress' },
  banner: { js: ownAddress },
};
const browser = {
  ...common,
  platform: 'browser',
  target: 'es2022',
  alias: { ...common.alias, 'csv-parse/sync': 'csv-parse/browser/esm/sync' },
};

/** Bundles one of the tools and runs it on the project. */
async function run(tool) {
  await build({
    ...node,
    minify: false,
    packages: 'external',
    format: 'esm',
    define: {},
    banner: {},
    entryPoints: [`server/tools/${tool}.ts`],
    outfile: `dist/tools/${tool}.mjs`,
  });
  execFileSync(process.execPath, [at(`dist/tools/${tool}.mjs`), root], { stdio: 'inherit' });
}

/** Bundles an entry only where it exists, so that a part of the tree can be built alone. */
async function bundle(options) {
  if (existsSync(at(options.entryPoints[0]))) await build(options);
}

mkdirSync(at('dist'), { recursive: true });
copyFileSync(at('server/src/library/types.ts'), at('dist/library.d.ts'));
await run('make-tables');
await run('write-registry');
if (process.argv[2] !== 'tables') {
  await Promise.all([
    bundle({
      ...node,
      entryPoints: ['server/src/cli/main.ts'],
      outfile: 'dist/lyate.cjs',
      banner: { js: `#!/usr/bin/env node\n${ownAddress}` },
      // It starts its threads from files of its own.
      external: ['tinypool'],
    }),
    bundle({
      ...node,
      entryPoints: ['server/src/cli/records-worker.ts'],
      outfile: 'dist/records-worker.cjs',
    }),
    bundle({
      ...browser,
      format: 'esm',
      entryPoints: ['server/src/library/library.ts'],
      outfile: 'dist/library.js',
    }),
    bundle({ ...node, entryPoints: ['server/src/lsp/node.ts'], outfile: 'dist/server.cjs' }),
    bundle({
      ...browser,
      format: 'iife',
      entryPoints: ['server/src/lsp/browser.ts'],
      outfile: 'dist/server-browser.js',
    }),
    bundle({
      ...node,
      entryPoints: ['client/src/extension.ts'],
      outfile: 'dist/extension.cjs',
      external: ['vscode'],
    }),
    bundle({
      ...browser,
      format: 'cjs',
      entryPoints: ['client/src/extension-browser.ts'],
      outfile: 'dist/extension-browser.js',
      external: ['vscode'],
    }),
    bundle({
      ...browser,
      format: 'iife',
      entryPoints: ['client/src/flask-view/page.ts'],
      outfile: 'dist/flask-view.js',
    }),
  ]);
}
