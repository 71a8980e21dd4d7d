import { exponentsOf, type Frame } from './frame.ts';
import type { Generator, Polynomial } from './ring.ts';

/** Terms by packed monomial: keys in descending order, distinct, with their coefficients (zeros allowed). */
export interface PackedTerms {
  readonly keys: ArrayLike<number>;
  readonly coefficients: readonly bigint[];
}

function degreesOf(exponents: Int32Array, width: number): number[] {
  const degrees = new Array<number>(width).fill(0);
  for (let at = 0; at < exponents.length;) {
    for (let k = 0; k < width; k += 1, at += 1) {
      if (exponents[at] > degrees[k]) degrees[k] = exponents[at];
    }
  }
  return degrees;
}

function selectColumns(exponents: Int32Array, width: number, kept: readonly number[]): Int32Array {
  const selected = new Int32Array((exponents.length / width) * kept.length);
  for (let row = 0, at = 0; row < exponents.length; row += width) {
    for (const column of kept) selected[at++] = exponents[row + column];
  }
  return selected;
}

/**
 * The polynomial of sorted, distinct terms without zeros, given flat exponents; generators that do not occur
 * are dropped.
 */
export function polynomialOfTerms(
  generators: readonly Generator[],
  exponents: Int32Array,
  coefficients: readonly bigint[],
): Polynomial {
  const width = generators.length;
  const degrees = degreesOf(exponents, width);
  const kept = degrees.flatMap((degree, k) => (degree > 0 ? [k] : []));
  const all = kept.length === width;
  return Object.freeze({
    kind: 'polynomial' as const,
    generators: all ? Object.freeze(generators) : Object.freeze(kept.map((k) => generators[k])),
    exponents: all ? exponents : selectColumns(exponents, width, kept),
    coefficients,
    degrees: all ? degrees : kept.map((k) => degrees[k]),
  });
}

/** The polynomial of packed terms; zero coefficients are dropped. */
export function polynomialOfPacked(terms: PackedTerms, frame: Frame): Polynomial {
  const { keys, coefficients } = terms;
  if (!coefficients.includes(0n)) {
    return polynomialOfTerms(frame.generators, exponentsOf(keys, frame), coefficients);
  }
  const keptKeys: number[] = [];
  const kept = coefficients.filter((coefficient, i) => {
    if (coefficient !== 0n) keptKeys.push(keys[i]);
    return coefficient !== 0n;
  });
  return polynomialOfTerms(frame.generators, exponentsOf(keptKeys, frame), kept);
}

function compareRows(exponents: Int32Array, width: number, a: number, b: number): number {
  for (let k = 0; k < width; k += 1) {
    const difference = exponents[b * width + k] - exponents[a * width + k];
    if (difference !== 0) return difference;
  }
  return 0;
}

/** The polynomial of terms in any order, distinct and without zeros. */
export function polynomialOfUnsortedTerms(
  generators: readonly Generator[],
  exponents: Int32Array,
  coefficients: readonly bigint[],
): Polynomial {
  const width = generators.length;
  const order = coefficients.map((_, i) => i);
  order.sort((a, b) => compareRows(exponents, width, a, b));
  const sorted = new Int32Array(exponents.length);
  order.forEach((from, to) => {
    for (let k = 0; k < width; k += 1) sorted[to * width + k] = exponents[from * width + k];
  });
  return polynomialOfTerms(
    generators,
    sorted,
    order.map((i) => coefficients[i]),
  );
}

/** The union of two lists of packed terms, b's coefficients times `sign`. */
export function mergeTerms(a: PackedTerms, b: PackedTerms, sign: 1 | -1 = 1): PackedTerms {
  const keys: number[] = [];
  const coefficients: bigint[] = [];
  let i = 0;
  let k = 0;
  while (i < a.keys.length || k < b.keys.length) {
    const left = i < a.keys.length ? a.keys[i] : -1;
    const right = k < b.keys.length ? b.keys[k] : -1;
    const key = Math.max(left, right);
    let coefficient = left === key ? a.coefficients[i++] : 0n;
    if (right === key) {
      coefficient =
        sign > 0 ? coefficient + b.coefficients[k++] : coefficient - b.coefficients[k++];
    }
    keys.push(key);
    coefficients.push(coefficient);
  }
  return { keys, coefficients };
}
