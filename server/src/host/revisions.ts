/**
 * Texts of files as a git revision has them, through git's own commands.
 *
 * Invariants: git is never handed a word that it could take for an option; no shell reads any of them.
 *                                                                          (tests/cli/diff.test.ts)
 */
import { execFileSync } from 'node:child_process';
import { dirname, relative, resolve } from 'node:path';
import { LARGEST_FILE } from './files.ts';

export interface Revision {
  /** Top folder of the repository. */
  readonly root: string;
  /** Text of a file by its path below the root; null where the revision has none. */
  readonly text: (path: string) => string | null;
}

/** A revision of the repository that holds a file. @throws Error in words */
export function revisionOf(file: string, name: string): Revision {
  const folder = dirname(resolve(file));
  const root = git(folder, 'rev-parse', '--show-toplevel')?.trim();
  if (root === undefined) throw new Error(`${file} is in no git repository`);
  const commit = git(
    root,
    'rev-parse',
    '--verify',
    '--quiet',
    '--end-of-options',
    `${name}^{commit}`,
  )?.trim();
  if (commit === undefined) throw new Error(`there is no revision ${name}`);
  return { root, text: (path) => git(root, 'cat-file', 'blob', `${commit}:${path}`) ?? null };
}

/** Path of a file below a root, with `/`. */
export function pathInRepository(root: string, file: string): string {
  return relative(root, resolve(file)).split('\\').join('/');
}

function git(folder: string, ...words: readonly string[]): string | undefined {
  try {
    const bytes = execFileSync('git', ['-C', folder, ...words], {
      maxBuffer: LARGEST_FILE,
      stdio: ['ignore', 'pipe', 'ignore'],
    });
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') throw new Error('git is not installed');
    return undefined;
  }
}
