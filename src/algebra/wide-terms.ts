import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { placesIn, unionOfGenerators } from './frame.ts';
import type { Generator, Polynomial } from './ring.ts';
import { polynomialOfTerms, polynomialOfUnsortedTerms } from './terms.ts';

/*
 * The operations for polynomials whose monomials do not fit a packed key (many generators of high degree): on rows of
 * exponents. Slower by a factor, but the cost still goes with the number of terms and not with the degrees.
 */

/** How much more a term costs here than with a packed key. */
export function wideWork(p: Polynomial): number {
  return 2 + p.generators.length;
}

/** The exponents of p over a list of generators that contains its own. */
function rowsIn(p: Polynomial, generators: readonly Generator[]): Int32Array {
  const width = p.generators.length;
  const places = placesIn(p.generators, generators);
  const rows = new Int32Array(p.coefficients.length * generators.length);
  for (let i = 0; i < p.coefficients.length; i += 1) {
    for (let k = 0; k < width; k += 1) {
      rows[i * generators.length + places[k]] = p.exponents[i * width + k];
    }
  }
  return rows;
}

function compareRows(a: Int32Array, i: number, b: Int32Array, k: number, width: number): number {
  for (let column = 0; column < width; column += 1) {
    const difference = a[i * width + column] - b[k * width + column];
    if (difference !== 0) return difference;
  }
  return 0;
}

/** a + sign · b, merged row by row. */
export function addWide(a: Polynomial, b: Polynomial, sign: 1n | -1n): Polynomial {
  const generators = unionOfGenerators(a.generators, b.generators);
  const width = generators.length;
  const [left, right] = [rowsIn(a, generators), rowsIn(b, generators)];
  const rows = new Int32Array(left.length + right.length);
  const coefficients: bigint[] = [];
  const take = (from: Int32Array, i: number, coefficient: bigint): void => {
    if (coefficient === 0n) return;
    rows.set(from.subarray(i * width, (i + 1) * width), coefficients.length * width);
    coefficients.push(coefficient);
  };
  let [i, k] = [0, 0];
  while (i < a.coefficients.length && k < b.coefficients.length) {
    const order = compareRows(left, i, right, k, width);
    if (order > 0) take(left, i, a.coefficients[i++]);
    else if (order < 0) take(right, k, sign * b.coefficients[k++]);
    else take(left, i, a.coefficients[i++] + sign * b.coefficients[k++]);
  }
  for (; i < a.coefficients.length; i += 1) take(left, i, a.coefficients[i]);
  for (; k < b.coefficients.length; k += 1) take(right, k, sign * b.coefficients[k]);
  return polynomialOfTerms(generators, rows.slice(0, coefficients.length * width), coefficients);
}

/** a · b, terms gathered by the text of their exponents. */
export function multiplyWide(a: Polynomial, b: Polynomial): Polynomial {
  const generators = unionOfGenerators(a.generators, b.generators);
  const width = generators.length;
  const [left, right] = [rowsIn(a, generators), rowsIn(b, generators)];
  const gathered = new Map<string, { readonly row: Int32Array; coefficient: bigint }>();
  a.coefficients.forEach((x, i) =>
    b.coefficients.forEach((y, k) => {
      const row = left.slice(i * width, (i + 1) * width);
      for (let column = 0; column < width; column += 1) row[column] += right[k * width + column];
      const key = row.join();
      const known = gathered.get(key);
      if (known) known.coefficient += x * y;
      else gathered.set(key, { row, coefficient: x * y });
    }),
  );
  const terms = [...gathered.values()].filter(({ coefficient }) => coefficient !== 0n);
  const rows = new Int32Array(terms.length * width);
  terms.forEach(({ row }, i) => rows.set(row, i * width));
  return polynomialOfUnsortedTerms(
    generators,
    rows,
    terms.map(({ coefficient }) => coefficient),
  );
}

/** The quotient of the first terms, over a's generators, or null where it is none. */
function leadingQuotient(a: Polynomial, b: Polynomial): Polynomial | null {
  if (!b.generators.every((g) => a.generators.includes(g))) return null;
  const exponents = rowsIn(b, a.generators).subarray(0, a.generators.length);
  const row = a.exponents.slice(0, a.generators.length).map((e, k) => e - exponents[k]);
  if (row.some((e) => e < 0) || a.coefficients[0] % b.coefficients[0] !== 0n) return null;
  return polynomialOfTerms(a.generators, row, [a.coefficients[0] / b.coefficients[0]]);
}

/** a/b if b divides a, otherwise null, one term of the quotient at a time; `work` is spent for each. */
export function divideWide(
  a: Polynomial,
  b: Polynomial,
  work: number,
  budget?: Budget,
): Polynomial | null {
  const terms: Polynomial[] = [];
  let rest = a;
  while (rest.coefficients.length > 0) {
    const term = leadingQuotient(rest, b);
    if (!term) return null;
    spend(budget, (work + rest.coefficients.length) * wideWork(a), 'an exact division');
    terms.push(term);
    rest = addWide(rest, multiplyWide(term, b), -1n);
  }
  return sumWide(terms);
}

function sumWide(terms: readonly Polynomial[]): Polynomial {
  if (terms.length === 1) return terms[0];
  const middle = terms.length >> 1;
  return addWide(sumWide(terms.slice(0, middle)), sumWide(terms.slice(middle)), 1n);
}
