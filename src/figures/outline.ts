import { contours } from 'd3';
import type { Line, Point, Polygon } from './data.ts';
import { alongSide, holdsAt, type BatchMargin, type Grid } from './grid.ts';

/** Halvings of a cell when a boundary is located on it: to 1/128 of a cell, well below a pixel. */
const HALVINGS = 6;

/** Deviation, in cells, up to which boundary points on a straight line are dropped. */
const STRAIGHT = 0.03;

/** Rings in grid coordinates, as they run between samples that hold and samples that do not. */
type GridRing = readonly (readonly [number, number])[];

/**
 * The outlines of the marked samples, each point located exactly on its grid edge by halving with the condition
 * itself; so a condition needs no smooth margin. Points are in grid coordinates (see {@link Grid}).
 */
export function outlinesOf(
  grid: Grid,
  holds: Uint8Array,
  margin: BatchMargin,
): readonly (readonly GridRing[])[] {
  const trace = contours().size([grid.x.n, grid.y.n]).smooth(false);
  const polygons = trace.contour(holds as unknown as number[], 0.5).coordinates;
  const rings = polygons.map((polygon) => polygon.map((ring) => ring.slice(0, -1)));
  return located(grid, rings as [number, number][][][], holds, margin);
}

/**
 * Moves every point that lies between two samples to where the condition changes between them. A point of an
 * unsmoothed contour has one whole coordinate, on the edge between the samples at ± ½; points on the frame stay.
 */
function located(
  grid: Grid,
  polygons: readonly (readonly [number, number][][])[],
  holds: Uint8Array,
  margin: BatchMargin,
): readonly (readonly GridRing[])[] {
  const points = polygons.flat(2).filter((point) => !isOnFrame(grid, point));
  const crossings = crossingsOf(grid, points, holds, margin);
  const moved = new Map(points.map((point, i) => [point, crossings[i]]));
  return polygons.map((polygon) =>
    polygon.map((ring) => {
      const placed = ring.map((point) => moved.get(point) ?? point);
      return fitted(grid, placed);
    }),
  );
}

/**
 * Where the condition changes on the grid edge through each point: `at` of the way from the edge's sample below or
 * left of the point to the one above or right.
 */
function crossingsOf(
  grid: Grid,
  points: readonly (readonly [number, number])[],
  holds: Uint8Array,
  margin: BatchMargin,
): readonly (readonly [number, number])[] {
  const across = points.map(([x]) => Number.isInteger(x));
  const at = new Float64Array(points.length).fill(0.5);
  const rises = points.map(([x, y], i) => {
    const column = across[i] ? x - 1 : Math.floor(x);
    const row = across[i] ? Math.floor(y) : y - 1;
    return holds[row * grid.x.n + column] === 0;
  });
  const placed = (i: number): readonly [number, number] => {
    const [x, y] = points[i];
    return across[i] ? [x - 0.5 + at[i], y] : [x, y - 0.5 + at[i]];
  };
  const [xs, ys] = [new Float64Array(points.length), new Float64Array(points.length)];
  for (let step = 0.25, k = 0; k < HALVINGS; k++, step /= 2) {
    for (let i = 0; i < points.length; i++) {
      const [x, y] = placed(i);
      xs[i] = alongSide(grid.x, x);
      ys[i] = alongSide(grid.y, y);
    }
    const holding = holdsAt(margin, xs, ys);
    for (let i = 0; i < at.length; i++) at[i] += (holding[i] === 1) === rises[i] ? -step : step;
  }
  return points.map((_, i) => placed(i));
}

/** Brings a ring out to the frame where it meets it, and into the frame's corners. */
function fitted(grid: Grid, ring: GridRing): GridRing {
  const at = (i: number): readonly [number, number] => ring[(i + ring.length) % ring.length];
  return ring.flatMap((point, i) => {
    if (!isOnFrame(grid, point)) return [point];
    const side = [-1, 1].find((step) => !isOnFrame(grid, at(i + step)));
    const own = side === undefined ? point : extended(grid, point, at(i + side), at(i + 2 * side));
    const corner = isOnFrame(grid, at(i + 1)) && turnsCorner(point, at(i + 1));
    return corner ? [own, cornerBetween(grid, point, at(i + 1))] : [own];
  });
}

/** A point on the frame, moved along it to where the line through the two points before it comes out. */
function extended(
  grid: Grid,
  [x, y]: readonly [number, number],
  [nearX, nearY]: readonly [number, number],
  [farX, farY]: readonly [number, number],
): readonly [number, number] {
  const reach = (run: number, rise: number, from: number, limit: number): number => {
    const change = run === 0 ? 0 : Math.max(-1, Math.min(1, rise / run));
    return Math.max(0, Math.min(limit, from + change));
  };
  if (x === 0 || x === grid.x.n) {
    return [x, reach(nearX - farX, (nearY - farY) * (x - nearX), nearY, grid.y.n)];
  }
  return [reach(nearY - farY, (nearX - farX) * (y - nearY), nearX, grid.x.n), y];
}

