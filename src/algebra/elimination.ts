import type { Budget } from '../base/index.ts';
import {
  equalPolynomials,
  isConstantPolynomial,
  isZeroPolynomial,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  subPolynomials,
  termCount,
  zeroPolynomial,
} from './polynomial.ts';
import { quotientOf } from './quotient.ts';
import type { Polynomial } from './ring.ts';

export type PolynomialMatrix = readonly (readonly Polynomial[])[];

/** x = numerators / determinant, row i for the i-th unknown, one column for each right-hand side. */
export interface CramerSolution {
  readonly determinant: Polynomial;
  readonly numerators: PolynomialMatrix;
}

interface Place {
  readonly row: number;
  readonly column: number;
}

const isUnit = (p: Polynomial): boolean =>
  isConstantPolynomial(p) && (p.coefficients[0] === 1n || p.coefficients[0] === -1n);

const mul = (a: Polynomial, b: Polynomial, budget?: Budget): Polynomial =>
  isZeroPolynomial(a) || isZeroPolynomial(b) ? zeroPolynomial : mulPolynomials(a, b, budget);

function without<T>(list: readonly T[], place: number): T[] {
  return list.filter((_, k) => k !== place);
}

function withAt<T>(list: readonly T[], place: number, item: T): T[] {
  return [...list.slice(0, place), item, ...list.slice(place)];
}

/** How many entries of each row and of each column are not zero. */
function counts(m: PolynomialMatrix): { rows: number[]; columns: number[] } {
  const rows = m.map((row) => row.filter((p) => !isZeroPolynomial(p)).length);
  const columns = m.map((_, k) => m.filter((row) => !isZeroPolynomial(row[k])).length);
  return { rows, columns };
}

function cheapest(
  m: PolynomialMatrix,
  costOf: (p: Polynomial, row: number, column: number) => number,
): Place | null {
  let best: Place | null = null;
  let lowest = Infinity;
  m.forEach((entries, row) =>
    entries.forEach((p, column) => {
      if (isZeroPolynomial(p)) return;
      const cost = costOf(p, row, column);
      if (cost < lowest) [best, lowest] = [{ row, column }, cost];
    }),
  );
  return best;
}

/**
 * Solves m x = rhs in Cramer's form without cancelling anything: `determinant` is det m (zero for a singular m, whose
 * numerators then mean nothing). Rows and columns with a single entry and units as pivots are taken out first,
 * which keeps everything a polynomial; what is left is eliminated by Bareiss's method.
 */
export function eliminate(
  m: PolynomialMatrix,
  rhs: PolynomialMatrix,
  budget?: Budget,
): CramerSolution {
  if (m.length === 0) return { determinant: onePolynomial, numerators: [] };
  const { rows, columns } = counts(m);
  if (rows.includes(0) || columns.includes(0)) return singular(rhs);
  const place = cheapest(m, (p, row, column) =>
    columns[column] === 1 || rows[row] === 1
      ? 0
      : isUnit(p)
        ? (rows[row] - 1) * (columns[column] - 1)
        : Infinity,
  );
  if (!place) return eliminateCore(m, rhs, budget);
  const pivot = m[place.row][place.column];
  // Otherwise the pivot is alone in its row: its unknown is known first, and the others follow over the pivot.
  const last = columns[place.column] === 1 || isUnit(pivot);
  const reduced = reduceAt(m, rhs, place, last, budget);
  const rest = eliminate(reduced.m, reduced.rhs, budget);
  if (isZeroPolynomial(rest.determinant)) return singular(rhs);
  return restore(m, rhs, place, rest, last, budget);
}

function singular(rhs: PolynomialMatrix): CramerSolution {
  return { determinant: zeroPolynomial, numerators: rhs };
}

/** The system without the pivot's equation and unknown. */
function reduceAt(
  m: PolynomialMatrix,
  rhs: PolynomialMatrix,
  { row, column }: Place,
  last: boolean,
  budget?: Budget,
): { m: PolynomialMatrix; rhs: PolynomialMatrix } {
  const pivot = m[row][column];
  const step = (target: Polynomial, factor: Polynomial, source: Polynomial): Polynomial => {
    if (isZeroPolynomial(factor)) return target;
    const product = mul(factor, source, budget);
    // A unit is its own inverse.
    return subPolynomials(target, isUnit(pivot) ? mul(pivot, product) : product);
  };
  const scale = last ? onePolynomial : pivot;
  const others = without([...m.keys()], row);
  return {
    m: others.map((i) =>
      without(
        m[i].map((p, k) => step(p, m[i][column], m[row][k])),
        column,
      ),
    ),
    rhs: others.map((i) =>
      rhs[i].map((p, k) => step(mul(p, scale, budget), m[i][column], rhs[row][k])),
    ),
  };
}

