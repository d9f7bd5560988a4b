// Owns the one IndexedDB shelf of this page: keys and plain data.
// Must not know what lies on it.
import { createStore, del, get, keys, set } from 'idb-keyval';

export interface Shelf {
  get(key: string): Promise<unknown>;
  set(key: string, value: unknown): Promise<void>;
  del(key: string): Promise<void>;
  keys(): Promise<readonly string[]>;
}

/** Each call fails where the browser keeps nothing (private windows, full discs). */
export function openShelf(): Shelf {
  const store = createStore('guidewall', 'bench');
  return {
    get: (key) => get<unknown>(key, store),
    set: (key, value) => set(key, value, store),
    del: (key) => del(key, store),
    keys: async () => (await keys(store)).map(String),
  };
}
