import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  figureLayout,
  figureSvg,
  figureTable,
  positionOf,
  standaloneSvg,
  traceRegion,
  valueAt,
  type FigureData,
  type RegionFigure,
  type ResponseFigure,
} from '../../src/figures/index.ts';

/** A small invented plane: x > y/2 where y < 6. */
function region(): RegionFigure {
  const side = { from: 0, to: 10, n: 20 };
  const trace = traceRegion({
    x: side,
    y: side,
    conditions: [
      {
        label: 'Kp > Ki/2',
        latex: null,
        nominal: (xs, ys) => xs.map((x, i) => x - ys[i] / 2),
        tolerance: [(xs, ys) => xs.map((x, i) => x - ys[i])],
      },
      { label: 'Ki <= 6', latex: null, nominal: (_, ys) => ys.map((y) => 6 - y), tolerance: [] },
    ],
  });
  return {
    kind: 'region',
    title: null,
    x: { name: 'Kp', label: 'gain Kp, kN m/rad', unit: 'kN m/rad', from: 0, to: 10 },
    y: { name: 'Ki', label: 'gain Ki, kN m/(rad s)', unit: 'kN m/(rad s)', from: 0, to: 10 },
    ...trace,
    baseline: [],
    names: ['Kp', 'Ki'],
    point: { x: 8, y: 2, draggable: true },
    notes: [],
  };
}

function response(): ResponseFigure {
  const points = [0, 1, 2, 3].map((t) => [t, 4 - t] as const);
  const band = { low: [3, 2, 1, 0.5], high: [5, 4, 3, 2] };
  const shared = { axisLabel: 'error e, mrad', unit: 'mrad', points, baseline: false };
  return {
    kind: 'response',
    title: 'Storm',
    x: { name: 't', label: 'time t, s', unit: 's', from: 0, to: 3 },
    curves: [
      { ...shared, label: 'storm.e', band },
      { ...shared, label: 'calm.e', band: null },
      { ...shared, label: 'storm.T', axisLabel: 'torque T, N m', unit: 'N m', band: null },
    ],
    diverges: null,
    notes: [],
  };
}

/** A drawing without the tags by which letters in a text are set. */
function lettersOf(svg: string): string {
  return svg.replace(/<\/?tspan[^>]*>/g, '');
}

const size = { width: 640, height: 420 };
const figures: readonly (readonly [string, FigureData])[] = [
  ['region', region()],
  ['response', response()],
];

describe.each(figures)('a %s figure', (name, figure) => {
  it('is drawn as its baseline in test/data/figures shows', () => {
    const baseline = readFileSync(new URL(`../data/figures/${name}.svg`, import.meta.url), 'utf8');
    expect(`${figureSvg(figure, size)}\n`).toBe(baseline);
  });

  it('is plain data that survives a copy to another thread', () => {
    expect(structuredClone(figure)).toEqual(figure);
  });

  it('turns pointer positions into values and back', () => {
    for (const { x, y } of figureLayout(figure, size).panels) {
      expect(valueAt(x, positionOf(x, 2.5))).toBeCloseTo(2.5, 12);
      expect(valueAt(y, positionOf(y, 1.5))).toBeCloseTo(1.5, 12);
    }
  });

  it('has every axis labelled with quantity and unit', () => {
    const svg = figureSvg(figure, size);
    expect(lettersOf(svg)).toContain(figure.x.label);
    expect(svg).not.toContain('NaN');
  });

  it('stands alone without custom properties', () => {
    expect(standaloneSvg(figureSvg(figure, size))).not.toContain('var(');
  });
});

it('A region says in words and tints where it holds, and labels every boundary.', () => {
  const svg = figureSvg(region(), size);
  for (const text of ['holds at nominal values', 'holds over the tolerances', 'present gains']) {
    expect(svg).toContain(text);
  }
  expect(lettersOf(svg)).toContain('Kp &gt; Ki/2');
  expect(lettersOf(svg)).toContain('Ki ≤ 6');
});

it('Names in labels are set with their subscripts; units and other words are not.', () => {
  const svg = figureSvg({ ...region(), names: ['Kp'] }, size);
  const setKp =
    /<tspan font-style="italic">K<\/tspan><tspan dy="[\d.]+" font-size="[\d.]+">p<\/tspan>/;
  expect(svg).toMatch(new RegExp(`gain ${setKp.source}<tspan dy="-[\\d.]+">, </tspan>kN m/rad<`));
  expect(svg).toMatch(new RegExp(`>${setKp.source}<tspan dy="-[\\d.]+"> &gt; </tspan>Ki/2<`));
});

it('A boundary pinned earlier is dashed, and the key says so.', () => {
  const pinned: RegionFigure = {
    ...region(),
    baseline: [
      [
        [0, 0],
        [10, 10],
      ],
    ],
  };
  expect(figureSvg(pinned, size)).toMatch(/class="baseline"[^>]*stroke-dasharray/);
  expect(lettersOf(figureSvg(pinned, size))).toContain('>baseline<');
  expect(figureSvg(region(), size)).not.toContain('baseline');
});

it('A region that holds nowhere says so.', () => {
  const nowhere = { ...region(), nominalArea: [], toleranceArea: [], boundaries: [] };
  expect(figureSvg(nowhere, size)).toContain('holds nowhere here');
});

it('A narrow region breaks its key into rows and starts its plot lower.', () => {
  const narrow = { width: 360, height: 420 };
  const [wide] = figureLayout(region(), size).panels;
  expect(figureLayout(region(), narrow).panels[0].plot.top).toBeGreaterThan(wide.plot.top);
});

it('Curves of different units have panels of their own under one time axis.', () => {
  const { panels } = figureLayout(response(), size);
  expect(panels).toHaveLength(2);
  expect(panels[0].plot.bottom).toBeLessThan(panels[1].plot.top);
  expect(panels[0].x).toEqual(panels[1].x);
});

it('A response that is 0 throughout is still drawn over a range.', () => {
  const points = [
    [0, 0],
    [3, 0],
  ] as const;
  const flat = { ...response(), curves: [{ ...response().curves[1], points }] };
  expect(figureLayout(flat, size).panels[0].y.domain).toEqual([-1, 1]);
});

it('A response table lists time, value and range; long data are thinned.', () => {
  const table = figureTable(response());
  expect(table.columns).toEqual(['curve', 'time t, s', 'value', 'unit', 'low', 'high']);
  expect(table.rows[0]).toEqual(['storm.e', 0, 4, 'mrad', 3, 5]);
  const long = {
    ...response().curves[1],
    points: Array.from({ length: 500 }, (_, i) => [i, i] as const),
  };
  expect(figureTable({ ...response(), curves: [long] }).rows).toHaveLength(41);
});

it('A region table lists the boundary points of each condition.', () => {
  const table = figureTable(region());
  expect(table.columns[0]).toBe('boundary of');
  expect(new Set(table.rows.map(([label]) => label))).toEqual(new Set(['Kp > Ki/2', 'Ki <= 6']));
});
