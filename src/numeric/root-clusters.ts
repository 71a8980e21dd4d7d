import type { Complex } from './complex.ts';
import { addComplex, divideComplex, magnitude, subtractComplex } from './complex.ts';
import { doubledHornerWithSlope, hornerWithSlope, termSizes } from './horner.ts';

/** Half the gap between 1 and the next double. */
const ROUNDING = Number.EPSILON / 2;
/** Parts below this of a root's magnitude are rounding: real roots have none, roots on the axis no real part. */
const NEGLIGIBLE = 4 * Number.EPSILON;

/**
 * Roots in their final form: clusters that the rounding of the coefficients explains as one multiple root become one
 * value, repeated, and complex roots exact conjugate pairs.
 */
export function settleRoots(coefficients: Float64Array, roots: readonly Complex[]): Complex[] {
  const merged = mergeClusters(coefficients, roots, WIDEST_REACH);
  return conjugatePairs(merged.map(snapToAxes));
}

/** Clusters are looked for from this part of a root's magnitude down to the other. */
const WIDEST_REACH = 0.1;
const NARROWEST_REACH = 1e-8;

/**
 * Merges roots whose uncertainty discs overlap into their centre, where that passes as a multiple root; else it looks
 * again within a shorter reach. A disc's radius is how far the rounding of the coefficients may move a simple root, which
 * inside a cluster is far too much, and so at most `reach` times the root's magnitude.
 */
function mergeClusters(
  coefficients: Float64Array,
  roots: readonly Complex[],
  reach: number,
): Complex[] {
  const radii = roots.map((root) =>
    Math.min(reach * magnitude(root), uncertainty(coefficients, root)),
  );
  return overlapping(roots, radii).flatMap((group) => {
    if (group.length === 1) return group;
    const centre = centreOf(coefficients, group);
    if (isMultipleRoot(coefficients, centre, group.length)) return group.map(() => centre);
    return reach < NARROWEST_REACH ? group : mergeClusters(coefficients, group, reach / 10);
  });
}

/** How far the rounding of the coefficients may move a simple root: n ε Σ|a_k||z|^k / |p'(z)|. */
function uncertainty(coefficients: Float64Array, z: Complex): number {
  const [, slope] = hornerWithSlope(coefficients, z);
  return (
    (2 * coefficients.length * ROUNDING * termSizes(coefficients, magnitude(z))) / magnitude(slope)
  );
}

/** Groups of roots whose discs overlap, directly or through others. */
function overlapping(roots: readonly Complex[], radii: readonly number[]): Complex[][] {
  const groupOf = roots.map((_, i) => i);
  roots.forEach((a, i) => {
    for (let j = 0; j < i; j++) {
      const distance = Math.hypot(a.re - roots[j]!.re, a.im - roots[j]!.im);
      if (distance > radii[i]! + radii[j]!) continue;
      const [old, now] = [groupOf[i]!, groupOf[j]!];
      groupOf.forEach((group, k) => {
        if (group === old) groupOf[k] = now;
      });
    }
  });
  return [...new Set(groupOf)].map((group) => roots.filter((_, i) => groupOf[i] === group));
}

/** The root of p^(m − 1) by m close roots of p: it is simple, and so better known than they are. */
function centreOf(coefficients: Float64Array, group: readonly Complex[]): Complex {
  const derivative = binomialWeighted(coefficients, group.length - 1);
  const sum = group.reduce(addComplex);
  let centre = { re: sum.re / group.length, im: sum.im / group.length };
  for (let round = 0; round < 3; round++) {
    const [value, slope] = doubledHornerWithSlope(derivative, centre);
    centre = subtractComplex(centre, divideComplex(value, slope));
  }
  return centre;
}

/** Whether p, p', … to the order before `multiplicity` vanish at z to within the rounding of the coefficients. */
function isMultipleRoot(coefficients: Float64Array, z: Complex, multiplicity: number): boolean {
  for (let order = 0; order < multiplicity; order++) {
    const derivative = binomialWeighted(coefficients, order);
    const [value] = hornerWithSlope(derivative, z);
    const allowed = 4 * coefficients.length * ROUNDING * termSizes(derivative, magnitude(z));
    if (magnitude(value) > allowed) return false;
  }
  return true;
}

/** Coefficients of p^(order)/order!, highest power first: its value at z is the Taylor coefficient there. */
function binomialWeighted(coefficients: Float64Array, order: number): Float64Array {
  const degree = coefficients.length - 1;
  return coefficients.slice(0, degree - order + 1).map((a, i) => a * binomial(degree - i, order));
}

function binomial(n: number, k: number): number {
  let value = 1;
  for (let i = 1; i <= k; i++) value = (value * (n - k + i)) / i;
  return value;
}

function snapToAxes({ re, im }: Complex): Complex {
  const small = NEGLIGIBLE * Math.hypot(re, im);
  return { re: Math.abs(re) <= small ? 0 : re, im: Math.abs(im) <= small ? 0 : im };
}

/** Pairs each root above the real axis with the nearest mirror image below it; what finds none is real. */
function conjugatePairs(roots: readonly Complex[]): Complex[] {
  const settled = roots.filter((root) => root.im === 0);
  const below = roots.filter((root) => root.im < 0);
  const above = roots.filter((root) => root.im > 0).sort((a, b) => b.im - a.im);
  for (const upper of above) {
    const mirror = nearestMirror(upper, below);
    if (mirror < 0) {
      settled.push({ re: upper.re, im: 0 });
      continue;
    }
    const [lower] = below.splice(mirror, 1);
    const pair = { re: (upper.re + lower!.re) / 2, im: (upper.im - lower!.im) / 2 };
    settled.push(pair, { re: pair.re, im: -pair.im });
  }
  return [...settled, ...below.map((root) => ({ re: root.re, im: 0 }))];
}

function nearestMirror(upper: Complex, below: readonly Complex[]): number {
  const distances = below.map((root) => Math.hypot(root.re - upper.re, root.im + upper.im));
  return distances.indexOf(Math.min(...distances));
}
