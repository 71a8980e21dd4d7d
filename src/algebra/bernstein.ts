import { spend, type Budget } from '../base/index.ts';
import { integerGcd } from './integer.ts';
import { coefficientsIn, constantValue, isZeroPolynomial } from './polynomial.ts';
import { subRational, type Rational } from './rational.ts';
import type { Generator, Polynomial } from './ring.ts';
import type { Sign } from './sign.ts';

/** A closed range of values, low < high. */
export interface Range {
  readonly low: Rational;
  readonly high: Rational;
}

/**
 * The sign of a polynomial over a box: one that holds everywhere in it (`nonnegative` where it may vanish), `mixed` where
 * it is shown to take both signs, `undecided` otherwise.
 */
export type SignOverBox = Exclude<Sign, 'unknown'> | 'mixed' | 'undecided';

/** Coefficients on a grid of powers, the last axis fastest; up to a positive factor, which no sign depends on. */
interface Tensor {
  readonly degrees: readonly number[];
  readonly values: readonly bigint[];
}

const sizeOf = (degrees: readonly number[]): number => degrees.reduce((n, d) => n * (d + 1), 1);

function tensorOf(p: Polynomial, axes: readonly Generator[], degrees: readonly number[]): bigint[] {
  if (axes.length === 0) return [isZeroPolynomial(p) ? 0n : constantValue(p)];
  const [first, ...others] = axes;
  const parts = coefficientsIn(p, first);
  return Array.from({ length: degrees[0] + 1 }, (_, k) =>
    parts[k]
      ? tensorOf(parts[k], others, degrees.slice(1))
      : new Array<bigint>(sizeOf(degrees.slice(1))).fill(0n),
  ).flat();
}

/** Every line of the grid along an axis replaced by another of the same length. */
function alongAxis(
  { degrees, values }: Tensor,
  axis: number,
  change: (line: readonly bigint[]) => readonly bigint[],
): Tensor {
  const stride = sizeOf(degrees.slice(axis + 1));
  const length = degrees[axis] + 1;
  const changed = [...values];
  for (let start = 0; start < values.length; start += 1) {
    if (Math.floor(start / stride) % length !== 0) continue;
    const line = Array.from({ length }, (_, k) => values[start + k * stride]);
    change(line).forEach((value, k) => (changed[start + k * stride] = value));
  }
  return { degrees, values: changed };
}

/** Σ aₖ xᵏ at x = low + (high − low) t as a polynomial in t, by Horner's rule, times the denominators. */
function overUnitRange(line: readonly bigint[], { low, high }: Range): readonly bigint[] {
  const width = subRational(high, low);
  const scale = low.d * width.d;
  const [offset, slope] = [low.n * width.d, width.n * low.d];
  let power = 1n;
  let result: bigint[] = [];
  for (const a of [...line].reverse()) {
    const next = new Array<bigint>(result.length + 1).fill(0n);
    result.forEach((c, k) => {
      next[k] += c * offset;
      next[k + 1] += c * slope;
    });
    next[0] += a * power;
    power *= scale;
    result = next;
  }
  return result;
}

function binomials(n: number): bigint[] {
  const row = [1n];
  for (let k = 1; k <= n; k += 1) row.push((row[k - 1] * BigInt(n - k + 1)) / BigInt(k));
  return row;
}

/** bᵢ = Σₖ C(i, k)/C(n, k) aₖ, times the least common multiple of the C(n, k). */
function inBernsteinForm(line: readonly bigint[]): readonly bigint[] {
  const n = line.length - 1;
  const all = binomials(n);
  const multiple = all.reduce((m, c) => (m / integerGcd(m, c)) * c, 1n);
  const scaled = line.map((a, k) => (a * multiple) / all[k]);
  return line.map((_, i) => binomials(i).reduce((sum, c, k) => sum + c * scaled[k], 0n));
}

