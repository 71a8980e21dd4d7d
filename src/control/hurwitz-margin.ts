/**
 * A signed, continuous measure of stability over a batch of polynomials, for drawing boundaries: positive where all
 * roots lie in the open left half plane, else negative or zero.
 *
 * `coefficients[k]` holds coefficient k (0 the highest power) of all polynomials. The measure is the smallest element
 * of the first column of the Routh array, each divided by the largest size that its terms reach in the batch, so that
 * it is smooth where it crosses zero at the boundary of the stable set. NaN where a coefficient is.
 */
export function hurwitzMargins(coefficients: readonly Float64Array[], count: number): Float64Array {
  const columns = firstColumns(coefficients, count);
  const margins = new Float64Array(count).fill(Infinity);
  for (const column of columns) {
    const scale = largest(column);
    for (let i = 0; i < count; i++) margins[i] = Math.min(margins[i], column[i] / scale);
  }
  return margins;
}

/** Elements 1 … n of the first column, with the sign of the leading coefficient taken out. */
function firstColumns(coefficients: readonly Float64Array[], count: number): Float64Array[] {
  const degree = coefficients.length - 1;
  const columns = Array.from({ length: degree }, () => new Float64Array(count));
  const c = new Float64Array(degree + 2);
  for (let i = 0; i < count; i++) {
    for (let k = 0; k <= degree; k++) c[k] = coefficients[k][i];
    let first = 0;
    while (first < degree && c[first] === 0) first += 1;
    const sign = c[first] < 0 ? -1 : 1;
    for (let k = 0; k < degree; k++)
      columns[k][i] = k < first ? NaN : sign * eliminate(c, k, degree);
    for (let k = 0; k < first; k++) columns[k][i] = columns[degree - 1][i];
  }
  return columns;
}

/** One step of Routh's scheme in place; returns the pivot it used, the first element of row k + 1. */
function eliminate(c: Float64Array, k: number, degree: number): number {
  const pivot = c[k + 1];
  const quotient = c[k] / pivot;
  for (let j = k + 2; j <= degree; j += 2) {
    const below = j < degree ? c[j + 1] : 0;
    if (below !== 0) c[j] -= quotient * below;
  }
  return pivot;
}

function largest(column: Float64Array): number {
  let size = 0;
  for (const x of column) if (Math.abs(x) > size && Number.isFinite(x)) size = Math.abs(x);
  return size === 0 ? 1 : size;
}