/** Puts the pivot's unknown back: x = (rhs − Σ others) / pivot, over the common determinant. */
function restore(
  m: PolynomialMatrix,
  rhs: PolynomialMatrix,
  { row, column }: Place,
  rest: CramerSolution,
  last: boolean,
  budget?: Budget,
): CramerSolution {
  const pivot = m[row][column];
  const sign = (row + column) % 2 === 0;
  const signed = (p: Polynomial): Polynomial => (sign ? p : negPolynomial(p));
  const others = without(m[row], column);
  const own = rhs[row].map((right, k) =>
    others.reduce(
      (sum, p, i) => subPolynomials(sum, mul(p, rest.numerators[i][k], budget)),
      mul(right, rest.determinant, budget),
    ),
  );
  const numerators = last
    ? rest.numerators.map((line) => line.map((p) => signed(mul(p, pivot, budget))))
    : rest.numerators.map((line) => line.map(signed));
  return {
    determinant: signed(mul(pivot, rest.determinant, budget)),
    numerators: withAt(numerators, column, own.map(signed)),
  };
}

/**
 * Fraction-free elimination with the cheapest pivot of each step, then substitution backwards; every division is
 * exact by Sylvester's identity and Cramer's rule.
 *
 * Source: E. H. Bareiss, "Sylvester's identity and multistep integer-preserving Gaussian elimination", Mathematics
 * of Computation 22 (1968), 565–578.
 */
function eliminateCore(
  m: PolynomialMatrix,
  rhs: PolynomialMatrix,
  budget?: Budget,
): CramerSolution {
  const size = m.length;
  const rows = m.map((row, i) => [...row, ...rhs[i]]);
  const unknowns = [...m.keys()];
  let previous = onePolynomial;
  let even = true;
  for (let k = 0; k < size; k += 1) {
    const place = corePivot(rows, k, size);
    if (!place) return singular(rhs);
    even = (place.row !== k) !== (place.column !== k) ? !even : even;
    [rows[k], rows[place.row]] = [rows[place.row], rows[k]];
    swapColumns([...rows, unknowns], k, place.column);
    for (let i = k + 1; i < size; i += 1) {
      rows[i] = eliminateRow(rows[i], rows[k], k, previous, budget);
    }
    previous = rows[k][k];
  }
  const solution = substituteBack(rows, size, budget);
  const signed = (p: Polynomial): Polynomial => (even ? p : negPolynomial(p));
  const numerators: Polynomial[][] = [];
  unknowns.forEach((unknown, k) => (numerators[unknown] = solution[k].map(signed)));
  return { determinant: signed(previous), numerators };
}

function swapColumns(rows: readonly unknown[][], a: number, b: number): void {
  for (const row of rows) [row[a], row[b]] = [row[b], row[a]];
}

/** The pivot with the least work: its size times the entries that elimination with it touches. */
function corePivot(rows: PolynomialMatrix, from: number, size: number): Place | null {
  const active = rows.slice(from).map((row) => row.slice(from, size));
  const { rows: inRow, columns: inColumn } = counts(active);
  const place = cheapest(
    active,
    (p, row, column) => termCount(p) * (1 + (inRow[row] - 1) * (inColumn[column] - 1)),
  );
  return place && { row: place.row + from, column: place.column + from };
}

function eliminateRow(
  row: readonly Polynomial[],
  pivotRow: readonly Polynomial[],
  k: number,
  previous: Polynomial,
  budget?: Budget,
): Polynomial[] {
  const pivot = pivotRow[k];
  const factor = row[k];
  if (isZeroPolynomial(factor) && equalPolynomials(pivot, previous)) return [...row];
  return row.map((p, column) => {
    if (column <= k) return column === k ? zeroPolynomial : p;
    const kept = mul(pivot, p, budget);
    const product = mul(factor, pivotRow[column], budget);
    return quotientOf(subPolynomials(kept, product), previous, budget);
  });
}

/** The numerators over the last pivot, from the last unknown up. */
function substituteBack(rows: PolynomialMatrix, size: number, budget?: Budget): Polynomial[][] {
  const determinant = rows[size - 1][size - 1];
  const columns = rows[0].length - size;
  const solution: Polynomial[][] = Array.from({ length: size }, () => []);
  for (let k = size - 1; k >= 0; k -= 1) {
    for (let column = 0; column < columns; column += 1) {
      let sum = mul(determinant, rows[k][size + column], budget);
      for (let i = k + 1; i < size; i += 1) {
        sum = subPolynomials(sum, mul(rows[k][i], solution[i][column], budget));
      }
      solution[k].push(quotientOf(sum, rows[k][k], budget));
    }
  }
  return solution;
}
