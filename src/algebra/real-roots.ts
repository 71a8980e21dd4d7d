import { invariant, spend } from '../base/index.ts';
import { laplace } from './generator.ts';
import { absolute, bitLength, integerGcd } from './integer.ts';
import {
  constantPolynomial,
  coefficientsIn,
  isZeroPolynomial,
  normalPart,
  polynomialFromCoefficients,
} from './polynomial.ts';
import {
  addRational,
  compareRational,
  mulRational,
  rational,
  rationalToNumber,
  subRational,
  type Rational,
} from './rational.ts';
import type { Polynomial } from './ring.ts';
import { squareFreeFactors } from './square-free.ts';

/** A univariate integer polynomial: its coefficients in ascending order, or a polynomial in one generator. */
export type Univariate = readonly bigint[] | Polynomial;

/** An interval (low, high] that holds exactly one real root of the polynomial; low = high where the root is known. */
export interface RootInterval {
  readonly low: Rational;
  readonly high: Rational;
  readonly multiplicity: number;
}

function ascending(p: Univariate): readonly bigint[] {
  if ('kind' in p) return univariateCoefficients(p);
  const length = p.findLastIndex((c) => c !== 0n) + 1;
  return p.slice(0, length);
}

/** The integer coefficients, ascending, of a polynomial in at most one generator; none for zero. */
export function univariateCoefficients(p: Polynomial): readonly bigint[] {
  invariant(
    p.generators.length <= 1,
    'a polynomial in several generators has no list of coefficients',
  );
  if (isZeroPolynomial(p)) return [];
  if (p.generators.length === 0) return p.coefficients;
  return coefficientsIn(p, p.generators[0]).map((c) => c.coefficients[0] ?? 0n);
}

function polynomialOf(coefficients: readonly bigint[]): Polynomial {
  return polynomialFromCoefficients(coefficients.map(constantPolynomial), laplace);
}

/** The sign of p(x). */
function signAt(p: readonly bigint[], x: Rational): -1 | 0 | 1 {
  let value = 0n;
  let scale = 1n;
  for (let k = p.length - 1; k >= 0; k -= 1) {
    value = value * x.n + p[k] * scale;
    scale *= x.d;
  }
  return value < 0n ? -1 : value > 0n ? 1 : 0;
}

/** A gcd of long integers takes about as many steps as they have bits, each over their whole length. */
function spendOnContent(coefficients: readonly bigint[]): void {
  const bits = coefficients.reduce((most, c) => Math.max(most, bitLength(c)), 0);
  spend(
    undefined,
    coefficients.length * bits * (1 + bits / 2000),
    'a Sturm sequence',
    `${bits} bits`,
  );
}

/** −(a mod b) up to a positive factor, without integer content. */
function negatedRemainder(a: readonly bigint[], b: readonly bigint[]): readonly bigint[] {
  const rest = [...a];
  const lead = absolute(b[b.length - 1]);
  const sign = b[b.length - 1] < 0n ? -1n : 1n;
  for (let shift = a.length - b.length; shift >= 0; shift -= 1) {
    const factor = rest[shift + b.length - 1] * sign;
    for (let k = 0; k < rest.length; k += 1) rest[k] *= lead;
    for (let k = 0; k < b.length; k += 1) rest[shift + k] -= factor * b[k];
  }
  const short = ascending(rest.slice(0, b.length - 1));
  spendOnContent(short);
  const content = short.reduce(integerGcd, 0n);
  return short.map((c) => -c / content);
}

/**
 * The Sturm sequence of p: p, p', and the negated remainders, each up to a positive factor; ascending
 * coefficients.
 *
 * Source: S. Basu, R. Pollack, M.-F. Roy, Algorithms in Real Algebraic Geometry, 2nd ed. (2006), section 2.2.2.
 */
export function sturmSequence(p: Univariate): readonly (readonly bigint[])[] {
  const first = ascending(p);
  invariant(first.length > 0, 'the Sturm sequence of the zero polynomial');
  const sequence = [first];
  let next: readonly bigint[] = first.slice(1).map((c, k) => c * BigInt(k + 1));
  while (next.length > 0) {
    sequence.push(next);
    next = next.length === 1 ? [] : negatedRemainder(sequence[sequence.length - 2], next);
  }
  return sequence;
}

function changes(signs: readonly number[]): number {
  const present = signs.filter((sign) => sign !== 0);
  return present.filter((sign, k) => k > 0 && sign !== present[k - 1]).length;
}

const leadSign = (p: readonly bigint[]): number => (p[p.length - 1] < 0n ? -1 : 1);

/** The sign changes of the sequence at a point, or at ±infinity. */
function variations(
  sequence: readonly (readonly bigint[])[],
  at: Rational | 'minus-infinity' | 'infinity',
): number {
  return changes(
    sequence.map((p) => {
      if (at === 'infinity') return leadSign(p);
      if (at === 'minus-infinity') return p.length % 2 === 1 ? leadSign(p) : -leadSign(p);
      return signAt(p, at);
    }),
  );
}