/** The Bernstein coefficients over the two halves of the range (P. de Casteljau), times 2ⁿ. */
function halves(line: readonly bigint[]): readonly [readonly bigint[], readonly bigint[]] {
  const n = line.length - 1;
  const [left, right]: [bigint[], bigint[]] = [[], new Array<bigint>(n + 1)];
  let row = [...line];
  for (let k = 0; k <= n; k += 1) {
    const scale = 1n << BigInt(n - k);
    left.push(row[0] * scale);
    right[n - k] = row[n - k] * scale;
    row = row.slice(1).map((value, i) => row[i] + value);
  }
  return [left, right];
}

/**
 * What the coefficients alone say: they bound the polynomial, and those at the corners are its values. Where none is
 * negative and no corner is 0, every face of the box holds a positive one, so that the polynomial vanishes nowhere.
 */
function signOfCoefficients({ degrees, values }: Tensor): SignOverBox {
  const corners = values.filter((_, index) => isCorner(index, degrees));
  const vanishes = corners.some((b) => b === 0n);
  if (values.every((b) => b === 0n)) return 'zero';
  if (values.every((b) => b >= 0n)) return vanishes ? 'nonnegative' : 'positive';
  if (values.every((b) => b <= 0n)) return vanishes ? 'nonpositive' : 'negative';
  return corners.some((b) => b > 0n) && corners.some((b) => b < 0n) ? 'mixed' : 'undecided';
}

function isCorner(index: number, degrees: readonly number[]): boolean {
  let rest = index;
  for (const degree of [...degrees].reverse()) {
    const place = rest % (degree + 1);
    if (place !== 0 && place !== degree) return false;
    rest = Math.floor(rest / (degree + 1));
  }
  return true;
}

const isUpper = (sign: SignOverBox): boolean => sign === 'positive' || sign === 'nonnegative';
const isLower = (sign: SignOverBox): boolean => sign === 'negative' || sign === 'nonpositive';

/** The sign over two boxes together. */
function joined(a: SignOverBox, b: SignOverBox): SignOverBox {
  if (a === b || b === 'zero') return a;
  if (a === 'zero') return b;
  if (a === 'mixed' || b === 'mixed') return 'mixed';
  if ((isUpper(a) && isLower(b)) || (isLower(a) && isUpper(b))) return 'mixed';
  if (a === 'undecided' || b === 'undecided') return 'undecided';
  return isUpper(a) ? 'nonnegative' : 'nonpositive';
}

/** Larger grids, and more halvings than this in a row, are left undecided. */
const LARGEST_GRID = 20_000;
const MOST_HALVINGS = 10;

function bisected(tensor: Tensor, depth: number, budget?: Budget): SignOverBox {
  spend(budget, tensor.values.length, 'the sign of a polynomial over a box');
  const direct = signOfCoefficients(tensor);
  if (direct !== 'undecided' || depth === MOST_HALVINGS) return direct;
  const axis = depth % tensor.degrees.length;
  const left = bisected(
    alongAxis(tensor, axis, (line) => halves(line)[0]),
    depth + 1,
    budget,
  );
  if (left === 'mixed' || left === 'undecided') return left;
  const right = bisected(
    alongAxis(tensor, axis, (line) => halves(line)[1]),
    depth + 1,
    budget,
  );
  return joined(left, right);
}

/**
 * The sign of a polynomial for all values of its generators in a box, decided exactly by Bernstein coefficients and
 * bisection. Every generator needs a range; `undecided` without one.
 *
 * Cost: Π (degree + 1) for each box, at most 2¹⁰ boxes. Source: J. Garloff, The Bernstein algorithm, Interval Computations 2
 * (1993), 154–168.
 */
export function signOverBox(
  p: Polynomial,
  rangeOf: (g: Generator) => Range | null,
  budget?: Budget,
): SignOverBox {
  const ranges = p.generators.map(rangeOf);
  const { generators, degrees } = p;
  if (sizeOf(degrees) > LARGEST_GRID) return 'undecided';
  let tensor: Tensor = { degrees, values: tensorOf(p, generators, degrees) };
  for (const [axis, range] of ranges.entries()) {
    if (!range) return 'undecided';
    tensor = alongAxis(tensor, axis, (line) => inBernsteinForm(overUnitRange(line, range)));
  }
  return bisected(tensor, 0, budget);
}
