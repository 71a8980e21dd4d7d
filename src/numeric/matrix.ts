import { invariant } from '../base/index.ts';

/** A dense real matrix; `data` holds its rows one after the other. */
export interface Matrix {
  readonly rows: number;
  readonly columns: number;
  readonly data: Float64Array;
}

/** The matrix with the given rows, which are equally long. */
export function matrixOf(rows: readonly (readonly number[])[]): Matrix {
  const columns = rows[0]?.length ?? 0;
  invariant(
    rows.every((row) => row.length === columns),
    'the rows of a matrix differ in length',
  );
  return { rows: rows.length, columns, data: Float64Array.from(rows.flat()) };
}

/** The identity times a number. */
export function scalarMatrix(size: number, diagonal: number): Matrix {
  const data = new Float64Array(size * size);
  for (let i = 0; i < size; i++) data[i * size + i] = diagonal;
  return { rows: size, columns: size, data };
}

/** Σ weights[k] · matrices[k], of equal shapes. */
export function combineMatrices(matrices: readonly Matrix[], weights: readonly number[]): Matrix {
  const { rows, columns } = matrices[0]!;
  const data = new Float64Array(rows * columns);
  matrices.forEach((matrix, k) => {
    invariant(matrix.rows === rows && matrix.columns === columns, 'matrices of different shapes');
    const weight = weights[k]!;
    for (let i = 0; i < data.length; i++) data[i] = data[i]! + weight * matrix.data[i]!;
  });
  return { rows, columns, data };
}

/** The product a b. */
export function multiplyMatrices(a: Matrix, b: Matrix): Matrix {
  invariant(a.columns === b.rows, `a ${a.rows}×${a.columns} matrix times one of ${b.rows} rows`);
  const data = new Float64Array(a.rows * b.columns);
  for (let i = 0; i < a.rows; i++) {
    for (let k = 0; k < a.columns; k++) {
      const factor = a.data[i * a.columns + k]!;
      if (factor === 0) continue;
      for (let j = 0; j < b.columns; j++) {
        const at = i * b.columns + j;
        data[at] = data[at]! + factor * b.data[k * b.columns + j]!;
      }
    }
  }
  return { rows: a.rows, columns: b.columns, data };
}

/** The largest sum of magnitudes in a column. */
export function oneNorm(matrix: Matrix): number {
  const sums = new Float64Array(matrix.columns);
  matrix.data.forEach((value, i) => {
    sums[i % matrix.columns] = sums[i % matrix.columns]! + Math.abs(value);
  });
  return Math.max(0, ...sums);
}
