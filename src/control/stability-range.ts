import {
  addRational,
  algebraicNumber,
  coefficientsIn,
  compareRational,
  evaluatePolynomial,
  isConstantPolynomial,
  isolateRealRoots,
  isZeroPolynomial,
  laplace,
  mulPolynomials,
  onePolynomial,
  rational,
  refineRoot,
  squareFreePart,
  subRational,
} from '../algebra/index.ts';
import type {
  AlgebraicNumber,
  Generator,
  Polynomial,
  Rational,
  RootInterval,
} from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { hurwitzDeterminants } from './hurwitz.ts';
import { countRoots } from './root-count.ts';
import { descendingInS } from './s-polynomial.ts';

/** An open interval of gains; null for an end at infinity. */
export interface GainInterval {
  readonly from: AlgebraicNumber | null;
  readonly to: AlgebraicNumber | null;
}

/**
 * The gains at which a root can cross the imaginary axis: where the leading coefficient vanishes (through infinity), the
 * constant term (through 0), or the determinant Δₙ₋₁ (a pair ±jω; L. Orlando 1911, in Gantmacher, ch. XV, § 7).
 */
function criticalPolynomial(p: Polynomial, budget?: Budget): Polynomial | null {
  const descending = descendingInS(p);
  const degree = descending.length - 1;
  const determinants = hurwitzDeterminants(descending, budget);
  const candidates = [descending[0], descending[degree]];
  if (degree > 1) candidates.push(determinants[Math.min(degree - 1, determinants.length) - 1]);
  if (candidates.some(isZeroPolynomial)) return null;
  return candidates.reduce((product, c) => mulPolynomials(product, c, budget), onePolynomial);
}

function isStableAt(p: Polynomial, gain: Rational): boolean {
  const values = coefficientsIn(p, laplace).map((c) => evaluatePolynomial(c, () => gain));
  const common = values.reduce((d, v) => d * v.d, 1n);
  const integers = values.map((v) => v.n * (common / v.d));
  if (integers.every((c) => c === 0n)) return false;
  const { right, axis } = countRoots(integers);
  return right === 0 && axis === 0;
}

const half = rational(1, 2);

function between(a: Rational, b: Rational): Rational {
  const sum = addRational(a, b);
  return rational(sum.n * half.n, sum.d * half.d);
}

/** One gain inside each of the intervals that the critical gains leave, in order. */
function samplesBetween(roots: readonly RootInterval[]): readonly Rational[] {
  if (roots.length === 0) return [rational(0)];
  const one = rational(1);
  const inner = roots.slice(1).map((root, i) => between(roots[i].high, root.low));
  return [subRational(roots[0].low, one), ...inner, addRational(roots[roots.length - 1].high, one)];
}

/** Isolating intervals made to lie apart, so that there is a rational between any two. */
function apart(critical: Polynomial): readonly RootInterval[] {
  let width = rational(1, 2);
  let roots = isolateRealRoots(critical);
  const touching = (): boolean =>
    roots.some((r, i) => i > 0 && compareRational(roots[i - 1].high, r.low) >= 0);
  while (touching()) {
    roots = roots.map((r) => refineRoot(critical, r, width));
    width = rational(width.n, width.d * 4n);
  }
  return roots;
}

/** A product without its repeated factors, for each of several polynomials; null where one of them is never stable. */
function criticalProduct(
  list: readonly Polynomial[],
  gain: Generator,
  budget?: Budget,
): Polynomial | null {
  let product = onePolynomial;
  for (const p of list) {
    const critical = isZeroPolynomial(p) ? null : criticalPolynomial(p, budget);
    if (!critical) return null;
    product = mulPolynomials(product, critical, budget);
  }
  return isConstantPolynomial(product) ? product : squareFreePart(product, gain, budget);
}

/**
 * The intervals of one gain in which polynomials in s are all stable, all other coefficients being numbers.
 *
 * The polynomials hold no generators but s and the gain. The ends are isolated exactly; between them stability is decided
 * exactly at one rational gain. Empty if there is no stable gain; one interval without ends if all are. A gain at which
 * two intervals touch is not stable, or lowers the degree.
 */
export function stableIntervals(
  list: readonly Polynomial[],
  gain: Generator,
  budget?: Budget,
): readonly GainInterval[] {
  const critical = criticalProduct(list, gain, budget);
  if (!critical) return [];
  const isStable = (sample: Rational): boolean => list.every((p) => isStableAt(p, sample));
  if (isConstantPolynomial(critical)) {
    return isStable(rational(0)) ? [{ from: null, to: null }] : [];
  }
  const roots = apart(critical);
  const ends = roots.map((root) => algebraicNumber(critical, root, budget));
  return samplesBetween(roots).flatMap((sample, i) =>
    isStable(sample) ? [{ from: ends[i - 1] ?? null, to: ends[i] ?? null }] : [],
  );
}
