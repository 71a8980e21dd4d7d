import { area, line } from 'd3';
import { axesSvg, LABEL_SIZE, lettering, textWidth } from './axes.ts';
import type { Curve, Line, Point, ResponseFigure } from './data.ts';
import { BASELINE_DASH, DASHES, ink } from './ink.ts';
import { overlaps } from './label-placement.ts';
import { labelText } from './label-text.ts';
import {
  panelOver,
  positionOf,
  type Box,
  type FigureLayout,
  type FigureSize,
  type Panel,
} from './scale.ts';
import { element, type Svg } from './svg.ts';

const MARGIN = { left: 62, right: 18, top: 34, bottom: 48 };

/** Height between two panels: room for the lower one's label. */
const BETWEEN = 38;

/** Length of the piece of a curve's dash pattern before its label. */
const SAMPLE = 26;

/** Share of the range of values that is left free above and below. */
const HEADROOM = 0.06;

/** Where signals over time are plotted: one panel for each quantity, one above the other. */
export function responseLayout(figure: ResponseFigure, size: FigureSize): FigureLayout {
  const groups = panelGroups(figure);
  const bottom = size.height - MARGIN.bottom;
  const height = (bottom - MARGIN.top - BETWEEN * (groups.length - 1)) / groups.length;
  const panels = groups.map((curves, i) => {
    const top = MARGIN.top + i * (height + BETWEEN);
    const plot = { left: MARGIN.left, right: rightEdge(figure, size), top, bottom: top + height };
    return panelOver(plot, [figure.x.from, figure.x.to], rangeOf(curves));
  });
  return { ...size, panels };
}

