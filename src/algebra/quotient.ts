import { invariant, spend } from '../base/index.ts';
import type { Budget } from '../base/index.ts';
import { frameOf, keysIn, placesIn } from './frame.ts';
import type { Frame } from './frame.ts';
import {
  coefficientWork,
  degreeIn,
  isConstantPolynomial,
  isZeroPolynomial,
  leadingCoefficientIn,
  mulPolynomials,
  generatorPower,
  subPolynomials,
  termCount,
  zeroPolynomial,
} from './polynomial.ts';
import type { Generator, Polynomial } from './ring.ts';
import { polynomialOfPacked, polynomialOfTerms, type PackedTerms } from './terms.ts';
import { divideWide } from './wide-terms.ts';

/** The products quotient[row] · divisor[column] still to be subtracted, largest monomial on top (a binary heap). */
class ProductHeap {
  private readonly keys: number[] = [];
  private readonly rows: number[] = [];
  private readonly columns: number[] = [];

  get topKey(): number {
    return this.keys.length > 0 ? this.keys[0] : -1;
  }

  push(key: number, row: number, column: number): void {
    let at = this.keys.length;
    while (at > 0) {
      const parent = (at - 1) >> 1;
      if (this.keys[parent] >= key) break;
      this.copy(parent, at);
      at = parent;
    }
    this.place(at, key, row, column);
  }

  pop(): { row: number; column: number } {
    const top = { row: this.rows[0], column: this.columns[0] };
    const key = this.keys.pop() as number;
    const row = this.rows.pop() as number;
    const column = this.columns.pop() as number;
    if (this.keys.length > 0) this.sink(key, row, column);
    return top;
  }

  private sink(key: number, row: number, column: number): void {
    const size = this.keys.length;
    let at = 0;
    for (;;) {
      let child = 2 * at + 1;
      if (child >= size) break;
      if (child + 1 < size && this.keys[child + 1] > this.keys[child]) child += 1;
      if (this.keys[child] <= key) break;
      this.copy(child, at);
      at = child;
    }
    this.place(at, key, row, column);
  }

  private copy(from: number, to: number): void {
    this.place(to, this.keys[from], this.rows[from], this.columns[from]);
  }

  private place(at: number, key: number, row: number, column: number): void {
    this.keys[at] = key;
    this.rows[at] = row;
    this.columns[at] = column;
  }
}

/** The key of monomial `key` / `divisor` where every exponent of the quotient is within 0 … bound, or −1. */
function quotientKey(
  key: number,
  divisor: number,
  weights: readonly number[],
  bounds: readonly number[],
): number {
  let rest = key;
  let divisorRest = divisor;
  for (let k = 0; k < weights.length; k += 1) {
    const exponent = Math.floor(rest / weights[k]);
    const divisorExponent = Math.floor(divisorRest / weights[k]);
    const difference = exponent - divisorExponent;
    if (difference < 0 || difference > bounds[k]) return -1;
    rest -= exponent * weights[k];
    divisorRest -= divisorExponent * weights[k];
  }
  return key - divisor;
}

/**
 * The quotient of packed terms if the division is exact, term by term from the top with a heap of pending products;
 * `work` is spent for each term.
 *
 * Source: M. Monagan, R. Pearce, "Sparse polynomial division using a heap", Journal of Symbolic Computation 46
 * (2011), section 2.
 */
function dividePacked(
  a: PackedTerms,
  b: PackedTerms,
  weights: readonly number[],
  bounds: readonly number[],
  work: number,
  budget?: Budget,
): PackedTerms | null {
  const keys: number[] = [];
  const coefficients: bigint[] = [];
  const heap = new ProductHeap();
  const lead = b.coefficients[0];
  let next = 0;
  for (;;) {
    const key = Math.max(next < a.keys.length ? a.keys[next] : -1, heap.topKey);
    if (key < 0) return { keys, coefficients };
    let rest = next < a.keys.length && a.keys[next] === key ? a.coefficients[next++] : 0n;
    while (heap.topKey === key) {
      const { row, column } = heap.pop();
      rest -= coefficients[row] * b.coefficients[column];
      if (column + 1 < b.keys.length) heap.push(keys[row] + b.keys[column + 1], row, column + 1);
    }
    if (rest === 0n) continue;
    const quotient = quotientKey(key, b.keys[0], weights, bounds);
    if (quotient < 0 || rest % lead !== 0n) return null;
    spend(budget, work, 'an exact division');
    keys.push(quotient);
    coefficients.push(rest / lead);
    if (b.keys.length > 1) heap.push(quotient + b.keys[1], keys.length - 1, 1);
  }
}

