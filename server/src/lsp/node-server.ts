/** The server in Node, over standard input and output or as an editor starts it. */
import { createConnection, ProposedFeatures } from 'vscode-languageserver/node';
import { createAnalyser } from '../answers/analyse.ts';
import { builtTables } from '../host/tables.ts';
import type { Door } from './door.ts';
import { nodeFiles } from './node-files.ts';
import { startServer } from './server.ts';

/** What the server needs, from Node. */
export const NODE_DOOR: Door = {
  tables: builtTables,
  createAnalyser,
  files: nodeFiles,
  pause: () => new Promise((resolve) => setImmediate(resolve)),
  now: () => performance.now(),
};

/** Serves a client over standard input and output. */
export function serveOverStdio(): void {
  startServer(createConnection(ProposedFeatures.all, process.stdin, process.stdout), NODE_DOOR);
}

/** Serves the client that started this process and said how on its command line. */
export function serveParent(): void {
  startServer(createConnection(ProposedFeatures.all), NODE_DOOR);
}
