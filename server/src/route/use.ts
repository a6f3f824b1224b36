/**
 * Follows `use` from file to file and gathers the compounds they bring.
 *
 * Knows: texts handed in by path.  Must not know: disks, editors.
 * Invariants: never reads a file twice; never leaves the workspace; ends on cycles.   (tests/route/use.test.ts)
 * Paths are relative to the workspace, with `/` between their parts.
 */
import { boundedCache } from '../tables/cache.ts';
import type { Tables } from '../tables/tables.ts';
import { type BlockDefinitions, definitionsOf } from './definitions.ts';
import { readDocument } from './document.ts';
import type { Compound, Range, TextProblem } from './plan.ts';

export interface Brought {
  readonly compounds: readonly { readonly compound: Compound; readonly by: Range }[];
  readonly needs: readonly string[];
  readonly problems: readonly TextProblem[];
}

interface UsedFile {
  readonly compounds: readonly Compound[];
  readonly uses: readonly string[];
}

const MOST_FILES = 1000;
const remembered = new WeakMap<Tables, ReturnType<typeof boundedCache<string, UsedFile>>>();

/** What the `use` lines of a file bring, directly and through others. */
export function followUses(
  file: string,
  uses: readonly { readonly path: string; readonly range: Range }[],
  files: ReadonlyMap<string, string | null>,
  tables: Tables,
): Brought {
  const compounds: { compound: Compound; by: Range }[] = [];
  const needs = new Set<string>();
  const problems: TextProblem[] = [];
  const read = new Set<string>();
  const bad = (message: string, range: Range) => problems.push({ check: 'bad-use', message, range });
  for (const { path, range } of uses) {
    const first = joinPath(file, path);
    if (first === null) {
      bad(`“${path}” leads out of the workspace; give a path inside it.`, range);
      continue;
    }
    const cycle = findCycle(file, first, files, tables);
    if (cycle !== null) bad(`This file brings itself in again: ${cycle.join(' → ')}.`, range);
    const open = [{ place: first, from: file }];
    for (let next = open.pop(); next !== undefined; next = open.pop()) {
      const { place, from } = next;
      if (place === file || read.has(place) || MOST_FILES < read.size) continue;
      read.add(place);
      const text = files.get(place);
      if (text === undefined) needs.add(place);
      else if (text === null) {
        const chain = from === file ? '' : `, which ${from} uses,`;
        bad(`“${place}”${chain} is not there or cannot be read.`, range);
      } else {
        const used = readUsed(place, text, tables);
        for (const compound of used.compounds) compounds.push({ compound, by: range });
        for (const further of used.uses) {
          const inner = joinPath(place, further);
          if (inner === null) bad(`“${further}”, which ${place} uses, leads out of the workspace.`, range);
          else open.push({ place: inner, from: place });
        }
      }
    }
  }
  return { compounds, needs: [...needs], problems };
}

/** The files on a way from the first one back to a file already on it; null where there is none. */
function findCycle(
  file: string,
  first: string,
  files: ReadonlyMap<string, string | null>,
  tables: Tables,
): string[] | null {
  const done = new Set<string>();
  const way = [file];
  const open: { place: string; depth: number }[] = [{ place: first, depth: 1 }];
  for (let next = open.pop(); next !== undefined; next = open.pop()) {
    way.length = next.depth;
    const back = way.indexOf(next.place);
    if (0 <= back) return [...way.slice(back), next.place];
    if (done.has(next.place) || MOST_FILES < done.size) continue;
    done.add(next.place);
    way.push(next.place);
    const text = files.get(next.place);
    if (typeof text !== 'string') continue;
    for (const further of readUsed(next.place, text, tables).uses) {
      const inner = joinPath(next.place, further);
      if (inner !== null) open.push({ place: inner, depth: way.length });
    }
  }
  return null;
}

function readUsed(file: string, text: string, tables: Tables): UsedFile {
  let cache = remembered.get(tables);
  if (cache === undefined) {
    cache = boundedCache<string, UsedFile>(200);
    remembered.set(tables, cache);
  }
  const key = `${file}\n${text}`;
  const known = cache.get(key);
  if (known !== undefined) return known;
  const { blocks } = readDocument(text, /\.(md|markdown)$/i.test(file) ? 'markdown' : 'lyate');
  const compounds: Compound[] = [];
  const uses: string[] = [];
  for (const { block, firstLine } of blocks) {
    const defined = definitionsOf(block, file, tables);
    compounds.push(...placed(defined, firstLine));
    uses.push(...defined.uses.map(({ path }) => path));
  }
  const used = { compounds, uses };
  cache.set(key, used);
  return used;
}

/** Compounds of a block at their place in the file. */
export function placed({ compounds }: BlockDefinitions, firstLine: number): Compound[] {
  return compounds.map(({ definition, nameRange, smilesRange }) => ({
    ...definition,
    nameRange: shiftRange(nameRange, firstLine),
    smilesRange: shiftRange(smilesRange, firstLine),
  }));
}

/** A range further down. */
export function shiftRange({ start, end }: Range, lines: number): Range {
  return {
    start: { line: start.line + lines, character: start.character },
    end: { line: end.line + lines, character: end.character },
  };
}

/** A path as seen from a file; null where it leads out of the workspace or is no relative path. */
export function joinPath(file: string, path: string): string | null {
  if (path === '' || /^([A-Za-z][A-Za-z0-9+.-]*:|[/\\])/.test(path) || path.includes('\0')) return null;
  const parts = file.split('/').slice(0, -1);
  const floor = parts[0] === '' ? 1 : 0;
  for (const part of path.split(/[/\\]/)) {
    if (part === '.' || part === '') continue;
    if (part !== '..') parts.push(part);
    else if (parts.length <= floor || parts.at(-1) === '..') return null;
    else parts.pop();
  }
  return parts.join('/');
}
