/**
 * Number of insertions, deletions, replacements and swaps of neighbours between two words (optimal string alignment).
 *
 * Source: F. J. Damerau, "A technique for computer detection and correction of spelling errors", 1964.
 */
export function spellingDistance(a: string, b: string): number {
  let beforePrevious: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, k) => k);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let k = 1; k <= b.length; k++) {
      const replace = previous[k - 1]! + (a[i - 1] === b[k - 1] ? 0 : 1);
      row[k] = Math.min(previous[k]! + 1, row[k - 1]! + 1, replace);
      const isSwap = i > 1 && k > 1 && a[i - 1] === b[k - 2] && a[i - 2] === b[k - 1];
      if (isSwap) row[k] = Math.min(row[k]!, beforePrevious[k - 2]! + 1);
    }
    [beforePrevious, previous] = [previous, row];
  }
  return previous[b.length]!;
}

/** Slips that one can make in a word of this length without its becoming another word. */
function tolerableDistance(length: number): number {
  if (length <= 1) return 0;
  return length <= 4 ? 1 : Math.floor(length / 3);
}

/**
 * The candidate that was most likely meant, or null if none is near: a word that differs only in case counts as one slip.
 */
export function nearestName(name: string, candidates: Iterable<string>): string | null {
  const limit = Math.max(1, tolerableDistance(name.length));
  let nearest: string | null = null;
  let best = limit + 1;
  for (const candidate of candidates) {
    if (candidate === name || Math.abs(candidate.length - name.length) > limit) continue;
    const distance = distanceWithin(name, candidate);
    if (distance < best) [nearest, best] = [candidate, distance];
  }
  return nearest;
}

function distanceWithin(name: string, candidate: string): number {
  if (candidate.toLowerCase() === name.toLowerCase()) return 0.5;
  const shorter = Math.min(name.length, candidate.length);
  const distance = spellingDistance(name, candidate);
  return shorter <= 1 ? Infinity : distance;
}
