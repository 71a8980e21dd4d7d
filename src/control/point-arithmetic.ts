import { coefficientsIn, laplace } from '../algebra/index.ts';
import type { Polynomial, Ratio, ResiduePoint } from '../algebra/index.ts';
import type { LoopRow } from './values.ts';

/** Values at a point; null where there is none. */
export type Values = readonly (number | null)[];

export function areKnown(values: Values): values is readonly number[] {
  return values.every((value) => value !== null);
}

/** Σ aᵢ bᵢ; null where a value is missing. */
export function dotAt(a: Values, b: Values, { field }: ResiduePoint): number | null {
  if (!areKnown(a) || !areKnown(b)) return null;
  return a.reduce((sum, x, i) => field.add(sum, field.mul(x, b[i])), 0);
}

/** The product of values over another one; null where one of them is missing or would be divided by. */
export function quotientAt(
  values: Values,
  divisor: number | null,
  { field }: ResiduePoint,
): number | null {
  if (!areKnown(values) || !divisor) return null;
  return values.reduce((a, b) => field.mul(a, b), field.inverse(divisor));
}

/** The determinant of a square matrix, by elimination. */
function determinantAt(matrix: readonly (readonly number[])[], { field }: ResiduePoint): number {
  const rows = matrix.map((row) => [...row]);
  let product = 1;
  for (let k = 0; k < rows.length; k++) {
    const pivot = rows.findIndex((row, i) => i >= k && row[k] !== 0);
    if (pivot < 0) return 0;
    if (pivot !== k) product = field.sub(0, product);
    [rows[k], rows[pivot]] = [rows[pivot], rows[k]];
    product = field.mul(product, rows[k][k]);
    const inverse = field.inverse(rows[k][k]);
    for (const row of rows.slice(k + 1)) {
      const factor = field.mul(row[k], inverse);
      for (let c = k; c < row.length; c++)
        row[c] = field.sub(row[c], field.mul(factor, rows[k][c]));
    }
  }
  return product;
}

/** The determinant of equations in these signals, as they were written; null at a pole. */
export function determinantOf(
  rows: readonly LoopRow[],
  signals: readonly string[],
  point: ResiduePoint,
): number | null {
  const matrix: (readonly number[])[] = [];
  for (const { coefficients } of rows) {
    const row = signals.map((name) => {
      const coefficient = coefficients.get(name);
      return coefficient ? point.ratio(coefficient) : 0;
    });
    if (!areKnown(row)) return null;
    matrix.push(row);
  }
  return determinantAt(matrix, point);
}

/** A polynomial in s at a point of its other generators: its coefficients in ascending order. */
export type Image = readonly number[];

export function imageOf(p: Polynomial, point: ResiduePoint): Image | null {
  const image = coefficientsIn(p, laplace).map((c) => point.polynomial(c));
  return areKnown(image) ? image : null;
}

export function mulImages(a: Image, b: Image, { field }: ResiduePoint): Image {
  const product = new Array<number>(Math.max(0, a.length + b.length - 1)).fill(0);
  for (const [i, x] of a.entries()) {
    for (const [k, y] of b.entries()) product[i + k] = field.add(product[i + k], field.mul(x, y));
  }
  return product;
}

export function addImages(a: Image, b: Image, { field }: ResiduePoint): Image {
  return Array.from({ length: Math.max(a.length, b.length) }, (_, k) =>
    field.add(a[k] ?? 0, b[k] ?? 0),
  );
}

/** A sum of ratios in s over a common denominator; null where a coefficient has no value. */
export function sumOfImages(
  ratios: readonly Ratio[],
  point: ResiduePoint,
): { readonly num: Image; readonly den: Image } | null {
  let sum: { num: Image; den: Image } = { num: [], den: [1] };
  for (const { num, den } of ratios) {
    const [top, bottom] = [imageOf(num, point), imageOf(den, point)];
    if (!top || !bottom) return null;
    sum = {
      num: addImages(mulImages(sum.num, bottom, point), mulImages(top, sum.den, point), point),
      den: mulImages(sum.den, bottom, point),
    };
  }
  return sum;
}
