/**
 * Files from the disk, or from the client where they lie elsewhere.
 *
 * Must not know: what a plan means.
 * Invariant: nothing is read outside the root of a plan.   (tests/lsp/server.test.ts)
 */
import { fileURLToPath, pathToFileURL } from 'node:url';
import { inside, readText, workspaceOf } from '../host/files.ts';
import { findPlans } from '../host/paths.ts';
import type { ClientFiles, Files } from './door.ts';
import { folderOf, pathOf, uriOf } from './places.ts';

/** The files of a server that runs in Node. */
export function nodeFiles(client: ClientFiles): Files {
  return {
    async read(root, path) {
      if (!isFile(root)) return (await client.read?.(uriOf(root, path))) ?? null;
      const place = inside(fileURLToPath(root), path);
      return place === null ? null : (readText(place).text ?? null);
    },
    async plans(root) {
      if (!isFile(root)) return (await client.plans?.(root)) ?? [];
      const found = findPlans([fileURLToPath(root)]).files;
      return found.map((file) => pathOf(root, pathToFileURL(file).toString()));
    },
    rootOf(uri, folders) {
      if (!isFile(uri)) return folderOf(uri, folders);
      const opened = folders.filter(isFile).map((folder) => fileURLToPath(folder));
      return pathToFileURL(workspaceOf(fileURLToPath(uri), opened)).toString();
    },
  };
}

function isFile(uri: string): boolean {
  return uri.startsWith('file:');
}