function turnsCorner([x]: readonly [number, number], [nextX]: readonly [number, number]): boolean {
  return Number.isInteger(x) !== Number.isInteger(nextX);
}

function cornerBetween(
  grid: Grid,
  a: readonly [number, number],
  b: readonly [number, number],
): readonly [number, number] {
  const middle = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
  return [middle[0] < grid.x.n / 2 ? 0 : grid.x.n, middle[1] < grid.y.n / 2 ? 0 : grid.y.n];
}

function isOnFrame(grid: Grid, [x, y]: readonly [number, number]): boolean {
  return x <= 0 || y <= 0 || x >= grid.x.n || y >= grid.y.n;
}

/** Outlines as polygons in the plane's own units. */
export function polygonsOf(
  grid: Grid,
  outlines: readonly (readonly GridRing[])[],
): readonly Polygon[] {
  return outlines.map((polygon) =>
    polygon.map((ring) =>
      straightened([...ring, ring[0]])
        .slice(0, -1)
        .map(toPlane(grid)),
    ),
  );
}

/**
 * The parts of outlines that run inside the plane, its frame left out, as open or closed lines; each part is cut
 * where `bounds` changes and goes to the lines of its kind.
 */
export function boundaryLines(
  grid: Grid,
  outlines: readonly (readonly GridRing[])[],
  bounds: (x: number, y: number) => boolean,
): { readonly lines: readonly Line[]; readonly elsewhere: readonly Line[] } {
  const pieces = outlines.flat().flatMap((ring) => piecesOf(grid, ring, bounds));
  const lines = (kind: boolean): Line[] =>
    pieces
      .filter((piece) => piece.bounding === kind)
      .map((piece) => straightened(piece.points).map(toPlane(grid)));
  return { lines: lines(true), elsewhere: lines(false) };
}

interface Piece {
  readonly bounding: boolean;
  readonly points: (readonly [number, number])[];
}

function piecesOf(
  grid: Grid,
  ring: GridRing,
  bounds: (x: number, y: number) => boolean,
): readonly Piece[] {
  const pieces: Piece[] = [];
  let open: Piece | null = null;
  ring.forEach((from, i) => {
    const to = ring[(i + 1) % ring.length];
    if (isOnFrame(grid, from) && isOnFrame(grid, to)) {
      open = null;
      return;
    }
    const bounding = bounds((from[0] + to[0]) / 2, (from[1] + to[1]) / 2);
    if (open === null || open.bounding !== bounding) {
      open = { bounding, points: [from] };
      pieces.push(open);
    }
    open.points.push(to);
  });
  return rejoined(pieces);
}

/** A ring starts anywhere: its last piece goes before its first where they are one line. */
function rejoined(pieces: readonly Piece[]): readonly Piece[] {
  const first = pieces[0];
  const last = pieces.at(-1);
  if (first === undefined || last === undefined || first === last) return pieces;
  const meet = last.points.at(-1) === first.points[0] && last.bounding === first.bounding;
  if (!meet) return pieces;
  const whole = { ...first, points: [...last.points, ...first.points.slice(1)] };
  return [whole, ...pieces.slice(1, -1)];
}

function toPlane(grid: Grid): (point: readonly [number, number]) => Point {
  return ([x, y]) => [alongSide(grid.x, x), alongSide(grid.y, y)];
}

/**
 * Drops points that lie on the line between those kept.
 *
 * Source: D. Douglas and T. Peucker, "Algorithms for the reduction of the number of points required to represent a
 * digitized line or its caricature", 1973.
 */
function straightened(points: GridRing): GridRing {
  const keep = new Uint8Array(points.length);
  keep[0] = keep[points.length - 1] = 1;
  const spans: [number, number][] = [[0, points.length - 1]];
  for (let span = spans.pop(); span; span = spans.pop()) {
    const [from, to] = span;
    const farthest = farthestBetween(points, from, to);
    if (farthest === null) continue;
    keep[farthest] = 1;
    spans.push([from, farthest], [farthest, to]);
  }
  return points.filter((_, i) => keep[i]);
}

function farthestBetween(points: GridRing, from: number, to: number): number | null {
  let place: number | null = null;
  let largest = STRAIGHT;
  for (let i = from + 1; i < to; i++) {
    const distance = distanceToSegment(points[i], points[from], points[to]);
    if (distance > largest) [place, largest] = [i, distance];
  }
  return place;
}

function distanceToSegment(
  [x, y]: readonly [number, number],
  [ax, ay]: readonly [number, number],
  [bx, by]: readonly [number, number],
): number {
  const [dx, dy] = [bx - ax, by - ay];
  const length = dx * dx + dy * dy;
  if (length === 0) return Math.hypot(x - ax, y - ay);
  const along = Math.max(0, Math.min(1, ((x - ax) * dx + (y - ay) * dy) / length));
  return Math.hypot(x - ax - along * dx, y - ay - along * dy);
}
