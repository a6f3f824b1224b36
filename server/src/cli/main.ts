/**
 * The command line: one command a file, this one only names them.
 *
 * Invariant: exit code 0 clean, 1 findings at or above the limit, 2 could not run.   (tests/cli/cli.test.ts)
 */
import { Command } from 'commander';
import packageFile from '../../../package.json' with { type: 'json' };
import { builtTables } from '../host/tables.ts';
import { addCheck } from './check.ts';
import { addDiff } from './diff.ts';
import { addExplain } from './explain.ts';
import { addFlask } from './flask.ts';
import { addFormat } from './format.ts';
import { addReport } from './report.ts';
import { addServe } from './serve.ts';
import { addSites } from './sites.ts';
import { addSuggest } from './suggest.ts';
import { addWindow } from './window.ts';

const program = new Command('lyate')
  .description('Checks written synthetic routes for acid-base mistakes.')
  .version(`lyate ${packageFile.version}, tables ${builtTables().version}`)
  .exitOverride((error) => process.exit(error.exitCode === 0 ? 0 : 2));

for (const add of [
  addCheck,
  addReport,
  addDiff,
  addSites,
  addSuggest,
  addFlask,
  addWindow,
  addExplain,
  addFormat,
  addServe,
])
  add(program);

process.stdout.on('error', (error: NodeJS.ErrnoException) => process.exit(error.code === 'EPIPE' ? 0 : 2));

program.parseAsync().catch((error: unknown) => {
  process.stderr.write(`lyate: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 2;
});
