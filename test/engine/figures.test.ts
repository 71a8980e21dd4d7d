import { describe, expect, test } from 'vitest';
import type { FigureData, Polygon, RegionFigure, ResponseFigure } from '../../src/figures/index.ts';
import { invariant } from '../../src/base/index.ts';
import { evaluateCell, type CellReport } from './worksheet.ts';

/** A rigid body with friction under three-term control. */
const body = (statements: string, Ki = '6 N m/(rad s)') => `
J is 4 kg m^2 ± 25 %
b is 2 N m s/rad
Kp is 9 N m/rad
Kd is 4 N m s/rad
Ki is ${Ki}
Tw is 3 N m
tune Kp from 0 to 20 N m/rad
tune Ki from 0 to 40 N m/(rad s)
J, b, Kd are positive
loop az driven by r, w
  J theta'' + b theta' = T + w
  T = (Kp + Ki/s + Kd s) (r - theta)
  e = r - theta
case storm of az
  w = step(Tw)
case rise of az
  w = ramp(2 N m/s)
${statements}`;

function figureOf<Kind extends FigureData['kind']>(
  cell: CellReport,
  kind: Kind,
): Extract<FigureData, { kind: Kind }> {
  expect(cell.problems).toEqual([]);
  const { figure } = cell.result('draw');
  invariant(figure?.kind === kind, `the cell draws no ${kind}`);
  return figure as Extract<FigureData, { kind: Kind }>;
}

/** Whether a point lies in an area, by the crossings of a ray. */
function isInside(area: readonly Polygon[], x: number, y: number): boolean {
  let inside = false;
  for (const ring of area.flat()) {
    ring.forEach(([x1, y1], i) => {
      const [x2, y2] = ring[(i + 1) % ring.length];
      if (y1 > y !== y2 > y && x < x1 + ((y - y1) / (y2 - y1)) * (x2 - x1)) inside = !inside;
    });
  }
  return inside;
}

/** Compares an area with a rule on a grid, but for points close to its boundary. */
function expectArea(
  area: readonly Polygon[],
  { x, y }: RegionFigure,
  margin: (x: number, y: number) => number,
): void {
  for (let i = 1; i < 12; i++) {
    for (let k = 1; k < 12; k++) {
      const [px, py] = [x.from + (i / 12) * (x.to - x.from), y.from + (k / 12) * (y.to - y.from)];
      const distance = margin(px, py);
      if (Math.abs(distance) > 0.3) expect(isInside(area, px, py)).toBe(distance > 0);
    }
  }
}

describe('a drawn region', () => {
  test('is where every condition holds, at the nominal values and over the tolerances', () => {
    const cell = evaluateCell(body('draw region of Kp, Ki where stable(az) titled "Gains"'));
    const figure = figureOf(cell, 'region');
    expect(figure).toMatchObject({
      title: 'Gains',
      x: { name: 'Kp', from: 0, to: 20 },
      y: { name: 'Ki', from: 0, to: 40 },
      point: { x: 9, y: 6, draggable: true },
    });
    // Ki < Kp (b + Kd)/J, with J at most 5.
    expectArea(figure.nominalArea, figure, (Kp, Ki) => (Kp * 6) / 4 - Ki);
    expectArea(figure.toleranceArea!, figure, (Kp, Ki) => (Kp * 6) / 5 - Ki);
    expect(figure.boundaries.map(({ label }) => label)).toEqual(['Ki > 0 and Kp > J Ki/(b + Kd)']);
    expect(cell.result('draw').notes.join(' ')).toContain('looked at, not proved');
  });

  test('of several conditions is where they all hold', () => {
    const cell = evaluateCell(
      body(
        'draw region of Kp, Ki where stable(az), abs(final(rise.e)) <= 0.1 rad, Kp <= 15 N m/rad',
      ),
    );
    const figure = figureOf(cell, 'region');
    // The error under a ramp of w is rate/Ki: Ki >= 20.
    expectArea(figure.nominalArea, figure, (Kp, Ki) =>
      Math.min((Kp * 6) / 4 - Ki, Ki - 20, 15 - Kp),
    );
  });

  test.each([
    [
      'draw region of Kp where stable(az)',
      'region',
      'A region is drawn over two gains: `draw region of Kp, Ki where …`.',
    ],
    ['draw region of Kp, Ki', 'region', 'Say where the region is: `where stable(az), …`.'],
    ['draw nyquist of az(w -> e)', 'nyquist', 'The figure `nyquist` is not available yet.'],
    ['draw budget of storm.e', 'budget', 'The figure `budget` is not available yet.'],
    [
      'draw response of storm.e',
      'response',
      'Say over how long: `draw response of storm.e over 20 s`.',
    ],
    ['draw response of storm.e over 0 s', '0 s', 'The duration of a response is a time above 0.'],
    [
      'draw response of az(w -> e) over 3 s',
      'az(w -> e)',
      '`az(w -> e)` is not a signal; name a signal of a load case, or multiply a transfer function by the transform of a source, `H/s`.',
    ],
  ])('`%s` is refused with what is missing', (statement, place, message) => {
    const cell = evaluateCell(body(statement));
    expect(cell.problems).toEqual([`error at ‹${place}›: ${message}`]);
    expect(cell.result('draw')).toMatchObject({ kind: 'figure', state: 'error', figure: null });
  });
});

describe('a drawn response', () => {
  const valuesOf = ({ curves }: ResponseFigure, index: number) => curves[index].points;

  test('follows the closed form, in the unit of the axis', () => {
    const cell = evaluateCell(`
K is 2 1/s
K is positive
loop a driven by r
  y' = K (r - y)
  e = r - y
case c of a
  r = step(3 mm)
draw response of c.y, c.e over 4 s`);
    const figure = figureOf(cell, 'response');
    expect(figure.x).toMatchObject({ from: 0, to: 4, unit: 's' });
    expect(figure.curves.map(({ label, unit }) => [label, unit])).toEqual([
      ['c.y', 'mm'],
      ['c.e', 'mm'],
    ]);
    for (const [t, y] of valuesOf(figure, 0)) expect(y).toBeCloseTo(3 * (1 - Math.exp(-2 * t)), 6);
    for (const [t, e] of valuesOf(figure, 1)) expect(e).toBeCloseTo(3 * Math.exp(-2 * t), 6);
  });

  test('has a band over the tolerances that holds the nominal curve', () => {
    const figure = figureOf(evaluateCell(body('draw response of storm.e over 10 s')), 'response');
    const [{ band, points }] = figure.curves;
    points.forEach(([, y], i) => {
      expect(band!.low[i]).toBeLessThanOrEqual(y + 1e-9);
      expect(band!.high[i]).toBeGreaterThanOrEqual(y - 1e-9);
    });
  });

  test('with an integral gain of 0 is that of two-term control', () => {
    const figure = figureOf(
      evaluateCell(body('draw response of storm.e over 30 s', '0 N m/(rad s)')),
      'response',
    );
    const [, last] = figure.curves[0].points.at(-1)!;
    const unit = figure.curves[0].unit === 'mrad' ? 1000 : 1;
    expect(last).toBeCloseTo((-3 / 9) * unit, 3);
  });

  test('that grows without bound says so, and why', () => {
    const figure = figureOf(
      evaluateCell(body('draw response of storm.e over 20 s', '30 N m/(rad s)')),
      'response',
    );
    expect(figure.diverges).toContain('storm.e grows without bound: the block of theta, T');
  });
});
