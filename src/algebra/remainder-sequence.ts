import type { Budget } from '../base/index.ts';
import {
  coefficientsIn,
  degreeIn,
  derivativePolynomial,
  isZeroPolynomial,
  leadingCoefficientIn,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  powPolynomial,
  zeroPolynomial,
} from './polynomial.ts';
import { pseudoRemainder, quotientOf } from './quotient.ts';
import type { Generator, Polynomial } from './ring.ts';

interface Ending {
  /** The last two members of the sequence; `last` is zero, or free of the generator. */
  readonly beforeLast: Polynomial;
  readonly last: Polynomial;
  readonly h: Polynomial;
  readonly sign: 1 | -1;
}

/** h' = lead^delta · h^(1 − delta), which is a polynomial. */
function nextScale(lead: Polynomial, h: Polynomial, delta: number, budget?: Budget): Polynomial {
  if (delta === 0) return h;
  const power = powPolynomial(lead, delta, budget);
  return delta === 1 ? power : quotientOf(power, powPolynomial(h, delta - 1, budget), budget);
}

/**
 * The subresultant sequence of a and b in g (the degree of a not below that of b), run to its end.
 *
 * Source: H. Cohen, A Course in Computational Algebraic Number Theory (1993), algorithm 3.3.7; g and h as there.
 */
function runSequence(a: Polynomial, b: Polynomial, x: Generator, budget?: Budget): Ending {
  let [upper, lower] = [a, b];
  let [g, h] = [onePolynomial, onePolynomial];
  let sign: 1 | -1 = 1;
  while (degreeIn(lower, x) > 0) {
    const delta = degreeIn(upper, x) - degreeIn(lower, x);
    if (degreeIn(upper, x) % 2 === 1 && degreeIn(lower, x) % 2 === 1) sign = sign === 1 ? -1 : 1;
    const rest = pseudoRemainder(upper, lower, x, budget);
    const scale = mulPolynomials(g, powPolynomial(h, delta, budget), budget);
    [upper, lower] = [lower, quotientOf(rest, scale, budget)];
    g = leadingCoefficientIn(upper, x);
    h = nextScale(g, h, delta, budget);
  }
  return { beforeLast: upper, last: lower, h, sign };
}

/** The last non-zero member of the subresultant sequence: similar to the gcd if it contains g. */
export function lastRemainder(
  a: Polynomial,
  b: Polynomial,
  g: Generator,
  budget?: Budget,
): Polynomial {
  const [upper, lower] = degreeIn(a, g) >= degreeIn(b, g) ? [a, b] : [b, a];
  const { beforeLast, last } = runSequence(upper, lower, g, budget);
  return isZeroPolynomial(last) ? beforeLast : last;
}

/**
 * The resultant of a and b in g, the determinant of their Sylvester matrix: zero exactly where they have a common
 * root (or both lose degree).
 */
export function resultant(a: Polynomial, b: Polynomial, g: Generator, budget?: Budget): Polynomial {
  if (isZeroPolynomial(a) || isZeroPolynomial(b)) return zeroPolynomial;
  const [m, n] = [degreeIn(a, g), degreeIn(b, g)];
  const swapSign = m < n && m % 2 === 1 && n % 2 === 1;
  const { beforeLast, last, h, sign } =
    m < n ? runSequence(b, a, g, budget) : runSequence(a, b, g, budget);
  if (isZeroPolynomial(last)) return zeroPolynomial;
  const value = nextScale(last, h, degreeIn(beforeLast, g), budget);
  return sign < 0 !== swapSign ? negPolynomial(value) : value;
}

/**
 * The discriminant of p in g, of degree n ≥ 1: (−1)^(n(n−1)/2) resultant(p, p') / lc(p). It is 1 for degree 1.
 *
 * Source: H. Cohen, A Course in Computational Algebraic Number Theory (1993), definition 3.3.3.
 */
export function discriminant(p: Polynomial, g: Generator, budget?: Budget): Polynomial {
  const degree = degreeIn(p, g);
  if (degree < 1) return zeroPolynomial;
  if (degree === 1) return onePolynomial;
  const full = resultant(p, derivativePolynomial(p, g), g, budget);
  const value = quotientOf(full, coefficientsIn(p, g)[degree], budget);
  return degree % 4 === 2 || degree % 4 === 3 ? negPolynomial(value) : value;
}
