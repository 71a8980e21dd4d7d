import type { PrimeField } from './prime-field.ts';
import { trimmed, type PrimePolynomial } from './prime-polynomial.ts';
import type { Generator, Polynomial } from './ring.ts';

/** A value modulo a prime for each generator. */
export type Point = ReadonlyMap<Generator, number>;

/** The value of every term of p at a point, the generator `except` set to 1. */
export function termValues(
  p: Polynomial,
  point: Point,
  field: PrimeField,
  except?: Generator,
): Float64Array {
  const width = p.generators.length;
  const tables = p.generators.map((g, k) =>
    field.powers(g === except ? 1 : (point.get(g) as number), p.degrees[k]),
  );
  return Float64Array.from(p.coefficients, (coefficient, i) => {
    let value = field.reduce(coefficient);
    for (let k = 0; k < width; k += 1) {
      const exponent = p.exponents[i * width + k];
      if (exponent > 0) value = field.mul(value, tables[k][exponent]);
    }
    return value;
  });
}

/** The powers of `main` in the terms of p. */
export function exponentsIn(p: Polynomial, main: Generator): Int32Array {
  const width = p.generators.length;
  const column = p.generators.indexOf(main);
  return Int32Array.from(p.coefficients, (_, i) =>
    column < 0 ? 0 : p.exponents[i * width + column],
  );
}

/** Σ values[i] · main^powers[i]. */
export function gatherPowers(
  values: ArrayLike<number>,
  powers: Int32Array,
  field: PrimeField,
): PrimePolynomial {
  const coefficients: number[] = [];
  for (let i = 0; i < powers.length; i += 1) {
    while (coefficients.length <= powers[i]) coefficients.push(0);
    coefficients[powers[i]] = field.add(coefficients[powers[i]], values[i]);
  }
  return trimmed(coefficients);
}
