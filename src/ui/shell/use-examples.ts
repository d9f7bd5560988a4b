// Owns the list of examples as components see it.
// Must not know where the examples lie.
import { useEffect, useState } from 'react';
import type { Example } from '../../app/examples.ts';
import { exampleShelf } from '../../app/examples.ts';

/** Empty until the list has come, and when it never comes. */
export function useExamples(): readonly Example[] {
  const [examples, setExamples] = useState<readonly Example[]>([]);
  useEffect(() => {
    let gone = false;
    const read = async (): Promise<void> => {
      const list = await exampleShelf.examples();
      if (!gone && list.ok) setExamples(list.value);
    };
    void read();
    return () => {
      gone = true;
    };
  }, []);
  return examples;
}
