/**
 * The word of a list that was probably meant, or null: the nearest by single-letter insertions, deletions,
 * replacements and swaps of neighbours. One is allowed in words of 2 to 4 letters, two in words of 5 to 7, and so on;
 * of a word of one letter only the case may differ.
 */
export function nearMiss(word: string, known: readonly string[]): string | null {
  const plain = word.toLowerCase().replaceAll("_", "-");
  let best: string | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const candidate of known) {
    const distance = editDistance(plain, candidate.toLowerCase());
    if (distance < least && distance <= Math.floor((candidate.length + 1) / 3)) {
      best = candidate;
      least = distance;
    }
  }
  return best;
}

/** Insertions, deletions, replacements and swaps of neighbours between two words (Damerau, Comm. ACM 7 (1964) 171). */
export function editDistance(a: string, b: string): number {
  // A word that is much longer or shorter is no slip of the pen.
  if (Math.abs(a.length - b.length) > 8) return Number.POSITIVE_INFINITY;
  const rows: number[][] = [Array.from({ length: b.length + 1 }, (_, j) => j)];
  const at = (i: number, j: number): number => rows[i]?.[j] ?? 0;
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    rows.push(row);
    for (let j = 1; j <= b.length; j += 1) {
      const replaced = at(i - 1, j - 1) + (a[i - 1] === b[j - 1] ? 0 : 1);
      row.push(Math.min(replaced, at(i - 1, j) + 1, (row[j - 1] ?? 0) + 1));
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      if (swapped) row[j] = Math.min(row[j] ?? 0, at(i - 2, j - 2) + 1);
    }
  }
  return at(a.length, b.length);
}
