/**
 * Words of a list that are close to a word, closest first.
 *
 * Must not know: what the words mean.
 */
import { editDistance } from '../tables/names.ts';

/** At most three words, none further away than a third of the word's length. */
export function nearestOf(words: Iterable<string>, word: string): string[] {
  const limit = Math.max(1, Math.floor(word.length / 3));
  return [...words]
    .filter((each) => Math.abs(each.length - word.length) <= limit)
    .map((each) => ({ each, distance: editDistance(word.toLowerCase(), each.toLowerCase(), limit) }))
    .filter(({ distance }) => distance <= limit)
    .sort((a, b) => a.distance - b.distance || (a.each < b.each ? -1 : 1))
    .slice(0, 3)
    .map(({ each }) => each);
}
