import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { inverseOf, longWork, modulo } from './integer.ts';
import type { PrimeField } from './prime-field.ts';
import { bezoutModulo, multiplyModulo, trimmed, type PrimePolynomial } from './prime-polynomial.ts';

/** A univariate polynomial modulo an integer: ascending coefficients in 0 … m − 1, leading zeros allowed. */
type Residues = readonly bigint[];

function add(f: Residues, g: Residues, m: bigint, sign: 1n | -1n = 1n): Residues {
  const length = Math.max(f.length, g.length);
  return Array.from({ length }, (_, k) => modulo((f[k] ?? 0n) + sign * (g[k] ?? 0n), m));
}

function multiply(f: Residues, g: Residues, m: bigint): Residues {
  const product = new Array<bigint>(Math.max(0, f.length + g.length - 1)).fill(0n);
  f.forEach((a, i) => g.forEach((b, k) => (product[i + k] += a * b)));
  return product.map((c) => modulo(c, m));
}

/** Quotient and remainder by a monic divisor. */
function divide(f: Residues, divisor: Residues, m: bigint): { quotient: Residues; rest: Residues } {
  const rest = [...f];
  const quotient: bigint[] = [];
  for (let shift = f.length - divisor.length; shift >= 0; shift -= 1) {
    const factor = modulo(rest[shift + divisor.length - 1], m);
    quotient[shift] = factor;
    divisor.forEach((c, k) => (rest[shift + k] -= factor * c));
  }
  return { quotient, rest: rest.slice(0, divisor.length - 1).map((c) => modulo(c, m)) };
}

interface Split {
  readonly g: Residues;
  readonly h: Residues;
  readonly s: Residues;
  readonly t: Residues;
}

/**
 * From f = g h and s g + t h = 1 modulo m, with h monic, to the same modulo m².
 *
 * Source: J. von zur Gathen, J. Gerhard, Modern Computer Algebra, 3rd ed. (2013), algorithm 15.10.
 */
function henselStep(f: Residues, { g, h, s, t }: Split, m: bigint): Split {
  const error = add(f, multiply(g, h, m), m, -1n);
  const { quotient, rest } = divide(multiply(s, error, m), h, m);
  const nextG = add(g, add(multiply(t, error, m), multiply(quotient, g, m), m), m);
  const nextH = add(h, rest, m);
  const sum = add(multiply(s, nextG, m), multiply(t, nextH, m), m);
  const excess = add(sum, [1n], m, -1n);
  const { quotient: c, rest: d } = divide(multiply(s, excess, m), nextH, m);
  const carried = add(multiply(t, excess, m), multiply(c, nextG, m), m);
  return {
    g: nextG.slice(0, g.length),
    h: nextH,
    s: add(s, d, m, -1n),
    t: add(t, carried, m, -1n).slice(0, g.length),
  };
}

const widen = (f: PrimePolynomial): Residues => f.map(BigInt);

function product(factors: readonly PrimePolynomial[], field: PrimeField): PrimePolynomial {
  return factors.reduce((all, factor) => multiplyModulo(all, factor, field), [1]);
}

/**
 * The monic factors of f modulo a prime, lifted to monic factors modulo the `modulus` = prime^(2^k): f = lc(f) times
 * their product. They are coprime modulo the prime, which does not divide lc(f).
 */
export function liftFactors(
  f: readonly bigint[],
  factors: readonly PrimePolynomial[],
  field: PrimeField,
  modulus: bigint,
  budget?: Budget,
): readonly (readonly bigint[])[] {
  const lead = f[f.length - 1];
  if (factors.length === 1) return [multiply(f, [inverseOf(lead, modulus)], modulus)];
  const middle = factors.length >> 1;
  const [left, right] = [factors.slice(0, middle), factors.slice(middle)];
  const g = multiplyModulo(product(left, field), [field.reduce(lead)], field);
  const h = product(right, field);
  const { s, t } = bezoutModulo(trimmed([...g]), h, field);
  let parts: Split = { g: widen(g), h: widen(h), s: widen(s), t: widen(t) };
  for (let m = BigInt(field.prime) ** 2n; m <= modulus; m *= m) {
    spend(budget, f.length ** 2 * longWork(m), 'factoring a polynomial');
    parts = henselStep(f, parts, m);
  }
  return [
    ...liftFactors(parts.g, left, field, modulus, budget),
    ...liftFactors(parts.h, right, field, modulus, budget),
  ];
}
