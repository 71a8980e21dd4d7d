import { invariant } from '../base/index.ts';

/** A side of the gain plane: `n` samples in the middles of equal cells from `from` to `to`. */
export interface Side {
  readonly from: number;
  readonly to: number;
  readonly n: number;
}

/**
 * Says for a batch of points whether, or how far, a condition is met: above 0 it holds; not a number counts as not
 * held. The arrays of points are used again for the next batch, so it must not keep them.
 */
export type BatchMargin = (xs: Float64Array, ys: Float64Array) => ArrayLike<number>;

/**
 * The plane cut into cells, each with one sample in its middle, row by row:
 *
 *     y.to   ·  ·  ·  ·      index = row · x.n + column
 *            ·  ·  ·  ·      grid coordinates: column + ½, row + ½ at a sample,
 *     y.from ·  ·  ·  ·      0 to x.n and 0 to y.n over the whole plane
 *        x.from      x.to
 */
export interface Grid {
  readonly x: Side;
  readonly y: Side;
}

/** Points for one call of a condition: enough to amortise the call, few enough to stay in the cache. */
const CHUNK = 4096;

/** The value at a grid coordinate of a side. */
export function alongSide(side: Side, coordinate: number): number {
  return side.from + ((side.to - side.from) * coordinate) / side.n;
}

/** Where a condition holds, sample by sample: 1 or 0. */
export function holdsOver(grid: Grid, margin: BatchMargin): Uint8Array {
  const columns = grid.x.n;
  const holds = new Uint8Array(columns * grid.y.n);
  const rows = Math.max(1, Math.floor(CHUNK / columns));
  const xs = repeatedRow(grid, rows);
  const ys = new Float64Array(xs.length);
  for (let row = 0; row < grid.y.n; row += rows) {
    const count = Math.min(rows, grid.y.n - row);
    for (let k = 0; k < count; k++) {
      ys.fill(alongSide(grid.y, row + k + 0.5), k * columns, (k + 1) * columns);
    }
    const length = count * columns;
    markHolding(margin(xs.subarray(0, length), ys.subarray(0, length)), holds, row * columns);
  }
  return holds;
}

function repeatedRow(grid: Grid, rows: number): Float64Array {
  const row = Float64Array.from({ length: grid.x.n }, (_, i) => alongSide(grid.x, i + 0.5));
  const repeated = new Float64Array(row.length * rows);
  for (let k = 0; k < rows; k++) repeated.set(row, k * row.length);
  return repeated;
}

/** Of the samples marked in `candidates`, those where a condition holds; only these are evaluated. */
export function holdsAmong(grid: Grid, margin: BatchMargin, candidates: Uint8Array): Uint8Array {
  const places = markedPlaces(candidates);
  const [xs, ys] = [new Float64Array(places.length), new Float64Array(places.length)];
  const columns = grid.x.n;
  for (let i = 0; i < places.length; i++) {
    const row = Math.floor(places[i] / columns);
    xs[i] = alongSide(grid.x, places[i] - row * columns + 0.5);
    ys[i] = alongSide(grid.y, row + 0.5);
  }
  const verdicts = holdsAt(margin, xs, ys);
  const holds = new Uint8Array(candidates.length);
  for (let i = 0; i < places.length; i++) holds[places[i]] = verdicts[i];
  return holds;
}

function markedPlaces(candidates: Uint8Array): Int32Array {
  const places = new Int32Array(candidates.length);
  let count = 0;
  for (let i = 0; i < candidates.length; i++) if (candidates[i] === 1) places[count++] = i;
  return places.subarray(0, count);
}

/** Whether a condition holds at each of some points: 1 or 0. */
export function holdsAt(margin: BatchMargin, xs: Float64Array, ys: Float64Array): Uint8Array {
  const holds = new Uint8Array(xs.length);
  inChunks(xs.length, (start, end) => {
    markHolding(margin(xs.subarray(start, end), ys.subarray(start, end)), holds, start);
  });
  return holds;
}

/** Samples at which all of these hold. */
export function intersection(fields: readonly Uint8Array[]): Uint8Array {
  invariant(fields.length > 0, 'an area without conditions');
  const all = fields[0].slice();
  for (const field of fields.slice(1)) for (let i = 0; i < all.length; i++) all[i] &= field[i];
  return all;
}

function inChunks(length: number, visit: (start: number, end: number) => void): void {
  for (let start = 0; start < length; start += CHUNK) visit(start, Math.min(start + CHUNK, length));
}

function markHolding(margins: ArrayLike<number>, holds: Uint8Array, start: number): void {
  for (let i = 0; i < margins.length; i++) holds[start + i] = margins[i] > 0 ? 1 : 0;
}
