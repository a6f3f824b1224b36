/**
 * Files on disk: which plans there are, what they say, and what `use` may bring in.
 *
 * The only kind of module that reads files.  Must not know: what a plan means.
 * Invariants:
 *  1. A path from a plan never leaves the workspace, not even through a symbolic link.   (tests/host/files.test.ts)
 *  2. Only regular files of at most `LARGEST_FILE` bytes are read.                        (same)
 */
import { readFileSync, realpathSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname, isAbsolute, join, relative, resolve, sep } from 'node:path';

export const LARGEST_FILE = 64 * 1024 * 1024;

export type Reading =
  | { readonly text: string; readonly problem?: undefined }
  | { readonly text?: undefined; readonly problem: string };

/** The text of a regular file; says in a few words why it cannot be had. */
export function readText(path: string): Reading {
  try {
    const stats = statSync(path);
    if (stats.isDirectory()) return { problem: 'is a folder' };
    if (!stats.isFile()) return { problem: 'is not a regular file' };
    if (LARGEST_FILE < stats.size) return { problem: `is larger than ${LARGEST_FILE / 1024 / 1024} MB` };
    return { text: new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(readFileSync(path)) };
  } catch (error) {
    return { problem: words(error) };
  }
}

function words(error: unknown): string {
  const code = (error as { code?: string }).code;
  if (code === 'ENOENT') return 'does not exist';
  if (code === 'EACCES' || code === 'EPERM') return 'may not be read';
  if (code === 'ERR_ENCODING_INVALID_ENCODED_DATA') return 'is not UTF-8 text';
  return code ?? 'cannot be read';
}

/** The real place of a path inside a folder; null where it lies outside, also by way of a link. */
export function inside(folder: string, path: string): string | null {
  if (isAbsolute(path)) return null;
  const place = resolve(folder, path);
  if (!within(folder, place)) return null;
  try {
    return within(realpathSync(folder), realpathSync(place)) ? place : null;
  } catch {
    // What does not exist cannot be a link that leads out.
    return place;
  }
}

function within(folder: string, place: string): boolean {
  const way = relative(folder, place);
  return way !== '' && way !== '..' && !way.startsWith(`..${sep}`) && !isAbsolute(way);
}

/**
 * The nearest folder at or above a file that holds `.git` or `lyate.json`; the file's own folder where none does.
 *
 * @param tops folders above which nothing is looked for, such as those that an editor has open
 */
export function workspaceOf(file: string, tops: readonly string[] = []): string {
  const start = dirname(resolve(file));
  const last = new Set(tops.map((top) => resolve(top)));
  for (let folder = start; ; folder = dirname(folder)) {
    if (last.has(folder) || exists(join(folder, '.git')) || exists(join(folder, 'lyate.json'))) return folder;
    if (folder === dirname(folder)) return start;
  }
}

function exists(path: string): boolean {
  return statSync(path, { throwIfNoEntry: false }) !== undefined;
}

/** Writes a file whole or not at all: beside it first, then in its place. */
export function writeWhole(path: string, text: string): void {
  const beside = `${path}.${process.pid}.tmp`;
  try {
    writeFileSync(beside, text);
    renameSync(beside, path);
  } catch (error) {
    rmSync(beside, { force: true });
    throw error;
  }
}
