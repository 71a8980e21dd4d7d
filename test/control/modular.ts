/**
 * Numbers a + b ε with ε² = 0 modulo a prime: a second route to the values of exact results, and of their derivatives,
 * that shares no code with the algebra. All of it is the schoolbook's arithmetic on integers.
 */
export interface Dual {
  readonly value: bigint;
  readonly slope: bigint;
}

/** The prime 2^61 − 1. */
export const PRIME = 2n ** 61n - 1n;

const residue = (x: bigint): bigint => ((x % PRIME) + PRIME) % PRIME;

export function dual(value: bigint, slope = 0n): Dual {
  return { value: residue(value), slope: residue(slope) };
}

export const ZERO = dual(0n);
export const ONE = dual(1n);

export function plus(a: Dual, b: Dual): Dual {
  return dual(a.value + b.value, a.slope + b.slope);
}

export function minus(a: Dual, b: Dual): Dual {
  return dual(a.value - b.value, a.slope - b.slope);
}

export function times(a: Dual, b: Dual): Dual {
  return dual(a.value * b.value, a.value * b.slope + a.slope * b.value);
}

function powerOf(base: bigint, exponent: bigint): bigint {
  let result = 1n;
  let square = residue(base);
  for (let rest = exponent; rest > 0n; rest >>= 1n) {
    if (rest & 1n) result = residue(result * square);
    square = residue(square * square);
  }
  return result;
}

/** Thrown where a point meets a pole: the problem says nothing there. */
export class Pole extends Error {}

export function over(a: Dual, b: Dual): Dual {
  if (b.value === 0n) throw new Pole();
  const inverse = powerOf(b.value, PRIME - 2n);
  return times(a, dual(inverse, -b.slope * residue(inverse * inverse)));
}

export function toPower(a: Dual, exponent: number): Dual {
  let result = ONE;
  for (let k = 0; k < Math.abs(exponent); k += 1) result = times(result, a);
  return exponent < 0 ? over(ONE, result) : result;
}

/** The determinant by elimination, values only. */
export function determinantOf(matrix: readonly (readonly bigint[])[]): bigint {
  const rows = matrix.map((row) => [...row]);
  let product = 1n;
  for (let k = 0; k < rows.length; k += 1) {
    const pivot = rows.findIndex((row, i) => i >= k && row[k] !== 0n);
    if (pivot < 0) return 0n;
    if (pivot !== k) product = -product;
    [rows[k], rows[pivot]] = [rows[pivot], rows[k]];
    product = residue(product * rows[k][k]);
    const inverse = powerOf(rows[k][k], PRIME - 2n);
    for (const row of rows.slice(k + 1)) {
      const factor = residue(row[k] * inverse);
      for (let c = k; c < row.length; c += 1) row[c] = residue(row[c] - factor * rows[k][c]);
    }
  }
  return product;
}
