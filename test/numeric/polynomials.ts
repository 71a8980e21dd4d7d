import { randomInteger } from '../../src/numeric/index.ts';
import type { Complex, RandomSource } from '../../src/numeric/index.ts';

/** The product of two polynomials, highest power first. */
export function product(a: readonly number[], b: readonly number[]): number[] {
  const sum = new Array<number>(a.length + b.length - 1).fill(0);
  a.forEach((x, i) => b.forEach((y, k) => (sum[i + k]! += x * y)));
  return sum;
}

/** The monic polynomial with these roots; complex ones stand for their conjugates too. */
export function withRoots(roots: readonly Complex[]): number[] {
  return roots
    .map(({ re, im }) => (im === 0 ? [1, -re] : [1, -2 * re, re * re + im * im]))
    .reduce(product, [1]);
}

/** A polynomial of the degree with integer coefficients from −9 to 9, the first not 0. */
export function integerPolynomial(random: RandomSource, degree: number): number[] {
  const rest = Array.from({ length: degree }, () => randomInteger(random, -9, 9));
  return [randomInteger(random, 1, 9), ...rest];
}
