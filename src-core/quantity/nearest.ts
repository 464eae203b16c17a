/** Words longer than this are no misspelling of ours. */
const LONGEST = 64;

/**
 * Edit distance in which a transposition of neighbours costs 1, as an insertion, a deletion or a substitution does.
 * Source: Damerau, CACM 7(3), 1964; the restricted form (no edit inside a transposed pair).
 */
export function editDistance(a: string, b: string): number {
  const width = b.length + 1;
  let beforeLast = new Array<number>(width).fill(0);
  let last = Array.from({ length: width }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j < width; j++) {
      const substitution = last[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1);
      let least = Math.min(substitution, last[j] + 1, row[j - 1] + 1);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1])
        least = Math.min(least, beforeLast[j - 2] + 1);
      row.push(least);
    }
    beforeLast = last;
    last = row;
  }
  return last[width - 1];
}

/** The candidate that `word` was probably meant to be; undefined where none is near. Case counts half. */
export function nearest(word: string, candidates: Iterable<string>): string | undefined {
  if (word.length > LONGEST || word.length === 0) return undefined;
  let best: string | undefined;
  let least = Number.POSITIVE_INFINITY;
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - word.length) > Math.max(2, word.length / 3)) continue;
    const distance = editDistance(word.toLowerCase(), candidate.toLowerCase()) + (word === candidate ? 0 : 0.25);
    const allowed = Math.max(1, Math.floor(Math.max(word.length, candidate.length) / 3)) + 0.5;
    if (distance <= allowed && distance < least) {
      least = distance;
      best = candidate;
    }
  }
  return best;
}
