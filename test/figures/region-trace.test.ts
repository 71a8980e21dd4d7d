import { describe, expect, it } from 'vitest';
import {
  traceRegion,
  type BatchMargin,
  type Line,
  type Polygon,
  type RegionCondition,
} from '../../src/figures/index.ts';

const side = { from: 0, to: 10, n: 400 };

function condition(
  label: string,
  holds: (x: number, y: number) => number,
  tolerance: readonly ((x: number, y: number) => number)[] = [],
): RegionCondition {
  return { label, latex: null, nominal: batch(holds), tolerance: tolerance.map(batch) };
}

function batch(margin: (x: number, y: number) => number): BatchMargin {
  return (xs, ys) => Float64Array.from(xs, (x, i) => margin(x, ys[i]));
}

/** Signed area by the shoelace formula, holes counting against. */
function areaOf(polygons: readonly Polygon[]): number {
  const ringArea = (ring: Line): number =>
    ring.reduce((sum, [x, y], i) => {
      const [nextX, nextY] = ring[(i + 1) % ring.length];
      return sum + (x * nextY - nextX * y) / 2;
    }, 0);
  return polygons.reduce(
    (sum, [outer, ...holes]) =>
      sum + Math.abs(ringArea(outer)) - holes.reduce((h, hole) => h + Math.abs(ringArea(hole)), 0),
    0,
  );
}

function length(line: Line): number {
  return line.reduce(
    (sum, [x, y], i) => (i === 0 ? 0 : sum + Math.hypot(x - line[i - 1][0], y - line[i - 1][1])),
    0,
  );
}

describe('a traced region', () => {
  it('has the area under a straight boundary, and that line exactly', () => {
    const trace = traceRegion({
      x: side,
      y: side,
      conditions: [condition('x > y/2', (x, y) => x - y / 2)],
    });
    expect(areaOf(trace.nominalArea)).toBeCloseTo(75, 2);
    const [{ lines, elsewhere }] = trace.boundaries;
    expect(lines).toHaveLength(1);
    expect(elsewhere).toHaveLength(0);
    expect(length(lines[0])).toBeCloseTo(Math.hypot(5, 10), 1);
    const cell = side.to / side.n;
    for (const [x, y] of lines[0]) expect(Math.abs(x - y / 2)).toBeLessThan(cell / 2);
  });

  it('locates a curved boundary to a small part of a cell from verdicts alone', () => {
    const disc = condition('disc', (x, y) => (Math.hypot(x - 5, y - 5) < 3 ? 1 : -1));
    const trace = traceRegion({ x: side, y: side, conditions: [disc] });
    expect(areaOf(trace.nominalArea)).toBeCloseTo(9 * Math.PI, 1);
    expect(trace.boundaries[0].lines).toHaveLength(1);
    for (const [x, y] of trace.boundaries[0].lines[0]) {
      expect(Math.abs(Math.hypot(x - 5, y - 5) - 3)).toBeLessThan(5e-4);
    }
  });

  it('cuts each boundary where another condition takes over', () => {
    const trace = traceRegion({
      x: side,
      y: side,
      conditions: [condition('x > 4', (x) => x - 4), condition('y < 6', (_, y) => 6 - y)],
    });
    const [left, top] = trace.boundaries;
    expect(left.lines.map(length)).toEqual([expect.closeTo(6, 1)]);
    expect(left.elsewhere.map(length)).toEqual([expect.closeTo(4, 1)]);
    expect(top.lines.map(length)).toEqual([expect.closeTo(6, 1)]);
    expect(areaOf(trace.nominalArea)).toBeCloseTo(36, 2);
  });

  it('shrinks over the tolerances to where every corner holds', () => {
    const trace = traceRegion({
      x: side,
      y: side,
      conditions: [condition('x > 4', (x) => x - 4, [(x) => x - 5, (x) => x - 3])],
    });
    expect(areaOf(trace.nominalArea)).toBeCloseTo(60, 2);
    expect(areaOf(trace.toleranceArea ?? [])).toBeCloseTo(50, 1);
  });

  it('is the whole plane without a boundary where everything holds', () => {
    const trace = traceRegion({ x: side, y: side, conditions: [condition('always', () => 1)] });
    expect(areaOf(trace.nominalArea)).toBeCloseTo(100, 6);
    expect(trace.boundaries[0].lines).toEqual([]);
    expect(trace.toleranceArea).toBeNull();
  });

  it('is empty where nothing holds, and where a margin is not a number', () => {
    const trace = traceRegion({
      x: side,
      y: side,
      conditions: [condition('never', () => Number.NaN)],
    });
    expect(trace.nominalArea).toEqual([]);
    expect(trace.boundaries[0].lines).toEqual([]);
  });

  it('keeps holes', () => {
    const ring = condition('ring', (x, y) => Math.hypot(x - 5, y - 5) - 2);
    const trace = traceRegion({ x: side, y: side, conditions: [ring] });
    expect(trace.nominalArea).toHaveLength(1);
    expect(trace.nominalArea[0]).toHaveLength(2);
    expect(areaOf(trace.nominalArea)).toBeCloseTo(100 - 4 * Math.PI, 1);
  });
});
