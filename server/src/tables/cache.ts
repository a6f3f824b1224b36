/**
 * A cache that forgets its oldest entries, so that no session grows without end.
 *
 * Invariant: holds at most `limit` entries; a hit returns the very value that was put in.   (tests/tables/cache.test.ts)
 */
export interface Cache<Key, Value> {
  get(key: Key): Value | undefined;
  set(key: Key, value: Value): void;
}

/** An empty cache of at most `limit` entries; what was used longest ago goes first. */
export function boundedCache<Key, Value>(limit: number): Cache<Key, Value> {
  const entries = new Map<Key, Value>();
  return {
    get(key) {
      const value = entries.get(key);
      if (value === undefined) return undefined;
      entries.delete(key);
      entries.set(key, value);
      return value;
    },
    set(key, value) {
      entries.delete(key);
      entries.set(key, value);
      if (limit < entries.size) entries.delete(entries.keys().next().value as Key);
    },
  };
}
