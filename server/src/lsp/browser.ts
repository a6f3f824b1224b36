/** Entry of the server in a worker of the browser: no disk, files come from the client. */
import { BrowserMessageReader, BrowserMessageWriter, createConnection } from 'vscode-languageserver/browser';
import built from '../../generated/tables.json';
import { createAnalyser } from '../answers/analyse.ts';
import { readTables, type Tables } from '../tables/tables.ts';
import type { ClientFiles, Files } from './door.ts';
import { folderOf, uriOf } from './places.ts';
import { startServer } from './server.ts';

const scope = self as unknown as DedicatedWorkerGlobalScope;
let tables: Tables | undefined;

function browserFiles({ read, plans }: ClientFiles): Files {
  return {
    read: async (root, path) => (await read?.(uriOf(root, path))) ?? null,
    plans: async (root) => (await plans?.(root)) ?? [],
    rootOf: folderOf,
  };
}

startServer(createConnection(new BrowserMessageReader(scope), new BrowserMessageWriter(scope)), {
  tables: () => {
    tables ??= readTables(built);
    return tables;
  },
  createAnalyser,
  files: browserFiles,
  pause: () => new Promise((resolve) => setTimeout(resolve)),
  now: () => performance.now(),
});
