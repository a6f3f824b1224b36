/** `lyate serve`: the language server for any editor. */
import type { Command } from 'commander';
import { serveOverStdio } from '../lsp/node-server.ts';

/** Adds the command. */
export function addServe(program: Command): void {
  program
    .command('serve')
    .description('the language server, over standard input and output')
    .option('--stdio', 'talk over standard input and output, the only way there is')
    .action(() => serveOverStdio());
}
