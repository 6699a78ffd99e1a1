/** The word of a list that a mistyped one was most likely meant to be, or null when none is near. */
export function nearest(word: string, words: readonly string[]): string | null {
  let best: string | null = null;
  let least = Math.max(1, Math.floor(word.length / 3)) + 1;
  for (const other of words) {
    const distance = editDistance(word.toLowerCase(), other.toLowerCase());
    if (distance < least) {
      least = distance;
      best = other;
    }
  }
  return best;
}

/** Insertions, deletions and replacements that lead from one word to the other (Levenshtein 1966). */
function editDistance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, index) => index);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const replaced = (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min(replaced, (row[j] as number) + 1, (next[j - 1] as number) + 1));
    }
    row = next;
  }
  return row[b.length] as number;
}
