import { invariant } from '../base/index.ts';
import type { Budget } from '../base/index.ts';
import { evaluatePolynomial } from './evaluation.ts';
import { factorPolynomial } from './factor.ts';
import { constantPolynomial } from './polynomial.ts';
import {
  compareRational,
  divRational,
  isZeroRational,
  mulRational,
  negRational,
  powRational,
  rational,
  rationalToNumber,
  type Rational,
} from './rational.ts';
import {
  addRatios,
  divRatios,
  mulRatios,
  ratioFromPolynomial,
  negRatio,
  ratioFromRational,
  subRatios,
} from './ratio.ts';
import { countRealRoots, refineRoot, univariateCoefficients } from './real-roots.ts';
import type { Polynomial, Ratio } from './ring.ts';
import { sqrtOf } from './square-root.ts';

/** A real algebraic number: the only root of an irreducible polynomial in (low, high], or low = high. */
export interface AlgebraicNumber {
  readonly polynomial: Polynomial;
  readonly low: Rational;
  readonly high: Rational;
}

/** The root of a polynomial in one generator that an isolating interval holds, with its irreducible polynomial. */
export function algebraicNumber(
  p: Polynomial,
  { low, high }: { readonly low: Rational; readonly high: Rational },
  budget?: Budget,
): AlgebraicNumber {
  const { factors } = factorPolynomial(p, budget);
  const owner = factors.find(({ factor }) => holdsRoot(factor, low, high));
  invariant(owner, 'a root that belongs to no factor');
  return Object.freeze({ polynomial: owner.factor, low, high });
}

function holdsRoot(p: Polynomial, low: Rational, high: Rational): boolean {
  if (compareRational(low, high) < 0) return countRealRoots(p, low, high) === 1;
  return isZeroRational(evaluatePolynomial(p, () => low));
}

/** The number written with square roots where it is rational or the root of a quadratic; otherwise null. */
export function exactForm(x: AlgebraicNumber, budget?: Budget): Ratio | null {
  const coefficients = univariateCoefficients(x.polynomial);
  const [c, b, a] = coefficients.map((n) => ratioFromPolynomial(constantPolynomial(n)));
  if (coefficients.length === 2) return negRatio(divRatios(c, b));
  if (coefficients.length !== 3) return null;
  const product = mulRatios(integer(4n), mulRatios(a, c));
  const root = sqrtOf(subRatios(mulRatios(b, b), product), budget);
  // An irreducible polynomial begins with a positive coefficient, so that + gives the larger root.
  const isLarger = countRealRoots(x.polynomial, x.high) === 0;
  const top = isLarger ? subRatios(root, b) : negRatio(addRatios(b, root));
  return divRatios(top, mulRatios(integer(2n), a));
}

const integer = (n: bigint): Ratio => ratioFromRational(rational(n));

/** The nearest double. */
export function algebraicToNumber(x: AlgebraicNumber): number {
  let { low, high } = x;
  for (let bits = 8n; rationalToNumber(low) !== rationalToNumber(high); bits *= 2n) {
    ({ low, high } = narrowed(x, rational(1n, 1n << bits)));
  }
  return rationalToNumber(high);
}

function narrowed(x: AlgebraicNumber, width: Rational): { low: Rational; high: Rational } {
  return refineRoot(x.polynomial, { low: x.low, high: x.high, multiplicity: 1 }, width);
}

/**
 * The number to so many significant decimal digits, rounded up or down: an exact decimal, less than one unit of its last
 * digit away. Cost: one bisection for each binary digit.
 */
export function decimalBound(
  x: AlgebraicNumber,
  digits: number,
  direction: 'up' | 'down',
): Rational {
  const size = Math.abs(algebraicToNumber(x));
  const lastPlace = (size === 0 ? 0 : Math.floor(Math.log10(size))) - digits + 1;
  const unit = powRational(rational(10n), lastPlace);
  const { low, high } = narrowed(x, mulRational(unit, rational(1n, 1000n)));
  const count =
    direction === 'down'
      ? floorOf(divRational(low, unit))
      : -floorOf(negRational(divRational(high, unit)));
  return mulRational(rational(count), unit);
}

function floorOf({ n, d }: Rational): bigint {
  const quotient = n / d;
  return n < 0n && n % d !== 0n ? quotient - 1n : quotient;
}
