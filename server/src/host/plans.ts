/**
 * Reads a plan and whatever its `use` lines bring in, and hands both to the analysis.
 *
 * Must not know: what a plan means.
 */
import { relative, resolve } from 'node:path';
import { type Analyser, analyseNow } from '../answers/analyse.ts';
import type { Analysed, SourceText } from '../answers/types.ts';
import { inside, readText } from './files.ts';

/** How often the analysis may ask for more files; a chain of `use` longer than this is left as it is. */
const ROUNDS = 64;

/**
 * Analyses one text as if it stood at its file, with the files that `use` names looked up below the workspace.
 *
 * Paths of `use` are relative to the workspace.
 */
export function analyseIn(
  workspace: string,
  analyser: Analyser,
  source: SourceText,
  read: Reader = onDisk,
): Analysed {
  const files = new Map<string, string | null>();
  const place = relative(workspace, resolve(source.file)).split('\\').join('/');
  let analysed = analyseNow(analyser, { ...source, file: place }, files);
  for (let round = 0; round < ROUNDS && analysed.plan.needs.length !== 0; round++) {
    for (const need of analysed.plan.needs) files.set(need, textBelow(workspace, need, read));
    analysed = analyseNow(analyser, { ...source, file: place }, files);
  }
  return { ...analysed, source };
}

/** Text of a file below a folder; null where it is missing, unreadable or outside. */
export function textBelow(workspace: string, path: string, read: Reader): string | null {
  const found = inside(workspace, path);
  return found === null ? null : read(found);
}

/** Text of a file by its full path; null where there is none. */
export type Reader = (path: string) => string | null;

/** Reads files as they are now. */
export const onDisk: Reader = (path) => readText(path).text ?? null;
