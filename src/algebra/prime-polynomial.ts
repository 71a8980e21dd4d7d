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

/** f − g. */
export function subtractModulo(
  f: PrimePolynomial,
  g: PrimePolynomial,
  field: PrimeField,
): PrimePolynomial {
  const length = Math.max(f.length, g.length);
  return trimmed(Array.from({ length }, (_, k) => field.sub(f[k] ?? 0, g[k] ?? 0)));
}

/** f · g. */
export function multiplyModulo(
  f: PrimePolynomial,
  g: PrimePolynomial,
  field: PrimeField,
): PrimePolynomial {
  if (f.length === 0 || g.length === 0) return [];
  const product = new Array<number>(f.length + g.length - 1).fill(0);
  f.forEach((a, i) =>
    g.forEach((b, k) => (product[i + k] = field.add(product[i + k], field.mul(a, b)))),
  );
  return product;
}

/** f to a power, reduced by `modulus`. */
export function powerModulo(
  f: PrimePolynomial,
  exponent: bigint,
  modulus: PrimePolynomial,
  field: PrimeField,
): PrimePolynomial {
  const times = (a: PrimePolynomial, b: PrimePolynomial): PrimePolynomial =>
    divideModulo(multiplyModulo(a, b, field), modulus, field).remainder;
  let result: PrimePolynomial = [1];
  for (const bit of exponent.toString(2)) {
    result = times(result, result);
    if (bit === '1') result = times(result, f);
  }
  return result;
}

/** s and t with s f + t g = 1, deg s < deg g and deg t < deg f, for coprime f and g. */
export function bezoutModulo(
  f: PrimePolynomial,
  g: PrimePolynomial,
  field: PrimeField,
): { s: PrimePolynomial; t: PrimePolynomial } {
  let [a, b] = [f, g];
  let [sa, sb]: PrimePolynomial[] = [[1], []];
  let [ta, tb]: PrimePolynomial[] = [[], [1]];
  while (b.length > 0) {
    const { quotient, remainder } = divideModulo(a, b, field);
    [a, b] = [b, remainder];
    [sa, sb] = [sb, subtractModulo(sa, multiplyModulo(quotient, sb, field), field)];
    [ta, tb] = [tb, subtractModulo(ta, multiplyModulo(quotient, tb, field), field)];
  }
  const inverse = field.inverse(a[0]);
  const scaled = (p: PrimePolynomial): PrimePolynomial => p.map((c) => field.mul(c, inverse));
  return { s: scaled(sa), t: scaled(ta) };
}
