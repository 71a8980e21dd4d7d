import {
  addRatios,
  coefficientsIn,
  divRatios,
  isZeroPolynomial,
  isZeroRatio,
  laplace,
  mulRatios,
  negRatio,
  ratioFromPolynomial,
  ratioFromRational,
  rational,
  zeroRatio,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { functionsOfS, isFreeOfS } from './s-polynomial.ts';

/** One term p(s) e^(−s delay) of a characteristic function with dead time. */
export interface DelayTerm<Coefficients, Delay> {
  /** Of s, highest power first. */
  readonly coefficients: Coefficients;
  readonly delay: Delay;
}

/** The dead time T of a function e^(−s T), free of s; null for any other function. */
function deadTimeOf(g: Generator): Ratio | null {
  const argument = g.name === 'exp' && g.args ? g.args[0] : null;
  if (!argument || !isFreeOfS(argument.den) || functionsOfS(argument.num).length > 0) return null;
  const [constant, slope, ...higher] = coefficientsIn(argument.num, laplace);
  if (higher.length > 0 || !isZeroPolynomial(constant) || !slope) return null;
  return negRatio(divRatios(ratioFromPolynomial(slope), ratioFromPolynomial(argument.den)));
}

/**
 * A polynomial in s and dead times as a sum of terms p(s) e^(−s delay); null if it holds other functions of s.
 */
export function delayTerms(
  p: Polynomial,
  delay: Ratio = zeroRatio,
): readonly DelayTerm<Polynomial, Ratio>[] | null {
  const [g] = functionsOfS(p);
  if (!g) return [{ coefficients: p, delay }];
  const deadTime = deadTimeOf(g);
  if (!deadTime || isZeroRatio(deadTime)) return null;
  const terms: DelayTerm<Polynomial, Ratio>[] = [];
  for (const [power, coefficient] of coefficientsIn(p, g).entries()) {
    if (isZeroPolynomial(coefficient)) continue;
    const share = mulRatios(deadTime, ratioFromRational(rational(power)));
    const part = delayTerms(coefficient, addRatios(delay, share));
    if (!part) return null;
    terms.push(...part);
  }
  return terms;
}

type NumberTerm = DelayTerm<readonly number[], number>;

/** Terms with their delays counted from the shortest one, all with the same number of coefficients. */
function normalised(terms: readonly NumberTerm[]): readonly NumberTerm[] {
  const present = terms.filter((t) => t.coefficients.some((c) => c !== 0));
  const shortest = Math.min(...present.map((t) => t.delay));
  const degree = Math.max(...present.map((t) => t.coefficients.length - leadingZeros(t) - 1));
  const sums = new Map<number, number[]>();
  for (const { coefficients, delay } of present) {
    const sum = sums.get(delay - shortest) ?? Array<number>(degree + 1).fill(0);
    for (let k = 0; k <= degree; k++)
      sum[degree - k] += coefficients[coefficients.length - 1 - k] ?? 0;
    sums.set(delay - shortest, sum);
  }
  return [...sums].map(([delay, coefficients]) => ({ coefficients, delay }));
}

function leadingZeros(term: NumberTerm): number {
  return term.coefficients.findIndex((c) => c !== 0);
}

/** Value at jω, the sum of the sizes of its terms, and a bound of its derivative on [0, ω]. */
interface Sample {
  readonly re: number;
  readonly im: number;
  readonly size: number;
  readonly slope: number;
}

function sampleAt(terms: readonly NumberTerm[], w: number): Sample {
  let [re, im, size, slope] = [0, 0, 0, 0];
  for (const { coefficients, delay } of terms) {
    let [x, y, bound, rise] = [0, 0, 0, 0];
    for (const c of coefficients) {
      [x, y] = [c - y * w, x * w];
      rise = rise * w + bound;
      bound = bound * w + Math.abs(c);
    }
    const [cos, sin] = [Math.cos(w * delay), Math.sin(w * delay)];
    re += x * cos + y * sin;
    im += y * cos - x * sin;
    size += bound;
    slope += rise + delay * bound;
  }
  return { re, im, size, slope };
}

/** A frequency above which the leading term outweighs the rest, given what delayed terms take of it. */
function highestFrequency(terms: readonly NumberTerm[], lead: number, degree: number): number {
  for (let w = 1e-9; w < 1e30; w *= 2) {
    if (2 * Math.abs(lead) * w ** degree > 1.02 * sampleAt(terms, w).size) return w;
  }
  return Infinity;
}

/** Values this small against their terms are on the imaginary axis. */
const ON_AXIS = 1e-11;
const MOST_STEPS = 200_000;

/**
 * The change of the argument along jω from 0 to `end`, in steps over which it provably turns by less than 30 degrees;
 * null where a root lies on the axis, 'long' where too many steps would be needed.
 */
function turn(terms: readonly NumberTerm[], end: number): number | null | 'long' {
  let [w, total] = [0, 0];
  let here = sampleAt(terms, 0);
  for (let step = 0; w < end; step++) {
    const value = Math.hypot(here.re, here.im);
    if (value <= ON_AXIS * here.size) return null;
    if (step > MOST_STEPS) return 'long';
    let next = Math.min(end, w + Math.max(w, end * 1e-9));
    while (value < 2 * (next - w) * sampleAt(terms, next).slope) next = w + (next - w) / 2;
    if (next <= w) return null;
    const there = sampleAt(terms, next);
    const cross = here.re * there.im - here.im * there.re;
    total += Math.atan2(cross, here.re * there.re + here.im * there.im);
    [w, here] = [next, there];
  }
  return total;
}

/**
 * Whether a characteristic function Σ p(s) e^(−s delay) has all its roots in the open left half plane.
 *
 * Counts the roots to the right of the imaginary axis by the argument principle along it, in steps bounded by the
 * derivative, up to a frequency above which the leading term dominates. Roots on the axis count as not stable. Returns
 * null where that cannot be decided: delayed terms that weigh as much as the leading one (a neutral equation at or
 * past its limit), values that are not finite, or more steps than allowed (roots very close to the axis).
 * Source: R. Bellman, K. L. Cooke, Differential-Difference Equations, Academic Press, 1963, ch. 12–13 (from memory).
 */
export function isDelayStable(given: readonly NumberTerm[]): boolean | null {
  if (given.some((t) => ![...t.coefficients, t.delay].every(Number.isFinite))) return null;
  if (given.every((t) => t.coefficients.every((c) => c === 0))) return false;
  const terms = normalised(given);
  const lead = terms.find((t) => t.delay === 0)?.coefficients[0] ?? 0;
  const degree = terms[0].coefficients.length - 1;
  if (lead === 0) return false;
  const end = highestFrequency(terms, lead, degree);
  if (!Number.isFinite(end)) return null;
  const turned = turn(terms, end);
  if (turned === 'long') return null;
  if (turned === null) return false;
  const rootsRight = degree / 2 - (turned - restAt(sampleAt(terms, end), lead, degree)) / Math.PI;
  return Math.round(rootsRight) === 0;
}

/** The argument of the value over that of the leading term lead (jω)^degree: what still turns back beyond `end`. */
function restAt({ re, im }: Sample, lead: number, degree: number): number {
  const quarter = ((degree % 4) + (lead < 0 ? 2 : 0)) * (Math.PI / 2);
  const [cos, sin] = [Math.cos(quarter), Math.sin(quarter)];
  return Math.atan2(im * cos - re * sin, re * cos + im * sin);
}
