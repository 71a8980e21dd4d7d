import {
  coefficientsIn,
  constantValue,
  isConstantPolynomial,
  laplace,
  rational,
  rationalToNumber,
} from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import { polynomialRoots } from '../numeric/index.ts';
import type { Complex } from '../numeric/index.ts';
import { countRoots } from './root-count.ts';

/** Where the rightmost roots of a polynomial lie. */
export interface RootPlace {
  readonly side: 'right' | 'axis';
  readonly root: Complex;
}

/** The integer coefficients of a polynomial in s alone, constant term first; null if it holds symbols. */
export function integersInS(p: Polynomial): readonly bigint[] | null {
  const ascending = coefficientsIn(p, laplace);
  return ascending.every(isConstantPolynomial) ? ascending.map(constantValue) : null;
}

const magnitude = (a: bigint): bigint => (a < 0n ? -a : a);

/** Integers as doubles, descending, scaled by the largest so that none overflows. */
export function scaledDescending(ascending: readonly bigint[]): readonly number[] {
  const largest = ascending.reduce((m, c) => (magnitude(c) > m ? magnitude(c) : m), 1n);
  return ascending.map((c) => rationalToNumber(rational(c, largest))).reverse();
}

/**
 * The roots that keep a polynomial with integer coefficients (constant term first) from being stable.
 *
 * Which side they lie on is decided exactly; their place is numeric. Returns null if all lie in the open left half
 * plane, or if there are none.
 */
export function unstablePlace(ascending: readonly bigint[]): RootPlace | null {
  const counts = countRoots(ascending);
  if (counts.right + counts.axis === 0) return null;
  const roots = polynomialRoots(scaledDescending(ascending));
  if (counts.right > 0) return { side: 'right', root: roots[0] };
  const nearest = roots.reduce((a, b) => (Math.abs(b.re) < Math.abs(a.re) ? b : a));
  return { side: 'axis', root: { re: 0, im: nearest.im } };
}

function significant(x: number): string {
  return String(Number(x.toPrecision(3)));
}

/** `s = 0.31 ± 2.2 j`, `s = 2`, `s = ± 3.16 j`. */
export function placeText(root: Complex): string {
  const imaginary = Math.abs(root.im);
  const negligible = imaginary <= 1e-9 * Math.abs(root.re);
  if (imaginary === 0 || negligible) return `s = ${significant(root.re)}`;
  const pair = `± ${significant(imaginary)} j`;
  return root.re === 0 ? `s = ${pair}` : `s = ${significant(root.re)} ${pair}`;
}

/** `a pole at s = 2 in the right half plane`, `poles at s = ± 3.16 j on the imaginary axis`. */
export function describePlace(place: RootPlace): string {
  const where = place.side === 'right' ? 'in the right half plane' : 'on the imaginary axis';
  const noun = placeText(place.root).includes('±') ? 'poles' : 'a pole';
  return `${noun} at ${placeText(place.root)} ${where}`;
}
