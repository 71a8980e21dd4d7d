import { BudgetExceeded } from '../base/index.ts';

/** Far beyond the degree of any loop; one element more than the coefficients is needed. */
const LARGEST_DEGREE = 200;
const scratch = new Float64Array(LARGEST_DEGREE + 2);

function refuseDegree(degree: number): void {
  if (degree > LARGEST_DEGREE)
    throw new BudgetExceeded('a Routh test in numbers', `degree ${degree}`);
}

/** A first element within this many roundings of the terms it is the difference of counts as zero: on the boundary. */
const NEAR_ZERO = 16 * Number.EPSILON;

/**
 * Whether all roots of a polynomial lie in the open left half plane, by Routh's test, without allocating.
 *
 * `coefficients[offset]` … `[offset + degree]` are its coefficients, highest power first. Leading coefficients that
 * are exactly 0 are dropped (the degree falls); a first element of the array that is zero to rounding counts as not
 * stable, since it lies on the boundary. A constant other than 0 has no roots and is stable; NaN is not.
 *
 * Source: F. R. Gantmacher, The Theory of Matrices, vol. 2, 1959, chapter XV, section 3 (Routh's scheme).
 */
export function isHurwitz(coefficients: Float64Array, offset: number, degree: number): boolean {
  refuseDegree(degree);
  for (let k = 0; k <= degree; k++) scratch[k] = coefficients[offset + k]!;
  return isScratchHurwitz(degree);
}

/**
 * The verdicts of {@link isHurwitz} on `count` polynomials: 1 stable, 0 not.
 *
 * `coefficients[k]` holds coefficient k (0 the highest power) of all polynomials, or one number where they share it, as
 * `Tape.evaluateBatch` returns them. A 400 × 400 grid at degree 6 takes a few milliseconds.
 */
export function hurwitzVerdicts(
  coefficients: readonly (Float64Array | number)[],
  count: number,
): Uint8Array {
  const degree = coefficients.length - 1;
  refuseDegree(degree);
  const columns = coefficients.map((column) =>
    typeof column === 'number' ? new Float64Array(count).fill(column) : column,
  );
  const verdicts = new Uint8Array(count);
  for (let i = 0; i < count; i++) {
    for (let k = 0; k <= degree; k++) scratch[k] = columns[k]![i]!;
    verdicts[i] = isScratchHurwitz(degree) ? 1 : 0;
  }
  return verdicts;
}

/**
 * Routh's scheme in place. Before step k, c[k], c[k+2], … is one row and c[k+1], c[k+3], … the next; the row after
 * them, c[k+2] − (c[k]/c[k+1]) c[k+3], …, overwrites the first from c[k+2] on.
 *
 *     c[k]    c[k+2]   c[k+4]          c[k+1]  c[k+3]  c[k+5]
 *     c[k+1]  c[k+3]   c[k+5]    →     c[k+2]' c[k+4]' …
 */
function isScratchHurwitz(degree: number): boolean {
  const c = scratch;
  let first = 0;
  while (first <= degree && c[first] === 0) first++;
  if (first > degree) return false;
  const isPositive = c[first]! > 0;
  c[degree + 1] = 0;
  for (let k = first; k < degree; k++) {
    const pivot = c[k + 1]!;
    // Written so that NaN fails too.
    if (!(isPositive ? pivot > 0 : pivot < 0)) return false;
    const quotient = c[k]! / pivot;
    if (k + 2 > degree) continue;
    const lost = quotient * c[k + 3 > degree ? degree + 1 : k + 3]!;
    const rest = c[k + 2]! - lost;
    if (Math.abs(rest) <= NEAR_ZERO * Math.abs(lost)) return false;
    c[k + 2] = rest;
    for (let j = k + 4; j <= degree; j += 2) c[j] = c[j]! - quotient * (j < degree ? c[j + 1]! : 0);
  }
  return !Number.isNaN(c[first]!);
}
