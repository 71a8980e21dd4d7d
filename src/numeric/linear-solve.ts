import { invariant, refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import type { Matrix } from './matrix.ts';

/**
 * The solution X of A X = B by elimination with row pivoting; A is square with as many rows as B.
 *
 * Refuses a matrix that is singular to working precision. Cost: n³/3 + n² · columns of B.
 *
 * Source: G. H. Golub, C. F. Van Loan, Matrix Computations, 3rd ed., 1996, section 3.4.
 */
export function solveLinear(a: Matrix, b: Matrix): Matrix | Refusal {
  invariant(a.rows === a.columns && a.rows === b.rows, 'a linear system that is not square');
  const left = { ...a, data: a.data.slice() };
  const right = { ...b, data: b.data.slice() };
  const sizes = rowSizes(left);
  for (let k = 0; k < a.rows; k++) {
    const pivot = pivotRow(left, k);
    if (Math.abs(entry(left, pivot, k)) <= Number.EPSILON * sizes[pivot]!) {
      return refuse('singular-matrix', `the ${a.rows}×${a.rows} matrix is singular to rounding`);
    }
    [sizes[k], sizes[pivot]] = [sizes[pivot]!, sizes[k]!];
    for (const matrix of [left, right]) swapRows(matrix, k, pivot);
    for (let i = k + 1; i < a.rows; i++) {
      const factor = entry(left, i, k) / entry(left, k, k);
      for (const matrix of [left, right]) subtractRow(matrix, i, k, factor);
    }
  }
  backSubstitute(left, right);
  return right;
}

function entry(matrix: Matrix, row: number, column: number): number {
  return matrix.data[row * matrix.columns + column]!;
}

function rowSizes(matrix: Matrix): number[] {
  return Array.from({ length: matrix.rows }, (_, i) =>
    Math.max(...matrix.data.subarray(i * matrix.columns, (i + 1) * matrix.columns).map(Math.abs)),
  );
}

function pivotRow(matrix: Matrix, k: number): number {
  let best = k;
  for (let i = k + 1; i < matrix.rows; i++) {
    if (Math.abs(entry(matrix, i, k)) > Math.abs(entry(matrix, best, k))) best = i;
  }
  return best;
}

function swapRows({ data, columns }: Matrix, i: number, k: number): void {
  if (i === k) return;
  const row = data.slice(i * columns, (i + 1) * columns);
  data.copyWithin(i * columns, k * columns, (k + 1) * columns);
  data.set(row, k * columns);
}

/** Row i less `factor` times row k. */
function subtractRow({ data, columns }: Matrix, i: number, k: number, factor: number): void {
  if (factor === 0) return;
  for (let j = 0; j < columns; j++) {
    data[i * columns + j] = data[i * columns + j]! - factor * data[k * columns + j]!;
  }
}

function backSubstitute(left: Matrix, right: Matrix): void {
  for (let k = left.rows - 1; k >= 0; k--) {
    const row = right.data.subarray(k * right.columns, (k + 1) * right.columns);
    for (let j = 0; j < row.length; j++) row[j] = row[j]! / entry(left, k, k);
    for (let i = 0; i < k; i++) subtractRow(right, i, k, entry(left, i, k));
  }
}
