import { spelledName } from './names.ts';

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
 * Greek letters are compared as they are spelled out, too, and are given in the spelling that is near.
 */
export function nearestName(name: string, candidates: Iterable<string>): string | null {
  const limit = Math.max(1, tolerableDistance(name.length));
  let nearest: string | null = null;
  let best = limit + 1;
  for (const candidate of candidates) {
    if (candidate === name) continue;
    for (const spelling of new Set([candidate, spelledName(candidate)])) {
      const distance = distanceWithin(name, spelling, limit);
      if (distance < best) [nearest, best] = [spelling, distance];
    }
  }
  return nearest;
}

/** The distance between two words, infinite where it is beyond the limit for certain. */
function distanceWithin(name: string, candidate: string, limit: number): number {
  if (Math.abs(candidate.length - name.length) > limit) return Infinity;
  if (candidate.toLowerCase() === name.toLowerCase()) return 0.5;
  if (Math.min(name.length, candidate.length) <= 1) return Infinity;
  return spellingDistance(name, candidate);
}
