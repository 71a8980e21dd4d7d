import { BudgetExceeded } from '../base/index.ts';
import { aberthRoots } from './aberth.ts';
import type { Complex } from './complex.ts';
import { scalePolynomial } from './polynomial-scale.ts';
import { settleRoots } from './root-clusters.ts';

/** Beyond this degree the roots of a polynomial in doubles say little. */
const LARGEST_DEGREE = 60;

/**
 * The roots of a polynomial with real coefficients, highest power first, each as often as its multiplicity.
 *
 * Leading zeros are dropped; a constant has no roots. Complex roots come as exact conjugate pairs, and a cluster that
 * the rounding of the coefficients explains as one multiple root is returned as one value, repeated. Sorted by
 * falling real part, then by falling imaginary part. Where a coefficient is not finite, all roots are NaN. Above
 * degree 60 the budget counts as spent. Cost: about degree² operations times ten, in doubled precision.
 *
 * Source: O. Aberth, Iteration methods for finding all zeros of a polynomial simultaneously, Mathematics of Computation
 * 27 (1973), 339–344; starting points after D. A. Bini, Numerical computation of polynomial zeros by means of Aberth's
 * method, Numerical Algorithms 13 (1996), 179–200.
 *
 * @example polynomialRoots([1, 0, 4]) // [{ re: 0, im: 2 }, { re: 0, im: -2 }]
 */
export function polynomialRoots(coefficients: readonly number[]): Complex[] {
  if (coefficients.length > LARGEST_DEGREE + 1) {
    throw new BudgetExceeded(
      'finding the roots of a polynomial',
      `degree ${coefficients.length - 1}`,
    );
  }
  if (!coefficients.every(Number.isFinite)) {
    return coefficients.slice(1).map(() => ({ re: NaN, im: NaN }));
  }
  if (coefficients.every((coefficient) => coefficient === 0)) return [];
  const { coefficients: scaled, zeros, unit } = scalePolynomial(coefficients);
  const found = settleRoots(scaled, aberthRoots(scaled));
  const roots = found.map(({ re, im }) => ({ re: re * unit + 0, im: im * unit + 0 }));
  for (let i = 0; i < zeros; i++) roots.push({ re: 0, im: 0 });
  return roots.sort((a, b) => b.re - a.re || b.im - a.im);
}

/** A root with its multiplicity. */
export interface MultipleRoot {
  readonly root: Complex;
  readonly multiplicity: number;
}

/**
 * The distinct roots of a product of square-free, pairwise coprime factors with known multiplicities, as an exact
 * square-free factorisation gives them. Each factor is a list of coefficients, highest power first.
 */
export function rootsWithMultiplicity(
  factors: readonly { readonly coefficients: readonly number[]; readonly multiplicity: number }[],
): MultipleRoot[] {
  return factors.flatMap(({ coefficients, multiplicity }) =>
    polynomialRoots(coefficients).map((root) => ({ root, multiplicity })),
  );
}
