import { invariant } from '../base/index.ts';
import type { Complex } from './complex.ts';
import { divideComplex, magnitude, subtractComplex } from './complex.ts';
import { doubledHornerWithSlope, hornerWithSlope, termSizes } from './horner.ts';

/** Rounds of the iteration after which what is not settled is taken as it is; a few dozen are usual. */
const MOST_ROUNDS = 300;

/** How a polynomial is evaluated: value and slope, and the rounding of the value per term, relative to its terms. */
interface Precision {
  readonly evaluate: (coefficients: Float64Array, z: Complex) => readonly [Complex, Complex];
  readonly rounding: number;
}

const SINGLE: Precision = { evaluate: hornerWithSlope, rounding: Number.EPSILON };
const DOUBLED: Precision = { evaluate: doubledHornerWithSlope, rounding: 1e-30 };

/**
 * All roots of a scaled polynomial (see `polynomial-scale.ts`) by Aberth's iteration: first in plain precision, then in
 * doubled precision, so that even close roots of the coefficients as given come out to about full precision.
 */
export function aberthRoots(coefficients: Float64Array): Complex[] {
  const roots = startingPoints(coefficients);
  const reversed = coefficients.toReversed();
  for (const precision of [SINGLE, DOUBLED]) {
    const settled = roots.map(() => false);
    for (let round = 0; round < MOST_ROUNDS && settled.includes(false); round++) {
      for (let i = 0; i < roots.length; i++) {
        if (settled[i]) continue;
        const step = correction(coefficients, reversed, roots, i, precision);
        settled[i] = !step || isNegligible(step, roots[i]!);
        if (step) roots[i] = subtractComplex(roots[i]!, step);
      }
    }
  }
  invariant(
    roots.every((root) => isNearRoot(coefficients, reversed, root)),
    `the roots of a polynomial of degree ${roots.length} did not settle`,
  );
  return roots;
}

/** Whether p(z) is small against its terms: the last guard against an iteration that wandered off. */
function isNearRoot(coefficients: Float64Array, reversed: Float64Array, z: Complex): boolean {
  const [inside, at] =
    magnitude(z) <= 1 ? [coefficients, z] : [reversed, divideComplex({ re: 1, im: 0 }, z)];
  const [value] = hornerWithSlope(inside, at);
  return magnitude(value) <= 1e-9 * termSizes(inside, magnitude(at));
}

/** Aberth's correction of one root; null where its value is all rounding. */
function correction(
  coefficients: Float64Array,
  reversed: Float64Array,
  roots: readonly Complex[],
  i: number,
  precision: Precision,
): Complex | null {
  const newton = newtonCorrection(coefficients, reversed, roots[i]!, precision);
  return newton && aberthStep(newton, repulsion(roots, i));
}

function isNegligible(step: Complex, root: Complex): boolean {
  return magnitude(step) <= (Number.EPSILON / 2) * magnitude(root);
}

/**
 * Starting points on circles whose radii are the slopes of the upper convex hull of (i, log|a_i|), i the power, as
 * many on each as its edge is long (Bini 1996, section 3).
 */
function startingPoints(coefficients: Float64Array): Complex[] {
  const degree = coefficients.length - 1;
  const heights = Array.from(coefficients.toReversed(), (a) => Math.log(Math.abs(a)));
  const corners = upperHull(heights);
  return corners.slice(1).flatMap((to, edge) => {
    const from = corners[edge]!;
    const count = to - from;
    const radius = Math.exp((heights[from]! - heights[to]!) / count);
    return Array.from({ length: count }, (_, k) => {
      // The odd offset 0.7 keeps the start off the real axis, where the iteration would stay.
      const angle = (2 * Math.PI * k) / count + (2 * Math.PI * edge) / degree + 0.7;
      return { re: radius * Math.cos(angle), im: radius * Math.sin(angle) };
    });
  });
}

/** Indices of the corners of the upper convex hull of the points (i, heights[i]). */
function upperHull(heights: readonly number[]): number[] {
  const hull: number[] = [];
  const slope = (a: number, b: number): number => (heights[b]! - heights[a]!) / (b - a);
  heights.forEach((height, i) => {
    if (height === -Infinity) return;
    while (hull.length > 1 && slope(hull.at(-2)!, hull.at(-1)!) <= slope(hull.at(-1)!, i))
      hull.pop();
    hull.push(i);
  });
  return hull;
}

/** p'(z)/p(z), the inverse of Newton's correction; null where z is a root to within the rounding of the evaluation. */
function newtonCorrection(
  coefficients: Float64Array,
  reversed: Float64Array,
  z: Complex,
  precision: Precision,
): Complex | null {
  const square = z.re * z.re + z.im * z.im;
  if (square <= 1) return logarithmicDerivative(coefficients, z, precision);
  // Outside the unit circle p(z) = z^n q(1/z) with q reversed: p'/p = w (n − w q'(w)/q(w)) with w = 1/z.
  const w = { re: z.re / square, im: -z.im / square };
  const inner = logarithmicDerivative(reversed, w, precision);
  if (!inner) return null;
  const re = coefficients.length - 1 - (w.re * inner.re - w.im * inner.im);
  const im = -(w.re * inner.im + w.im * inner.re);
  return { re: w.re * re - w.im * im, im: w.re * im + w.im * re };
}

/** p'(z)/p(z), or null where p(z) is rounding only. */
function logarithmicDerivative(
  coefficients: Float64Array,
  z: Complex,
  { evaluate, rounding }: Precision,
): Complex | null {
  const [value, slope] = evaluate(coefficients, z);
  const bound = rounding * coefficients.length * termSizes(coefficients, magnitude(z));
  const isRounding = magnitude(value) <= bound;
  return isRounding ? null : divideComplex(slope, value);
}

/** Σ 1/(z_i − z_j) over the other roots; roots that coincide do not repel. */
function repulsion(roots: readonly Complex[], i: number): Complex {
  let re = 0;
  let im = 0;
  for (let j = 0; j < roots.length; j++) {
    const dRe = roots[i]!.re - roots[j]!.re;
    const dIm = roots[i]!.im - roots[j]!.im;
    const square = dRe * dRe + dIm * dIm;
    if (j === i || square === 0) continue;
    re += dRe / square;
    im -= dIm / square;
  }
  return { re, im };
}

/** 1/(p'/p − Σ 1/(z_i − z_j)), Aberth's correction; null where the two cancel. */
function aberthStep(newton: Complex, repelled: Complex): Complex | null {
  const step = divideComplex({ re: 1, im: 0 }, subtractComplex(newton, repelled));
  return Number.isFinite(step.re) && Number.isFinite(step.im) ? step : null;
}
