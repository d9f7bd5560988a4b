// Owns finding the word a person probably meant.
// Must not know where the words come from.

/** Edits (insert, delete, replace, swap neighbours) between two words; Damerau 1964, the restricted form. */
function countEdits(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let least = Math.min((last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1, (last[j - 1] ?? 0) + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) least = Math.min(least, (before[j - 2] ?? 0) + 1);
      row.push(least);
    }
    before = last;
    last = row;
  }
  return last[b.length] ?? 0;
}

/** The known word nearest to `word`, case aside, or undefined when none is near enough to suggest. */
export function findNearestWord(word: string, known: readonly string[]): string | undefined {
  if (word.length > 60) return undefined;
  const wanted = word.toLowerCase();
  let best: string | undefined;
  let fewest = Math.max(2, Math.floor(word.length / 3)) + 1;
  for (const candidate of known) {
    const lower = candidate.toLowerCase();
    const edits = lower.startsWith(wanted) && wanted.length >= 3 ? 1 : countEdits(wanted, lower);
    if (edits < fewest && edits < candidate.length) {
      fewest = edits;
      best = candidate;
    }
  }
  return best;
}
