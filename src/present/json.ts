import type { Complex } from '../numeric/index.ts';

/** A number for `check --json`: full precision; null where there is none (infinite or undefined). */
export function jsonNumber(x: number): number | null {
  return Number.isFinite(x) ? x : null;
}

/** A complex number for `check --json`: `[re, im]`, a number where the imaginary part is exactly 0, or null. */
export function jsonComplex(z: Complex): number | readonly [number, number] | null {
  if (!Number.isFinite(z.re) || !Number.isFinite(z.im)) return null;
  return z.im === 0 ? z.re : [z.re, z.im];
}

/** Roots for `parts` of `check --json`: `[[re, im], …]`. */
export function jsonRoots(roots: readonly Complex[]): readonly (readonly [number, number])[] {
  return roots.map(({ re, im }) => [re, im]);
}
