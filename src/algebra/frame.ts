import { compareGenerators } from './generator.ts';
import type { Generator, Polynomial } from './ring.ts';

/**
 * A frame packs the exponents of a monomial into one integer below 2^51, a number in mixed radix whose digits are
 * the exponents, the first generator most significant:
 *
 *     key = Σ exponent[k] · weight[k],    weight[k] = Π over later generators of (their degree bound + 1)
 *
 * Comparing keys is then the lexicographic order, and adding keys multiplies monomials, as long as no exponent
 * passes the bound that the frame was made for. Below 2^51 the floor of a quotient of doubles is exact.
 */
export interface Frame {
  readonly generators: readonly Generator[];
  readonly weights: readonly number[];
}

const LIMIT = 2 ** 51;

/** The generators of both lists, in canonical order. */
export function unionOfGenerators(
  a: readonly Generator[],
  b: readonly Generator[],
): readonly Generator[] {
  if (a === b || b.length === 0) return a;
  if (a.length === 0) return b;
  const union: Generator[] = [];
  let i = 0;
  let k = 0;
  while (i < a.length && k < b.length) {
    const order = compareGenerators(a[i], b[k]);
    union.push(order <= 0 ? a[i] : b[k]);
    if (order <= 0) i += 1;
    if (order >= 0) k += 1;
  }
  return union.concat(a.slice(i), b.slice(k));
}

/** The place of each generator of `part` in the ordered list `whole` that contains them. */
export function placesIn(part: readonly Generator[], whole: readonly Generator[]): number[] {
  let place = -1;
  return part.map((g) => {
    do place += 1;
    while (whole[place] !== g);
    return place;
  });
}

function degreesIn(p: Polynomial, generators: readonly Generator[]): number[] {
  const degrees = new Array<number>(generators.length).fill(0);
  placesIn(p.generators, generators).forEach((place, k) => (degrees[place] = p.degrees[k]));
  return degrees;
}

/** The frame for these degree bounds, or null where the keys would not fit. */
export function frameOf(
  generators: readonly Generator[],
  degrees: readonly number[],
): Frame | null {
  const weights = new Array<number>(generators.length);
  let weight = 1;
  for (let k = generators.length - 1; k >= 0; k -= 1) {
    weights[k] = weight;
    weight *= degrees[k] + 1;
    if (weight >= LIMIT) return null;
  }
  return { generators, weights };
}

/** The frame in which the sum of two polynomials fits, or null. */
export function frameForSum(a: Polynomial, b: Polynomial): Frame | null {
  const generators = unionOfGenerators(a.generators, b.generators);
  const other = degreesIn(b, generators);
  return frameOf(
    generators,
    degreesIn(a, generators).map((degree, k) => Math.max(degree, other[k])),
  );
}

/** The frame in which the product of two polynomials fits, or null. */
export function frameForProduct(a: Polynomial, b: Polynomial): Frame | null {
  const generators = unionOfGenerators(a.generators, b.generators);
  const other = degreesIn(b, generators);
  return frameOf(
    generators,
    degreesIn(a, generators).map((degree, k) => degree + other[k]),
  );
}

/** The keys of a polynomial's monomials in a frame, in the order of its terms (descending). */
export function keysIn(p: Polynomial, frame: Frame): Float64Array {
  const width = p.generators.length;
  const weights = placesIn(p.generators, frame.generators).map((place) => frame.weights[place]);
  const keys = new Float64Array(p.coefficients.length);
  for (let i = 0, at = 0; i < keys.length; i += 1) {
    let key = 0;
    for (let k = 0; k < width; k += 1, at += 1) key += p.exponents[at] * weights[k];
    keys[i] = key;
  }
  return keys;
}

/** The exponents of a list of keys, flat. */
export function exponentsOf(keys: ArrayLike<number>, frame: Frame): Int32Array {
  const { weights } = frame;
  const width = weights.length;
  const exponents = new Int32Array(keys.length * width);
  for (let i = 0, at = 0; i < keys.length; i += 1) {
    let rest = keys[i];
    for (let k = 0; k < width; k += 1, at += 1) {
      const exponent = Math.floor(rest / weights[k]);
      exponents[at] = exponent;
      rest -= exponent * weights[k];
    }
  }
  return exponents;
}
