const MAX_DISTANCE = 2;
const MAX_LENGTH = 64;

/** Edit distance with insertion, deletion, substitution and the swap of two neighbours (Damerau 1964, optimal string
 *  alignment). */
const editDistance = (a: string, b: string): number => {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let d = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) d = Math.min(d, beforeLast[j - 2]! + 1);
      row.push(d);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length]!;
};

/** The candidate most like `word`, for "did you mean"; null if none is near.
 *  A difference of case alone always counts as near; otherwise at most two edits, and fewer than half the word's letters
 *  (one in a word of three), so that short symbols are not taken for one another. Ties go to the earlier candidate. */
export const closest = (word: string, candidates: readonly string[]): string | null => {
  if (word.length === 0 || word.length > MAX_LENGTH) return null;
  const lower = word.toLowerCase();
  const limit = Math.min(MAX_DISTANCE, Math.floor(word.length / 2));
  let best: string | null = null;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (const candidate of candidates) {
    if (candidate === word) return candidate;
    if (Math.abs(candidate.length - word.length) > MAX_DISTANCE) continue;
    const caseless = editDistance(lower, candidate.toLowerCase());
    if (caseless > limit) continue;
    // Of two equally far, the nearer is the one in the word's own case, then the one of its own length.
    const d =
      4 * caseless + (caseless < editDistance(word, candidate) ? 2 : 0) + (candidate.length === word.length ? 0 : 1);
    if (d < bestDistance) {
      best = candidate;
      bestDistance = d;
    }
  }
  return best;
};