/** The number of distinct real roots of p ≠ 0 in (from, to], or on the whole line where an end is left out. */
export function countRealRoots(p: Univariate, from?: Rational, to?: Rational): number {
  const sequence = sturmSequence(squareFree(ascending(p)));
  return variations(sequence, from ?? 'minus-infinity') - variations(sequence, to ?? 'infinity');
}

/** A power of two that is larger than the size of every root (Cauchy's bound). */
function rootBound(p: readonly bigint[]): Rational {
  const lead = bitLength(p[p.length - 1]);
  const largest = Math.max(...p.map(bitLength));
  return rational(1n << BigInt(Math.max(1, largest - lead + 2)));
}

const half = rational(1, 2);

function midpoint(low: Rational, high: Rational): Rational {
  return mulRational(addRational(low, high), half);
}

function squareFree(p: readonly bigint[]): readonly bigint[] {
  const parts = decompose(p);
  const product = parts.map(({ coefficients }) => coefficients).reduce(multiply, [1n]);
  return leadSign(p) < 0 ? product.map((c) => -c) : product;
}

function multiply(a: readonly bigint[], b: readonly bigint[]): readonly bigint[] {
  const product = new Array<bigint>(a.length + b.length - 1).fill(0n);
  a.forEach((x, i) => b.forEach((y, k) => (product[i + k] += x * y)));
  return product;
}

function decompose(
  p: readonly bigint[],
): readonly { coefficients: readonly bigint[]; multiplicity: number }[] {
  if (p.length <= 1) return [];
  return squareFreeFactors(normalPart(polynomialOf(p)), laplace).map(
    ({ factor, multiplicity }) => ({
      coefficients: univariateCoefficients(factor),
      multiplicity,
    }),
  );
}

/**
 * Disjoint intervals, ascending, each with exactly one real root of p ≠ 0, and the root's multiplicity: bisection
 * steered by a Sturm sequence.
 */
export function isolateRealRoots(p: Univariate): readonly RootInterval[] {
  const coefficients = ascending(p);
  const parts = decompose(coefficients);
  if (parts.length === 0) return [];
  const whole = squareFree(coefficients);
  const sequence = sturmSequence(whole);
  const bound = rootBound(whole);
  const low = rational(-bound.n);
  const cells = split(sequence, low, bound, variations(sequence, low), variations(sequence, bound));
  return cells.map((cell) => {
    const owner = parts.find((part) => holdsRoot(part.coefficients, cell));
    invariant(owner, 'a root that belongs to no factor');
    return settled(whole, { ...cell, multiplicity: owner.multiplicity });
  });
}

interface Cell {
  readonly low: Rational;
  readonly high: Rational;
}

/** Whether a square-free polynomial with at most one root in (low, high] has it. */
function holdsRoot(p: readonly bigint[], { low, high }: Cell): boolean {
  const sequence = sturmSequence(p);
  return variations(sequence, low) > variations(sequence, high);
}

function split(
  sequence: readonly (readonly bigint[])[],
  low: Rational,
  high: Rational,
  atLow: number,
  atHigh: number,
): readonly Cell[] {
  if (atLow === atHigh) return [];
  if (atLow - atHigh === 1) return [{ low, high }];
  const middle = midpoint(low, high);
  const atMiddle = variations(sequence, middle);
  return [
    ...split(sequence, low, middle, atLow, atMiddle),
    ...split(sequence, middle, high, atMiddle, atHigh),
  ];
}

/** The interval, closed onto the root where the root is its upper end. */
function settled(p: readonly bigint[], interval: RootInterval): RootInterval {
  return signAt(p, interval.high) === 0 ? { ...interval, low: interval.high } : interval;
}

/** The half of an interval that holds the root; p is square-free and changes sign once in it. */
function halve(p: readonly bigint[], interval: RootInterval): RootInterval {
  const middle = midpoint(interval.low, interval.high);
  const sign = signAt(p, middle);
  if (sign === 0) return { ...interval, low: middle, high: middle };
  return sign === signAt(p, interval.high)
    ? { ...interval, high: middle }
    : { ...interval, low: middle };
}

function isKnown({ low, high }: RootInterval): boolean {
  return compareRational(low, high) === 0;
}

/** The interval of a root of p, narrowed until it is no wider than `width` > 0. */
export function refineRoot(p: Univariate, interval: RootInterval, width: Rational): RootInterval {
  const coefficients = squareFree(ascending(p));
  let current = settled(coefficients, interval);
  while (!isKnown(current) && compareRational(subRational(current.high, current.low), width) > 0) {
    current = halve(coefficients, current);
  }
  return current;
}

/** The distinct real roots of p ≠ 0, ascending, each the double nearest to the exact root. */
export function rootsToNumbers(p: Univariate): readonly number[] {
  const coefficients = squareFree(ascending(p));
  return isolateRealRoots(p).map((interval) => {
    let current = interval;
    while (rationalToNumber(current.low) !== rationalToNumber(current.high)) {
      current = halve(coefficients, current);
    }
    return rationalToNumber(current.high);
  });
}
