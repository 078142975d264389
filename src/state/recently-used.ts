/** A map that forgets what was used longest ago once it holds more than `limit` entries. */
export interface RecentlyUsed<K, V> {
  get(key: K): V | undefined;
  set(key: K, value: V): void;
}

export function createRecentlyUsed<K, V>(limit: number): RecentlyUsed<K, V> {
  const entries = new Map<K, V>();
  return {
    get(key) {
      const value = entries.get(key);
      if (value !== undefined) {
        entries.delete(key);
        entries.set(key, value);
      }
      return value;
    },
    set(key, value) {
      entries.delete(key);
      entries.set(key, value);
      for (const oldest of entries.keys()) {
        if (entries.size <= limit) break;
        entries.delete(oldest);
      }
    },
  };
}