/** The degrees that the quotient would have in each generator of a, or null where b has a higher degree. */
function quotientDegrees(a: Polynomial, b: Polynomial): number[] | null {
  if (!b.generators.every((g) => a.generators.includes(g))) return null;
  const degrees = [...a.degrees];
  placesIn(b.generators, a.generators).forEach((place, k) => (degrees[place] -= b.degrees[k]));
  return degrees.every((degree) => degree >= 0) ? degrees : null;
}

/** Whether the last terms allow an exact division: a cheap refutation. */
function lastTermsDivide(a: PackedTerms, b: PackedTerms, frame: Frame, bounds: number[]): boolean {
  const last = a.keys.length - 1;
  const divisorLast = b.keys.length - 1;
  return (
    a.coefficients[last] % b.coefficients[divisorLast] === 0n &&
    quotientKey(a.keys[last], b.keys[divisorLast], frame.weights, bounds) >= 0
  );
}

/** a/b if b divides a in ℤ[generators], otherwise null; b is not zero. */
export function divideExactly(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial | null {
  invariant(!isZeroPolynomial(b), 'a polynomial divided by zero');
  if (isZeroPolynomial(a)) return zeroPolynomial;
  if (isConstantPolynomial(b)) return divideByInteger(a, b.coefficients[0]);
  const bounds = quotientDegrees(a, b);
  if (!bounds) return null;
  const frame = frameOf(a.generators, a.degrees);
  const work = termCount(b) * coefficientWork(a, b);
  if (!frame) return divideWide(a, b, work, budget);
  const dividend = { keys: keysIn(a, frame), coefficients: a.coefficients };
  const divisor = { keys: keysIn(b, frame), coefficients: b.coefficients };
  if (!lastTermsDivide(dividend, divisor, frame, bounds)) return null;
  const quotient = dividePacked(dividend, divisor, frame.weights, bounds, work, budget);
  return quotient && polynomialOfPacked(quotient, frame);
}

function divideByInteger(a: Polynomial, divisor: bigint): Polynomial | null {
  if (divisor === 1n) return a;
  if (a.coefficients.some((coefficient) => coefficient % divisor !== 0n)) return null;
  return Object.freeze({ ...a, coefficients: a.coefficients.map((c) => c / divisor) });
}

/** a/b where the theory says that the division is exact; a remainder is our bug. */
export function quotientOf(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  const quotient = divideExactly(a, b, budget);
  invariant(quotient, 'a division that should have been exact');
  return quotient;
}

/**
 * The pseudo-remainder of a by b in g: lc(b)^(deg a − deg b + 1) · a = q · b + remainder, or a where its degree is
 * lower already.
 *
 * Source: D. E. Knuth, The Art of Computer Programming, vol. 2, 3rd ed. (1997), section 4.6.1, algorithm R.
 */
export function pseudoRemainder(
  a: Polynomial,
  b: Polynomial,
  g: Generator,
  budget?: Budget,
): Polynomial {
  const degree = degreeIn(b, g);
  const lead = leadingCoefficientIn(b, g);
  let rest = a;
  let steps = degreeIn(a, g) - degree + 1;
  if (steps <= 0) return a;
  while (!isZeroPolynomial(rest) && degreeIn(rest, g) >= degree) {
    const head = leadingCoefficientIn(rest, g);
    const shift = generatorPower(g, degreeIn(rest, g) - degree);
    const product = mulPolynomials(mulPolynomials(head, shift), b, budget);
    rest = subPolynomials(mulPolynomials(lead, rest, budget), product);
    steps -= 1;
  }
  for (; steps > 0; steps -= 1) rest = mulPolynomials(lead, rest, budget);
  return rest;
}

/** The smallest power of each generator in p, as a monomial with coefficient 1; p is not zero. */
export function monomialContent(p: Polynomial): Polynomial {
  const width = p.generators.length;
  const lowest = Int32Array.from(p.degrees);
  for (let at = 0; at < p.exponents.length;) {
    for (let k = 0; k < width; k += 1, at += 1) {
      if (p.exponents[at] < lowest[k]) lowest[k] = p.exponents[at];
    }
  }
  return polynomialOfTerms(p.generators, lowest, [1n]);
}
