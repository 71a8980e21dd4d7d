import type { FigureData, RegionFigure, ResponseFigure } from './data.ts';

/** A figure's data as a table, its alternative for readers who do not see it. */
export interface FigureTable {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly (string | number)[])[];
}

/** Most rows of a table; longer data are thinned evenly, first and last kept. */
const MOST_ROWS = 41;

/** The data of a figure as a table. */
export function figureTable(figure: FigureData): FigureTable {
  return figure.kind === 'region' ? regionTable(figure) : responseTable(figure);
}

/** The boundary points of a gain plane: the condition, both gains, and whether the area ends there. */
function regionTable(figure: RegionFigure): FigureTable {
  const rows = figure.boundaries.flatMap(({ label, lines, elsewhere }) => [
    ...lines.flatMap((line) => thinned(line).map(([x, y]) => [label, x, y, 'bounds the area'])),
    ...elsewhere.flatMap((line) => thinned(line).map(([x, y]) => [label, x, y, 'elsewhere'])),
  ]);
  return { columns: ['boundary of', figure.x.label, figure.y.label, 'there'], rows };
}

/** Values of every curve, with its range over the tolerances where it has one. */
function responseTable(figure: ResponseFigure): FigureTable {
  const columns = ['curve', figure.x.label, 'value', 'unit', 'low', 'high'];
  const rows = figure.curves.flatMap((curve) =>
    thinned(curve.points.map((point, i) => ({ point, i }))).map(({ point: [t, value], i }) => [
      curve.label,
      t,
      value,
      curve.unit,
      curve.band?.low[i] ?? '',
      curve.band?.high[i] ?? '',
    ]),
  );
  return { columns, rows };
}

function thinned<Item>(items: readonly Item[]): readonly Item[] {
  if (items.length <= MOST_ROWS) return items;
  const step = (items.length - 1) / (MOST_ROWS - 1);
  return Array.from({ length: MOST_ROWS }, (_, i) => items[Math.round(i * step)]);
}
