// Owns asking the page about its size.
// Must not know who asks.
import { useSyncExternalStore } from 'react';

export function useMedia(query: string): boolean {
  return useSyncExternalStore(
    (wake) => {
      const list = matchMedia(query);
      list.addEventListener('change', wake);
      return () => list.removeEventListener('change', wake);
    },
    () => matchMedia(query).matches,
  );
}
