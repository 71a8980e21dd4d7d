import { invariant } from '../base/index.ts';
import { absolute, bitLength, integerGcd } from './integer.ts';

/** An exact number n/d in lowest terms, d > 0. */
export interface Rational {
  readonly n: bigint;
  readonly d: bigint;
}

/** The rational number n/d in lowest terms; a zero `d` is our bug. */
export function rational(n: bigint | number, d: bigint | number = 1n): Rational {
  const top = BigInt(n);
  const bottom = BigInt(d);
  invariant(bottom !== 0n, 'a rational number with denominator zero');
  const common = integerGcd(top, bottom);
  const divisor = bottom < 0n ? -common : common;
  return Object.freeze({ n: top / divisor, d: bottom / divisor });
}

export const oneRational = rational(1n);

const DECIMAL = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,4}))?$/;

/**
 * The exact value of a decimal such as `1.2e-3` or `-480`; `0.1` is 1/10. The exponent has at most four digits.
 * Anything else is our bug: the grammar has already read the number.
 */
export function parseRational(decimal: string): Rational {
  const match = DECIMAL.exec(decimal);
  const [, sign, whole, fraction = '', exponent = '0'] = match ?? ['', '', '', '', '0'];
  invariant(match && whole + fraction !== '', `"${decimal}" is not a decimal number`);
  const digits = BigInt(whole + fraction);
  const power = Number(exponent) - fraction.length;
  const signed = sign === '-' ? -digits : digits;
  return power >= 0
    ? rational(signed * 10n ** BigInt(power))
    : rational(signed, 10n ** BigInt(-power));
}

export function addRational(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d + b.n * a.d, a.d * b.d);
}

export function subRational(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d - b.n * a.d, a.d * b.d);
}

export function mulRational(a: Rational, b: Rational): Rational {
  return rational(a.n * b.n, a.d * b.d);
}

/** a/b; a zero divisor is our bug. */
export function divRational(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d, a.d * b.n);
}

export function negRational(a: Rational): Rational {
  return Object.freeze({ n: -a.n, d: a.d });
}

/** a to an integer power; a negative power of zero is our bug. */
export function powRational(a: Rational, power: number): Rational {
  const k = BigInt(Math.abs(power));
  return power >= 0 ? rational(a.n ** k, a.d ** k) : rational(a.d ** k, a.n ** k);
}

/** −1, 0 or 1 as a is below, equal to or above b. */
export function compareRational(a: Rational, b: Rational): -1 | 0 | 1 {
  const left = a.n * b.d;
  const right = b.n * a.d;
  return left < right ? -1 : left > right ? 1 : 0;
}

export function signRational(a: Rational): -1 | 0 | 1 {
  return a.n < 0n ? -1 : a.n > 0n ? 1 : 0;
}

export function isZeroRational(a: Rational): boolean {
  return a.n === 0n;
}

/** `3/4`, `-2`. */
export function rationalToText(a: Rational): string {
  return a.d === 1n ? `${a.n}` : `${a.n}/${a.d}`;
}

function shifted(a: bigint, bits: number): bigint {
  return bits >= 0 ? a << BigInt(bits) : a;
}

/** floor(log2(n/d)) for positive n and d. */
function binaryExponent(n: bigint, d: bigint): number {
  const guess = bitLength(n) - bitLength(d);
  return shifted(n, -guess) >= shifted(d, guess) ? guess : guess - 1;
}

function roundHalfEven(n: bigint, d: bigint): bigint {
  const floor = n / d;
  const twice = 2n * (n - floor * d);
  const up = twice > d || (twice === d && (floor & 1n) === 1n);
  return up ? floor + 1n : floor;
}

const LOWEST_BIT = -1074;
const HIGHEST_BIT = 1023;

/** The double nearest to a, ties to even, subnormal numbers and overflow to ±Infinity included. */
export function rationalToNumber(a: Rational): number {
  if (a.n === 0n) return 0;
  const magnitude = absolute(a.n);
  const exponent = binaryExponent(magnitude, a.d);
  if (exponent > HIGHEST_BIT) return a.n < 0n ? -Infinity : Infinity;
  const unit = Math.max(exponent - 52, LOWEST_BIT);
  const mantissa = Number(roundHalfEven(shifted(magnitude, -unit), shifted(a.d, unit)));
  const value = mantissa * 2 ** unit;
  return a.n < 0n ? -value : value;
}

/** The exact value of a finite double. */
export function numberToRational(x: number): Rational {
  invariant(Number.isFinite(x), `${x} has no exact value`);
  let mantissa = x;
  let halvings = 0;
  while (!Number.isInteger(mantissa)) {
    mantissa *= 2;
    halvings += 1;
  }
  return rational(BigInt(mantissa), 1n << BigInt(halvings));
}
