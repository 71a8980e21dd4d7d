import {
  addRational,
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
  rationalToNumber,
  refineRoot,
  squareFreePart,
  subRational,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Rational, RootInterval } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { hurwitzDeterminants } from './hurwitz.ts';
import { countRoots } from './root-count.ts';
import { descendingInS } from './s-polynomial.ts';

/** An end of an interval of gains: a real algebraic number between two rationals, equal where it is rational. */
export interface RangeEnd {
  readonly low: Rational;
  readonly high: Rational;
  /** The nearest double. */
  readonly value: number;
}

/** An open interval of gains; null for an end at infinity. */
export interface GainInterval {
  readonly from: RangeEnd | null;
  readonly to: RangeEnd | null;
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

function endOf(critical: Polynomial, root: RootInterval): RangeEnd {
  let interval = root;
  for (
    let bits = 8n;
    rationalToNumber(interval.low) !== rationalToNumber(interval.high);
    bits *= 2n
  ) {
    interval = refineRoot(critical, interval, rational(1n, 1n << bits));
  }
  return { low: interval.low, high: interval.high, value: rationalToNumber(interval.high) };
}

/**
 * The intervals of one gain in which a polynomial in s is stable, all other coefficients being numbers.
 *
 * `p` holds no generators but s and the gain. The ends are isolated exactly; between them stability is decided exactly
 * at one rational gain. Empty if there is no stable gain; one interval without ends if all are. A gain at which two
 * intervals touch is not stable, or lowers the degree.
 */
export function stableIntervals(
  p: Polynomial,
  gain: Generator,
  budget?: Budget,
): readonly GainInterval[] {
  if (isZeroPolynomial(p)) return [];
  const critical = criticalPolynomial(p, budget);
  if (!critical) return [];
  if (isConstantPolynomial(critical)) {
    return isStableAt(p, rational(0)) ? [{ from: null, to: null }] : [];
  }
  const reduced = squareFreePart(critical, gain, budget);
  const roots = apart(reduced);
  const ends = roots.map((root) => endOf(reduced, root));
  return samplesBetween(roots).flatMap((sample, i) =>
    isStableAt(p, sample) ? [{ from: ends[i - 1] ?? null, to: ends[i] ?? null }] : [],
  );
}
