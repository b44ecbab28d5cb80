/**
 * The candidate closest to a mistyped word, or undefined when none is close.
 *
 * Distance: optimal string alignment (insert, delete, replace, swap of neighbours), case ignored.
 * Close: at most a third of the longer word, rounded, and never more than three changes.
 * Among equals the earlier candidate wins.
 *
 * Source: Damerau 1964, doi:10.1145/363958.363994 (from memory); threshold: common practice, no source
 */
export function nearest(word: string, candidates: Iterable<string>): string | undefined {
  let best: string | undefined;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (const candidate of candidates) {
    const longer = Math.max(word.length, candidate.length);
    const threshold = Math.min(3, Math.floor((longer + 1) / 3));
    if (Math.abs(word.length - candidate.length) > threshold) continue; // spares the table for far-off words
    const distance = editDistance(word.toLowerCase(), candidate.toLowerCase());
    if (distance <= threshold && distance < bestDistance) {
      best = candidate;
      bestDistance = distance;
    }
  }
  return best;
}

function editDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const change = last[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      let least = Math.min(change, last[j]! + 1, row[j - 1]! + 1);
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      if (swapped) least = Math.min(least, beforeLast[j - 2]! + 1);
      row.push(least);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length]!;
}
