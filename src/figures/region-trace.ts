import type { Boundary, Polygon } from './data.ts';
import {
  holdsAmong,
  holdsOver,
  intersection,
  type BatchMargin,
  type Grid,
  type Side,
} from './grid.ts';
import { boundaryLines, outlinesOf, polygonsOf } from './outline.ts';

/** A condition over the gain plane: at nominal values, and at each corner or sample of the tolerances. */
export interface RegionCondition {
  /** What is written at its boundary: `Kp > J Ki/Kd`. */
  readonly label: string;
  readonly latex: string | null;
  readonly nominal: BatchMargin;
  readonly tolerance: readonly BatchMargin[];
}

export interface RegionRequest {
  readonly x: Side;
  readonly y: Side;
  readonly conditions: readonly RegionCondition[];
}

export interface RegionTrace {
  readonly nominalArea: readonly Polygon[];
  /** Null if no condition has tolerance samples. */
  readonly toleranceArea: readonly Polygon[] | null;
  readonly boundaries: readonly Boundary[];
}

/** Samples a side for the area over the tolerances, which every corner must be evaluated for. */
const TOLERANCE_SAMPLES = 160;

/**
 * Where conditions on two gains hold, with the boundary of each.
 *
 * @param request sides in the axes' units with the samples on each (400 for a figure), and at least one condition
 * @returns areas and lines in the axes' units
 *
 * Cost: one evaluation of every condition at each sample, and six at each boundary point; over the tolerances at
 * most 160 × 160 samples, each corner only where all before it hold.
 */
export function traceRegion(request: RegionRequest): RegionTrace {
  const grid: Grid = { x: request.x, y: request.y };
  const { conditions } = request;
  const fields = conditions.map(({ nominal }) => holdsOver(grid, nominal));
  const outlines = conditions.map(({ nominal }, i) => outlinesOf(grid, fields[i], nominal));
  const nominal = together(conditions.map((condition) => condition.nominal));
  const whole =
    conditions.length === 1 ? outlines[0] : outlinesOf(grid, intersection(fields), nominal);
  return {
    nominalArea: polygonsOf(grid, whole),
    toleranceArea: toleranceArea(request),
    boundaries: conditions.map(({ label, latex }, i) => ({
      label,
      latex,
      ...boundaryLines(grid, outlines[i], boundsTheArea(grid, fields, i)),
    })),
  };
}

/** Whether at a place in grid coordinates all conditions but one's own hold. */
function boundsTheArea(
  grid: Grid,
  fields: readonly Uint8Array[],
  own: number,
): (x: number, y: number) => boolean {
  const others = fields.filter((_, i) => i !== own);
  return (x, y) => {
    const column = Math.min(grid.x.n - 1, Math.floor(x));
    const index = Math.min(grid.y.n - 1, Math.floor(y)) * grid.x.n + column;
    return others.every((field) => field[index] === 1);
  };
}

function toleranceArea(request: RegionRequest): readonly Polygon[] | null {
  const margins = request.conditions.flatMap(({ tolerance }) => tolerance);
  if (margins.length === 0) return null;
  const every = [...request.conditions.map(({ nominal }) => nominal), ...margins];
  const grid = { x: coarse(request.x), y: coarse(request.y) };
  let all: Uint8Array = new Uint8Array(grid.x.n * grid.y.n).fill(1);
  for (const margin of every) all = holdsAmong(grid, margin, all);
  return polygonsOf(grid, outlinesOf(grid, all, together(every)));
}

function coarse(side: Side): Side {
  return { ...side, n: Math.min(side.n, TOLERANCE_SAMPLES) };
}

/** One margin that holds where all of these do. */
function together(margins: readonly BatchMargin[]): BatchMargin {
  if (margins.length === 1) return margins[0];
  return (xs, ys) => {
    const result = new Float64Array(xs.length).fill(1);
    for (const margin of margins) {
      const values = margin(xs, ys);
      for (let i = 0; i < result.length; i++) if (!(values[i] > 0)) result[i] = -1;
    }
    return result;
  };
}