/** Signals over time as SVG: nominal curves in dash patterns with direct labels, bands as tints, Baseline quiet. */
export function responseSvg(figure: ResponseFigure, size: FigureSize): Svg {
  const { panels } = responseLayout(figure, size);
  const groups = panelGroups(figure);
  const names = figure.curves.map(({ label }) => label).join(', ');
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${size.width} ${size.height}`,
      width: size.width,
      height: size.height,
      role: 'img',
      'aria-label': figure.title ?? `response of ${names}`,
      class: 'figure response',
    },
    ...groups.map((curves, i) => panelSvg(panels[i], curves, figure, i === groups.length - 1)),
  );
}

/** Curves by what is written at their vertical axis, in order of appearance. */
function panelGroups(figure: ResponseFigure): readonly (readonly Curve[])[] {
  const groups = new Map<string, Curve[]>();
  for (const curve of figure.curves) {
    const key = curve.unit;
    groups.set(key, [...(groups.get(key) ?? []), curve]);
  }
  return groups.size === 0 ? [[]] : [...groups.values()];
}

/** Labels stand right of the curves' ends where there are several curves. */
function rightEdge(figure: ResponseFigure, size: FigureSize): number {
  const widest = Math.max(0, ...figure.curves.map(({ label }) => textWidth(label, LABEL_SIZE)));
  return size.width - MARGIN.right - (needsLabels(figure) ? widest + SAMPLE + 8 : 0);
}

function needsLabels(figure: ResponseFigure): boolean {
  return panelGroups(figure).some((curves) => curves.length > 1);
}

/** The range of all values, 0 included where it is near, with headroom; a constant 0 gets a range around it. */
function rangeOf(curves: readonly Curve[]): [number, number] {
  const values = curves.flatMap(({ points, band }) => [
    ...points.map(([, value]) => value),
    ...(band === null ? [] : [...band.low, ...band.high]),
  ]);
  const finite = values.filter(Number.isFinite);
  const low = finite.reduce((a, b) => Math.min(a, b), 0);
  const high = finite.reduce((a, b) => Math.max(a, b), 0);
  if (low === high) return [-1, 1];
  const room = (high - low) * HEADROOM;
  return [low === 0 ? 0 : low - room, high === 0 ? 0 : high + room];
}

function panelSvg(
  panel: Panel,
  curves: readonly Curve[],
  figure: ResponseFigure,
  isLast: boolean,
): Svg {
  const bands = curves.map((curve) => bandSvg(panel, curve));
  const dashes = dashesOf(curves);
  const lines = curves.map((curve, i) => curveSvg(panel, curve, dashes[i]));
  return element(
    'g',
    { class: 'panel' },
    ...bands,
    zeroLine(panel),
    ...lines,
    axesSvg(panel, figure.x, { label: axisLabelOf(curves), unit: curves[0]?.unit ?? '' }, isLast),
    ...(needsLabels(figure) ? endLabels(panel, curves, dashes) : []),
    isLast && figure.diverges !== null ? divergenceNote(panel, figure.diverges) : '',
  );
}

function divergenceNote(panel: Panel, text: string): Svg {
  const style = { size: LABEL_SIZE, anchor: 'end' as const, class: 'diverges' };
  return lettering(panel.plot.right - 6, panel.plot.top + LABEL_SIZE, text, style);
}

/** The axis label that all curves share, or their unit with the labels listed. */
function axisLabelOf(curves: readonly Curve[]): string {
  const labels = [...new Set(curves.map(({ axisLabel }) => axisLabel))];
  if (labels.length <= 1) return labels[0] ?? '';
  const names = [...new Set(curves.map(({ label }) => label))].join(' and ');
  return curves[0].unit === '' ? names : `${names}, ${curves[0].unit}`;
}

/** The first curve solid, each further one with the next pattern; the Baseline dashed. */
function dashesOf(curves: readonly Curve[]): readonly (string | null)[] {
  let next = 0;
  return curves.map(({ baseline }) => (baseline ? BASELINE_DASH : DASHES[next++ % DASHES.length]));
}

function zeroLine(panel: Panel): Svg {
  const [low, high] = panel.y.domain;
  if (low >= 0 || high <= 0) return '';
  const y = positionOf(panel.y, 0);
  return element('line', {
    x1: panel.plot.left,
    x2: panel.plot.right,
    y1: y,
    y2: y,
    stroke: ink('faint'),
    'stroke-width': 0.8,
  });
}

function curveSvg(panel: Panel, curve: Curve, dash: string | null): Svg {
  const draw = line<Point>()
    .defined(([, value]) => Number.isFinite(value))
    .x(([t]) => positionOf(panel.x, t))
    .y(([, value]) => positionOf(panel.y, value))
    .digits(2);
  return element('path', {
    d: draw([...curve.points]) ?? '',
    fill: 'none',
    stroke: ink(curve.baseline ? 'quiet' : 'ink'),
    'stroke-width': curve.baseline ? 1.2 : 1.6,
    'stroke-dasharray': dash,
    'stroke-linejoin': 'round',
    class: curve.baseline ? 'curve baseline' : 'curve',
  });
}

function bandSvg(panel: Panel, curve: Curve): Svg {
  const { band } = curve;
  if (band === null) return '';
  const draw = area<number>()
    .defined((i) => Number.isFinite(band.low[i]) && Number.isFinite(band.high[i]))
    .x((i) => positionOf(panel.x, curve.points[i][0]))
    .y0((i) => positionOf(panel.y, band.low[i]))
    .y1((i) => positionOf(panel.y, band.high[i]))
    .digits(2);
  const d = draw(curve.points.map((_, i) => i)) ?? '';
  return element('path', { d, fill: ink('band'), class: 'band' });
}

/** Labels right of the plot at the height where each curve ends, each with a piece of its dash pattern. */
function endLabels(
  panel: Panel,
  curves: readonly Curve[],
  dashes: readonly (string | null)[],
): Svg[] {
  const left = panel.plot.right + 6;
  const wanted = curves.map((curve, i) => ({
    curve,
    dash: dashes[i],
    y: positionOf(panel.y, lastValue(curve.points)),
  }));
  wanted.sort((a, b) => a.y - b.y);
  const placed: Box[] = [];
  return wanted.map(({ curve, dash, y }) => {
    const box = below(placed, labelBox(left, y, curve.label));
    placed.push(box);
    const colour = ink(curve.baseline ? 'quiet' : 'ink');
    const style = { size: LABEL_SIZE, fill: colour, class: 'curve-label', typeset: curveName };
    const y1 = box.bottom - LABEL_SIZE / 2 - 2;
    return (
      element('path', { d: `M${left},${y1}h${SAMPLE}`, stroke: colour, 'stroke-dasharray': dash }) +
      lettering(left + SAMPLE + 5, box.bottom - 4, curve.label, style)
    );
  });
}

function curveName(label: string): Svg {
  return labelText(label, () => true, LABEL_SIZE);
}

function labelBox(left: number, y: number, text: string): Box {
  const half = (LABEL_SIZE + 3) / 2;
  return { left, right: left + textWidth(text, LABEL_SIZE), top: y - half, bottom: y + half };
}

function below(placed: readonly Box[], box: Box): Box {
  const hit = placed.find((other) => overlaps(other, box));
  if (hit === undefined) return box;
  const height = box.bottom - box.top;
  return below(placed, { ...box, top: hit.bottom, bottom: hit.bottom + height });
}

function lastValue(points: Line): number {
  return points.findLast(([, value]) => Number.isFinite(value))?.[1] ?? 0;
}
