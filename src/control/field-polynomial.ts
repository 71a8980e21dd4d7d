import {
  addRatios,
  coefficientsIn,
  divRatios,
  isZeroRatio,
  laplace,
  mulRatios,
  oneRatio,
  powRatio,
  ratioFromPolynomial,
  ratioOf,
  subRatios,
  sumRatios,
  zeroRatio,
} from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import { invariant } from '../base/index.ts';

/**
 * A polynomial in s with ratios free of s as coefficients, constant term first, without trailing zeros; [] is zero.
 */
export type FieldPolynomial = readonly Ratio[];

function trimmed(p: FieldPolynomial): FieldPolynomial {
  let length = p.length;
  while (length > 0 && isZeroRatio(p[length - 1])) length -= 1;
  return p.slice(0, length);
}

/** A polynomial in s over the field of its other symbols. */
export function overField(p: Polynomial): FieldPolynomial {
  return trimmed(coefficientsIn(p, laplace).map((c) => ratioFromPolynomial(c)));
}

/** The ratio that a polynomial over the field is. */
export function ratioOfField(p: FieldPolynomial): Ratio {
  return sumRatios(p.map((c, k) => mulRatios(c, powRatio(ratioOf(laplace), k))));
}

export function scaleField(p: FieldPolynomial, factor: Ratio): FieldPolynomial {
  return trimmed(p.map((c) => mulRatios(c, factor)));
}

export function subField(a: FieldPolynomial, b: FieldPolynomial): FieldPolynomial {
  const length = Math.max(a.length, b.length);
  return trimmed(Array.from({ length }, (_, k) => subRatios(a[k] ?? zeroRatio, b[k] ?? zeroRatio)));
}

export function mulField(a: FieldPolynomial, b: FieldPolynomial): FieldPolynomial {
  if (a.length === 0 || b.length === 0) return [];
  const product = Array.from({ length: a.length + b.length - 1 }, () => zeroRatio);
  a.forEach((x, i) => {
    b.forEach((y, k) => (product[i + k] = addRatios(product[i + k], mulRatios(x, y))));
  });
  return trimmed(product);
}

/** Quotient and remainder of a by b ≠ 0. */
export function divideField(
  a: FieldPolynomial,
  b: FieldPolynomial,
): { readonly quotient: FieldPolynomial; readonly remainder: FieldPolynomial } {
  const lead = b[b.length - 1];
  let rest = a;
  const quotient: Ratio[] = Array.from(
    { length: Math.max(0, a.length - b.length + 1) },
    () => zeroRatio,
  );
  while (rest.length >= b.length) {
    const shift = rest.length - b.length;
    const factor = divRatios(rest[rest.length - 1], lead);
    quotient[shift] = factor;
    const taken = rest.map((c, i) =>
      i < shift ? c : subRatios(c, mulRatios(factor, b[i - shift])),
    );
    rest = trimmed(taken.slice(0, -1));
  }
  return { quotient: trimmed(quotient), remainder: rest };
}

/** The inverse of a modulo m, for coprime a and m (the extended algorithm of Euclid). */
export function inverseModulo(a: FieldPolynomial, m: FieldPolynomial): FieldPolynomial {
  let [r0, r1] = [m, divideField(a, m).remainder];
  let [t0, t1]: [FieldPolynomial, FieldPolynomial] = [[], [oneRatio]];
  while (r1.length > 1) {
    const { quotient, remainder } = divideField(r0, r1);
    [r0, r1] = [r1, remainder];
    [t0, t1] = [t1, subField(t0, mulField(quotient, t1))];
  }
  invariant(r1.length === 1, 'an inverse modulo a polynomial that is not coprime');
  return scaleField(t1, divRatios(oneRatio, r1[0]));
}

/** A polynomial written in powers of another: digits d₀, d₁, … with p = Σ dₖ baseᵏ, degrees below that of the base. */
export function digitsIn(p: FieldPolynomial, base: FieldPolynomial): readonly FieldPolynomial[] {
  const digits: FieldPolynomial[] = [];
  for (let rest = p; rest.length > 0;) {
    const { quotient, remainder } = divideField(rest, base);
    digits.push(remainder);
    rest = quotient;
  }
  return digits;
}
