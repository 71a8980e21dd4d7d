import type { Complex } from './complex.ts';
import { DoubleDouble } from './double-double.ts';

/** Rounds of the iteration after which what is not settled is taken as it is; a few dozen are usual. */
const MOST_ROUNDS = 300;

/**
 * All roots of a scaled polynomial (see `polynomial-scale.ts`) by Aberth's iteration. The polynomial is evaluated in
 * doubled precision, so that even close roots of the coefficients as given come out to about full precision.
 */
export function aberthRoots(coefficients: Float64Array): Complex[] {
  const roots = startingPoints(coefficients);
  const settled = roots.map(() => false);
  const reversed = coefficients.toReversed();
  for (let round = 0; round < MOST_ROUNDS && settled.includes(false); round++) {
    for (let i = 0; i < roots.length; i++) {
      if (settled[i]) continue;
      const root = roots[i]!;
      const newton = newtonCorrection(coefficients, reversed, root);
      const step = newton && aberthStep(newton, repulsion(roots, i));
      if (step) roots[i] = { re: root.re - step.re, im: root.im - step.im };
      settled[i] = !step || Math.hypot(step.re, step.im) <= 1e-17 * Math.hypot(root.re, root.im);
    }
  }
  return roots;
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
): Complex | null {
  const square = z.re * z.re + z.im * z.im;
  if (square <= 1) return logarithmicDerivative(coefficients, z);
  // Outside the unit circle p(z) = z^n q(1/z) with q reversed: p'/p = w (n − w q'(w)/q(w)) with w = 1/z.
  const w = { re: z.re / square, im: -z.im / square };
  const inner = logarithmicDerivative(reversed, w);
  if (!inner) return null;
  const re = coefficients.length - 1 - (w.re * inner.re - w.im * inner.im);
  const im = -(w.re * inner.im + w.im * inner.re);
  return { re: w.re * re - w.im * im, im: w.re * im + w.im * re };
}

/** Evaluation in doubled precision is trusted to this part of the sum of the terms' magnitudes. */
const DOUBLED_ROUNDING = 1e-30;

function logarithmicDerivative(coefficients: Float64Array, z: Complex): Complex | null {
  const [value, slope] = hornerWithSlope(coefficients, z);
  const modulus = Math.hypot(z.re, z.im);
  let bound = 0;
  for (const coefficient of coefficients) bound = bound * modulus + Math.abs(coefficient);
  const square = value.re * value.re + value.im * value.im;
  if (Math.sqrt(square) <= DOUBLED_ROUNDING * coefficients.length * bound) return null;
  return {
    re: (slope.re * value.re + slope.im * value.im) / square,
    im: (slope.im * value.re - slope.re * value.im) / square,
  };
}

/** p(z) and p'(z) by Horner's rule in doubled precision, rounded at the end. */
function hornerWithSlope(coefficients: Float64Array, z: Complex): [Complex, Complex] {
  const value = new ComplexAccumulator();
  const slope = new ComplexAccumulator();
  for (const coefficient of coefficients) {
    slope.timesPlus(z, value.re, value.im);
    value.timesPlus(z, new DoubleDouble(coefficient), ZERO);
  }
  return [value.rounded(), slope.rounded()];
}

const ZERO = new DoubleDouble();

/** A complex number in doubled precision that Horner's rule updates in place. */
class ComplexAccumulator {
  re = new DoubleDouble();
  im = new DoubleDouble();
  private nextRe = new DoubleDouble();
  private nextIm = new DoubleDouble();

  /** Becomes itself times z, plus (re, im). */
  timesPlus(z: Complex, re: DoubleDouble, im: DoubleDouble): void {
    const { nextRe, nextIm } = this;
    nextRe.copy(re);
    nextRe.addProduct(this.re, z.re);
    nextRe.addProduct(this.im, -z.im);
    nextIm.copy(im);
    nextIm.addProduct(this.re, z.im);
    nextIm.addProduct(this.im, z.re);
    [this.re, this.nextRe] = [nextRe, this.re];
    [this.im, this.nextIm] = [nextIm, this.im];
  }

  rounded(): Complex {
    return { re: this.re.high + this.re.low, im: this.im.high + this.im.low };
  }
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
  const re = newton.re - repelled.re;
  const im = newton.im - repelled.im;
  const square = re * re + im * im;
  return square === 0 || !Number.isFinite(square) ? null : { re: re / square, im: -im / square };
}
