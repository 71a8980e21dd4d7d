import type { PrimeField } from './prime-field.ts';

/** A univariate polynomial over a prime field: ascending coefficients, the last one not zero. Zero is empty. */
export type PrimePolynomial = readonly number[];

/** Drops leading zeros. */
export function trimmed(coefficients: number[]): PrimePolynomial {
  while (coefficients.length > 0 && coefficients[coefficients.length - 1] === 0) coefficients.pop();
  return coefficients;
}

/** The multiple with leading coefficient 1. */
export function monic(f: PrimePolynomial, field: PrimeField): PrimePolynomial {
  const lead = f[f.length - 1];
  if (f.length === 0 || lead === 1) return f;
  const inverse = field.inverse(lead);
  return f.map((c) => field.mul(c, inverse));
}

/** Quotient and remainder of f by g ≠ 0. */
export function divideModulo(
  f: PrimePolynomial,
  g: PrimePolynomial,
  field: PrimeField,
): { quotient: PrimePolynomial; remainder: PrimePolynomial } {
  const rest = [...f];
  const quotient: number[] = [];
  const inverse = field.inverse(g[g.length - 1]);
  for (let shift = f.length - g.length; shift >= 0; shift -= 1) {
    const factor = field.mul(rest[shift + g.length - 1], inverse);
    quotient[shift] = factor;
    if (factor === 0) continue;
    for (let k = 0; k < g.length; k += 1) {
      rest[shift + k] = field.sub(rest[shift + k], field.mul(factor, g[k]));
    }
  }
  return { quotient: trimmed(quotient), remainder: trimmed(rest.slice(0, g.length - 1)) };
}

/** The monic greatest common divisor; empty if both are zero. */
export function gcdModulo(
  f: PrimePolynomial,
  g: PrimePolynomial,
  field: PrimeField,
): PrimePolynomial {
  let a = f;
  let b = g;
  while (b.length > 0) [a, b] = [b, divideModulo(a, b, field).remainder];
  return monic(a, field);
}
