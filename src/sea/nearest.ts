/**
 * The candidate nearest to a mistyped word, or null where none is near: at most a third of the word's letters, rounded
 * up, and never more than three or all of them may differ.
 */
export function nearestWord(word: string, candidates: Iterable<string>): string | null {
  const limit = Math.min(3, Math.ceil(word.length / 3), word.length - 1);
  let best: string | null = null;
  let bestDistance = limit + 1;
  for (const candidate of candidates) {
    // A length that differs by d needs at least d edits: also keeps hostile words of a megabyte cheap.
    if (Math.abs(candidate.length - word.length) >= bestDistance) continue;
    const distance = editDistance(word.toLowerCase(), candidate.toLowerCase());
    if (distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

/** Insertions, deletions, replacements and swaps of neighbours that turn one word into another (optimal alignment). */
export function editDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const replaced = last[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1);
      row[j] = Math.min(last[j] + 1, row[j - 1] + 1, replaced);
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      if (swapped) row[j] = Math.min(row[j], beforeLast[j - 2] + 1);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length];
}

/** Edit distance falls short for words cut off or prolonged (`wind` for `wind-sea`): one that begins the other counts. */
export function nearestOrPrefix(word: string, candidates: readonly string[]): string | null {
  const lower = word.toLowerCase();
  const begun = candidates.filter(
    (candidate) => lower.length >= 3 && candidate.toLowerCase().startsWith(lower),
  );
  return nearestWord(word, candidates) ?? (begun.length === 1 ? begun[0] : null);
}
