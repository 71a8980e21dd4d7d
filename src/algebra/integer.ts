import { invariant } from '../base/index.ts';

/** The absolute value of an integer. */
export function absolute(a: bigint): bigint {
  return a < 0n ? -a : a;
}

const SAFE = BigInt(Number.MAX_SAFE_INTEGER);

function smallGcd(a: number, b: number): number {
  while (b !== 0) [a, b] = [b, a % b];
  return a;
}

/** The greatest common divisor of two integers, never negative; Euclid's algorithm, in doubles once both fit. */
export function integerGcd(a: bigint, b: bigint): bigint {
  let x = absolute(a);
  let y = absolute(b);
  while (y > SAFE || x > SAFE) {
    if (y === 0n) return x;
    [x, y] = [y, x % y];
  }
  return BigInt(smallGcd(Number(x), Number(y)));
}

/** The number of bits of |a|; 0 for 0. */
export function bitLength(a: bigint): number {
  const hex = absolute(a).toString(16);
  if (hex === '0') return 0;
  return 4 * hex.length - Math.clz32(parseInt(hex[0], 16)) + 28;
}

/** The work of one product of integers as long as a: 1 for short ones, for long ones by the square of their length. */
export function longWork(a: bigint): number {
  return 1 + Math.floor(bitLength(a) ** 2 / 2 ** 20);
}

/** The largest integer whose square is at most a ≥ 0 (Newton's iteration from above). */
export function integerSquareRoot(a: bigint): bigint {
  invariant(a >= 0n, 'square root of a negative integer');
  if (a < 2n) return a;
  let root = 1n << BigInt((bitLength(a) + 1) >> 1);
  for (;;) {
    const next = (root + a / root) >> 1n;
    if (next >= root) return root;
    root = next;
  }
}

/** a modulo m > 0, in 0 … m − 1. */
export function modulo(a: bigint, m: bigint): bigint {
  const rest = a % m;
  return rest < 0n ? rest + m : rest;
}

/** The inverse of a unit modulo m, by the extended Euclidean algorithm. */
export function inverseOf(a: bigint, m: bigint): bigint {
  let [older, newer] = [m, modulo(a, m)];
  let [olderFactor, newerFactor] = [0n, 1n];
  while (newer > 1n) {
    const quotient = older / newer;
    [older, newer] = [newer, older - quotient * newer];
    [olderFactor, newerFactor] = [newerFactor, olderFactor - quotient * newerFactor];
  }
  return modulo(newerFactor, m);
}
