import type { Complex } from '../numeric/index.ts';
import type { DelayTerm } from './dead-time.ts';

/** A sum of terms p(s) e^(−s delay) in numbers; coefficients highest power first. */
export type NumericTerms = readonly DelayTerm<readonly number[], number>[];

/** A function of s in numbers: a quotient of two sums of polynomials with dead times. */
export interface NumericTransfer {
  readonly num: NumericTerms;
  readonly den: NumericTerms;
}

/** A rational function times one dead time: N(s)/D(s) e^(−s delay); coefficients highest power first. */
export interface DelayedRational {
  readonly num: readonly number[];
  readonly den: readonly number[];
  readonly delay: number;
}

function trimmed(coefficients: readonly number[]): readonly number[] {
  const first = coefficients.findIndex((c) => c !== 0);
  return first < 0 ? [] : coefficients.slice(first);
}

function present(terms: NumericTerms): NumericTerms {
  return terms.filter(({ coefficients }) => coefficients.some((c) => c !== 0));
}

/** The transfer function as a rational one with one dead time; null where its dead times stand in several terms. */
export function delayedRational({ num, den }: NumericTransfer): DelayedRational | null {
  const [above, below] = [present(num), present(den)];
  if (above.length > 1 || below.length !== 1) return null;
  const [top, bottom] = [above[0], below[0]];
  return {
    num: top ? trimmed(top.coefficients) : [],
    den: trimmed(bottom.coefficients),
    delay: (top?.delay ?? bottom.delay) - bottom.delay,
  };
}

/** p(jω) = even + jω odd, both polynomials in x = ω², highest power first. */
interface Halves {
  readonly even: readonly number[];
  readonly odd: readonly number[];
}

export function halvesOf(coefficients: readonly number[]): Halves {
  const ascending = [...coefficients].reverse();
  const half = (offset: number): number[] =>
    ascending
      .filter((_, k) => k % 2 === offset)
      .map((c, k) => (k % 2 === 0 ? c : -c))
      .reverse();
  return { even: half(0), odd: half(1) };
}

/** Sum of polynomials, the second times a factor. */
export function addScaled(a: readonly number[], b: readonly number[], factor = 1): number[] {
  const length = Math.max(a.length, b.length);
  return Array.from(
    { length },
    (_, k) => (a[k - length + a.length] ?? 0) + factor * (b[k - length + b.length] ?? 0),
  );
}

export function multiply(a: readonly number[], b: readonly number[]): number[] {
  if (a.length === 0 || b.length === 0) return [];
  const product = new Array<number>(a.length + b.length - 1).fill(0);
  a.forEach((x, i) => b.forEach((y, k) => (product[i + k] += x * y)));
  return product;
}

const timesX = (p: readonly number[]): number[] => (p.length === 0 ? [] : [...p, 0]);

/** |p(jω)|² as a polynomial in ω². */
export function squaredMagnitude(coefficients: readonly number[]): number[] {
  const { even, odd } = halvesOf(coefficients);
  return addScaled(multiply(even, even), timesX(multiply(odd, odd)));
}

/** Im(N(jω) D(−jω))/ω as a polynomial in ω²: its positive roots are where N/D is real. */
export function imaginaryPart(num: readonly number[], den: readonly number[]): number[] {
  const [n, d] = [halvesOf(num), halvesOf(den)];
  return addScaled(multiply(n.odd, d.even), multiply(n.even, d.odd), -1);
}

/** Σ p(jω) e^(−jω delay), with the sum of the sizes of its terms. */
export function sumAt(terms: NumericTerms, w: number): Complex & { readonly size: number } {
  let [re, im, size] = [0, 0, 0];
  for (const { coefficients, delay } of terms) {
    let [x, y, bound] = [0, 0, 0];
    for (const c of coefficients) {
      [x, y] = [c - y * w, x * w];
      bound = bound * w + Math.abs(c);
    }
    const [cos, sin] = [Math.cos(w * delay), Math.sin(w * delay)];
    re += x * cos + y * sin;
    im += y * cos - x * sin;
    size += bound;
  }
  return { re, im, size };
}

/** Values this small against their terms are 0. */
const ROUNDING = 1e-12;

/** The transfer function at s = jω; null at a pole. */
export function transferAt({ num, den }: NumericTransfer, w: number): Complex | null {
  const [top, bottom] = [sumAt(num, w), sumAt(den, w)];
  const square = bottom.re ** 2 + bottom.im ** 2;
  if (Math.sqrt(square) <= ROUNDING * bottom.size) return null;
  return {
    re: (top.re * bottom.re + top.im * bottom.im) / square,
    im: (top.im * bottom.re - top.re * bottom.im) / square,
  };
}

/** The number that a function free of s is. */
export function numberOf({ num, den }: NumericTransfer): number {
  return (num[0]?.coefficients.at(-1) ?? 0) / (den[0]?.coefficients.at(-1) ?? 0);
}
