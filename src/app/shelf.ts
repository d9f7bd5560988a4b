// Owns where this page keeps things: the IndexedDB shelf, and the note left when the page closes before a write is done.
// Must not know what lies on it.
import { createStore, del, get, keys, set } from 'idb-keyval';

export interface Shelf {
  get(key: string): Promise<unknown>;
  set(key: string, value: unknown): Promise<void>;
  del(key: string): Promise<void>;
  keys(): Promise<readonly string[]>;
}

/** Written in one breath, which a closing page still has; IndexedDB would need several. */
export interface LastWords {
  read(): string | null;
  /** Null takes the note away. */
  write(text: string | null): void;
}

const LAST_WORDS_KEY = 'guidewall unsaved job';

/** Keeps nothing where the browser keeps nothing, or no text of this length. */
export function openLastWords(): LastWords {
  return {
    read: () => {
      try {
        return localStorage.getItem(LAST_WORDS_KEY);
      } catch {
        return null;
      }
    },
    write: (text) => {
      try {
        if (text === null) localStorage.removeItem(LAST_WORDS_KEY);
        else localStorage.setItem(LAST_WORDS_KEY, text);
      } catch {
        // The page is going: there is no one left to tell, and the shelf still holds the job as of 400 ms ago.
      }
    },
  };
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
