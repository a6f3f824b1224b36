/**
 * Looks names up in the tables: folded over case, blanks, hyphens and dots, the longest run of words first.
 *
 * Knows: rows.  Must not know: plans, structures.
 */
import { foldName } from './fold-name.ts';
import type { ReagentRow, SolventRow } from './rows.ts';
import type { Tables } from './tables.ts';

export interface FoundName {
  /** How many of the words belong to the name. */
  readonly length: number;
  readonly reagent: ReagentRow | null;
  readonly solvent: SolventRow | null;
}

/** Longest run of words, from the first on, that the tables know; null where not even the first is known. */
export function lookUpName(tables: Tables, words: readonly string[]): FoundName | null {
  const most = Math.min(words.length, tables.longestName);
  for (let length = most; 0 < length; length--) {
    const folded = foldName(words.slice(0, length).join(' '));
    const reagent = tables.reagentByName.get(folded) ?? null;
    const solvent = tables.solventByName.get(folded) ?? null;
    if (reagent !== null || solvent !== null) return { length, reagent, solvent };
  }
  return null;
}

/** Up to `count` known names that are close to a text, closest first. */
export function nearestNames(tables: Tables, text: string, count = 3): string[] {
  const wanted = foldName(text);
  const limit = Math.max(1, Math.floor(wanted.length / 3));
  const near: { name: string; distance: number }[] = [];
  for (const [folded, name] of tables.nameByFolded) {
    if (limit < Math.abs(folded.length - wanted.length)) continue;
    const distance = editDistance(wanted, folded, limit);
    if (distance <= limit) near.push({ name, distance });
  }
  near.sort((a, b) => a.distance - b.distance || (a.name < b.name ? -1 : 1));
  return [...new Set(near.map(({ name }) => name))].slice(0, count);
}

/** Edits between two words, swapped neighbours counted as one; larger than `limit` where there are more. */
export function editDistance(a: string, b: string, limit: number): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, place) => place);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = Math.min(row[j - 1]! + 1, last[j]! + 1, last[j - 1]! + same);
      if (1 < i && 1 < j && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        best = Math.min(best, before[j - 2]! + 1);
      row.push(best);
    }
    if (limit < Math.min(...row)) return limit + 1;
    before = last;
    last = row;
  }
  return last[b.length]!;
}
