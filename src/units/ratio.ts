import { invariant } from '../base/index.ts';

/** An exact rational number in lowest terms with a positive denominator. */
export interface Ratio {
  readonly n: bigint;
  readonly d: bigint;
}

/** The exact 1. */
export const ONE: Ratio = ratio(1n);

/** The ratio n/d in lowest terms; d is not 0. */
export function ratio(n: bigint, d = 1n): Ratio {
  invariant(d !== 0n, 'a ratio has a denominator of 0');
  const divisor = greatestCommonDivisor(n < 0n ? -n : n, d < 0n ? -d : d);
  const sign = d < 0n ? -1n : 1n;
  return Object.freeze({ n: (sign * n) / divisor, d: (sign * d) / divisor });
}

function greatestCommonDivisor(a: bigint, b: bigint): bigint {
  while (b !== 0n) [a, b] = [b, a % b];
  return a;
}

/** a + b. */
export function addRatios(a: Ratio, b: Ratio): Ratio {
  return ratio(a.n * b.d + b.n * a.d, a.d * b.d);
}

/** a b. */
export function multiplyRatios(a: Ratio, b: Ratio): Ratio {
  return ratio(a.n * b.n, a.d * b.d);
}

/** The integer power `base`^`exponent`; the base is not 0 where the exponent is negative. */
export function ratioPower(base: Ratio, exponent: number): Ratio {
  const k = BigInt(Math.abs(exponent));
  return exponent < 0 ? ratio(base.d ** k, base.n ** k) : ratio(base.n ** k, base.d ** k);
}

/** The square root of a positive ratio, or null where it is irrational. */
export function ratioRoot(square: Ratio): Ratio | null {
  const n = integerRoot(square.n);
  const d = integerRoot(square.d);
  return n * n === square.n && d * d === square.d ? ratio(n, d) : null;
}

/** ⌊√square⌋ by Newton's iteration from above. */
function integerRoot(square: bigint): bigint {
  let root = 1n << BigInt(Math.ceil(square.toString(2).length / 2));
  for (;;) {
    const next = (root + square / root) / 2n;
    if (next >= root) return root;
    root = next;
  }
}

/** Decimal exponents beyond this are refused: no quantity needs them, and a double cannot hold them. */
const LARGEST_EXPONENT = 300;

/** The exact value of a decimal text (`-1.2e-3`), or null where it is not one or is beyond 1e±300. */
export function decimalRatio(text: string): Ratio | null {
  const match = /^([+\-−]?)(\d*)\.?(\d*)(?:[eE]([+\-−]?\d+))?$/.exec(text.trim());
  const [, sign = '', whole = '', fraction = '', power = '0'] = match ?? [];
  if (!match || whole + fraction === '') return null;
  const exponent = Number(power.replace('−', '-')) - fraction.length;
  if (Math.abs(exponent) > LARGEST_EXPONENT || whole.length > LARGEST_EXPONENT) return null;
  const digits = BigInt(whole + fraction) * (sign === '-' || sign === '−' ? -1n : 1n);
  return multiplyRatios(ratio(digits), ratioPower(ratio(10n), exponent));
}

/** `n` or `n/d`, the text form that units carry. */
export function ratioText(value: Ratio): string {
  return value.d === 1n ? String(value.n) : `${value.n}/${value.d}`;
}

/** Reads what {@link ratioText} wrote. */
export function ratioFromText(text: string): Ratio {
  const [n = '0', d = '1'] = text.split('/');
  return ratio(BigInt(n), BigInt(d));
}

/** The double nearest to a ratio (correctly rounded, except among subnormal numbers). */
export function ratioNumber(value: Ratio): number {
  const magnitude = value.n < 0n ? -value.n : value.n;
  const shift = 66 + bitLength(value.d) - bitLength(magnitude);
  const scaled = shift > 0 ? magnitude << BigInt(shift) : magnitude;
  const divisor = shift < 0 ? value.d << BigInt(-shift) : value.d;
  // A lowest bit that stands for the remainder keeps the one rounding, in Number(), correct.
  const quotient = scaled / divisor;
  const sticky = scaled % divisor === 0n ? quotient : quotient | 1n;
  const half = Math.trunc(shift / 2);
  return Number(value.n < 0n ? -sticky : sticky) * 2 ** -half * 2 ** -(shift - half);
}

function bitLength(value: bigint): number {
  return value.toString(2).length;
}
