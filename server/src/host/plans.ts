/**
 * Reads a plan and whatever its `use` lines bring in, and hands both to the analysis.
 *
 * Must not know: what a plan means.
 */
import { relative, resolve } from 'node:path';
import { type Analyser, analyseNow } from '../answers/analyse.ts';
import type { Analysed, SourceText } from '../answers/types.ts';
import { inside, readText, workspaceOf } from './files.ts';

/** How often the analysis may ask for more files; a chain of `use` longer than this is left as it is. */
const ROUNDS = 64;

/** Analyses one text as if it stood at `file`, with the files that `use` names looked up below the workspace of `file`. */
export function analyseWithFiles(analyser: Analyser, source: SourceText): Analysed {
  return analyseIn(workspaceOf(source.file), analyser, source);
}

/** The same below a given workspace; paths of `use` are relative to it. */
export function analyseIn(workspace: string, analyser: Analyser, source: SourceText): Analysed {
  const files = new Map<string, string | null>();
  const place = relative(workspace, resolve(source.file)).split('\\').join('/');
  let analysed = analyseNow(analyser, { ...source, file: place }, files);
  for (let round = 0; round < ROUNDS && analysed.plan.needs.length !== 0; round++) {
    for (const need of analysed.plan.needs) files.set(need, textInside(workspace, need));
    analysed = analyseNow(analyser, { ...source, file: place }, files);
  }
  return { ...analysed, source };
}

/** Text of a file below a folder; null where it is missing, unreadable or outside. */
function textInside(workspace: string, path: string): string | null {
  const found = inside(workspace, path);
  return found === null ? null : (readText(found).text ?? null);
}
