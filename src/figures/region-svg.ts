import { axesSvg, LABEL_SIZE, lettering, textWidth } from './axes.ts';
import type { Line, Polygon, RegionFigure } from './data.ts';
import { BASELINE_DASH, ink } from './ink.ts';
import { placeLabels } from './label-placement.ts';
import { labelText } from './label-text.ts';
import {
  panelOver,
  positionOf,
  type Box,
  type FigureLayout,
  type FigureSize,
  type Panel,
} from './scale.ts';
import { element, short, type Svg } from './svg.ts';

const MARGIN = { left: 62, right: 18, top: 58, bottom: 48 };

/** Height of a row of the key, and the room for the mark before its text. */
const KEY_ROW = 20;
const KEY_MARK = 20;

/** Radius of the point of the present gains. */
const POINT_RADIUS = 6;

/** Where a gain plane is plotted in a figure of this size. */
export function regionLayout(figure: RegionFigure, size: FigureSize): FigureLayout {
  const plot: Box = {
    left: MARGIN.left,
    right: size.width - MARGIN.right,
    top: MARGIN.top + (keyRows(figure, size).length - 1) * KEY_ROW,
    bottom: size.height - MARGIN.bottom,
  };
  const panel = panelOver(plot, [figure.x.from, figure.x.to], [figure.y.from, figure.y.to]);
  return { ...size, panels: [panel] };
}

/** A gain plane as SVG: areas as tints, boundaries labelled with their condition, the present gains as a point. */
export function regionSvg(figure: RegionFigure, size: FigureSize): Svg {
  const [panel] = regionLayout(figure, size).panels;
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${size.width} ${size.height}`,
      width: size.width,
      height: size.height,
      role: 'img',
      'aria-label': figure.title ?? `region of ${figure.x.name} and ${figure.y.name}`,
      class: 'figure region',
    },
    areaSvg(panel, figure.nominalArea, 'area'),
    areaSvg(panel, figure.toleranceArea ?? [], 'deep-area'),
    ...boundariesSvg(panel, figure),
    axesSvg(panel, figure.x, figure.y),
    ...boundaryLabels(panel, figure),
    keySvg(figure, size),
    pointSvg(panel, figure),
  );
}

function areaSvg(panel: Panel, polygons: readonly Polygon[], tint: 'area' | 'deep-area'): Svg {
  const d = polygons
    .flat()
    .map((ring) => `${pathOf(pixels(panel, ring))}Z`)
    .join('');
  const attributes = { d, fill: ink(tint), 'fill-rule': 'evenodd', class: tint };
  return d === '' ? '' : element('path', attributes);
}

function boundariesSvg(panel: Panel, figure: RegionFigure): Svg[] {
  const stroke = (
    lines: readonly Line[],
    colour: Svg,
    width: number,
    name: string,
    dash: string | null = null,
  ): Svg => {
    const d = lines.map((line) => pathOf(pixels(panel, line))).join('');
    const attributes = { d, fill: 'none', stroke: colour, 'stroke-width': width, class: name };
    return d === '' ? '' : element('path', { ...attributes, 'stroke-dasharray': dash });
  };
  return [
    ...figure.boundaries.map((b) => stroke(b.elsewhere, ink('faint'), 0.8, 'elsewhere')),
    stroke(figure.baseline, ink('quiet'), 1.2, 'baseline', BASELINE_DASH),
    ...figure.boundaries.map((b) => stroke(b.lines, ink('ink'), 1.5, 'boundary')),
  ];
}

/** Every boundary is labelled where it bounds the area, or, if it does so nowhere, lightly where it runs. */
function boundaryLabels(panel: Panel, figure: RegionFigure): Svg[] {
  const labels = figure.boundaries.map((boundary) => ({
    width: textWidth(shownLabel(boundary.label), LABEL_SIZE),
    height: LABEL_SIZE + 5,
    lines: (boundary.lines.length > 0 ? boundary.lines : boundary.elsewhere).map((line) =>
      pixels(panel, line),
    ),
  }));
  const light = figure.boundaries
    .filter(({ lines }) => lines.length > 0)
    .flatMap(({ elsewhere }) => elsewhere.map((line) => pixels(panel, line)));
  const occupied = occupiedByPoint(panel, figure);
  const isName = (word: string) => figure.names.includes(word);
  return placeLabels(labels, panel.plot, light, occupied).map((box, i) => {
    if (box === null) return '';
    const quiet = figure.boundaries[i].lines.length === 0;
    const style = {
      size: LABEL_SIZE,
      fill: ink(quiet ? 'quiet' : 'ink'),
      class: 'boundary-label',
      typeset: (text: string) => labelText(text, isName, LABEL_SIZE),
    };
    return lettering(box.left, box.bottom - 5, shownLabel(figure.boundaries[i].label), style);
  });
}

/** A condition as it is lettered: typographic relations and minus signs. */
function shownLabel(label: string): string {
  return label.replaceAll('>=', '≥').replaceAll('<=', '≤').replaceAll('-', '−');
}

function occupiedByPoint(panel: Panel, figure: RegionFigure): Box[] {
  if (figure.point === null) return [];
  const x = positionOf(panel.x, figure.point.x);
  const y = positionOf(panel.y, figure.point.y);
  const reach = POINT_RADIUS + 6;
  return [{ left: x - reach, right: x + reach, top: y - reach, bottom: y + reach }];
}

function pointSvg(panel: Panel, figure: RegionFigure): Svg {
  if (figure.point === null) return '';
  return pointMark(
    positionOf(panel.x, figure.point.x),
    positionOf(panel.y, figure.point.y),
    figure,
  );
}

function pointMark(cx: number, cy: number, figure: RegionFigure): Svg {
  const draggable = figure.point?.draggable ?? false;
  return element('circle', {
    cx,
    cy,
    r: POINT_RADIUS,
    fill: draggable ? ink('accent') : ink('ink'),
    stroke: ink('paper'),
    'stroke-width': 2,
    class: draggable ? 'point draggable' : 'point',
  });
}

interface KeyEntry {
  readonly mark: (x: number, y: number) => Svg;
  readonly text: string;
}

/** What the tints and the point mean, in rows above the plot. */
function keySvg(figure: RegionFigure, size: FigureSize): Svg {
  const rows = keyRows(figure, size).map((row, i) => {
    const y = 18 + i * KEY_ROW;
    return row.map(({ x, mark, text }) => {
      return mark(x, y) + lettering(x + KEY_MARK, y, text, { size: LABEL_SIZE });
    });
  });
  return element('g', { class: 'key' }, ...rows.flat());
}

/** The entries of the key with their places, broken into rows where the figure is narrow. */
function keyRows(
  figure: RegionFigure,
  size: FigureSize,
): readonly (readonly (KeyEntry & { readonly x: number })[])[] {
  const left = MARGIN.left - 46;
  const rows: (KeyEntry & { readonly x: number })[][] = [[]];
  let x = left;
  for (const entry of keyEntries(figure)) {
    const width = KEY_MARK + textWidth(entry.text, LABEL_SIZE);
    if (x > left && x + width > size.width) {
      rows.push([]);
      x = left;
    }
    rows.at(-1)?.push({ ...entry, x });
    x += width + 22;
  }
  return rows;
}

function keyEntries(figure: RegionFigure): readonly KeyEntry[] {
  const nominal = figure.nominalArea.length > 0 ? 'holds at nominal values' : 'holds nowhere here';
  const entries: KeyEntry[] = [{ mark: swatch('area'), text: nominal }];
  if (figure.toleranceArea !== null) {
    const robust = figure.toleranceArea.length > 0 ? 'holds' : 'holds nowhere here';
    entries.push({ mark: swatch('deep-area'), text: `${robust} over the tolerances` });
  }
  if (figure.baseline.length > 0) entries.push({ mark: baselineSample, text: 'baseline' });
  if (figure.point !== null) {
    entries.push({ mark: (x, y) => pointMark(x + 7, y - 4.5, figure), text: 'present gains' });
  }
  return entries;
}

function swatch(tint: 'area' | 'deep-area'): KeyEntry['mark'] {
  return (x, y) =>
    element('rect', {
      x,
      y: y - 10,
      width: 14,
      height: 11,
      fill: ink(tint),
      stroke: ink('quiet'),
      'stroke-width': 0.7,
    });
}

function baselineSample(x: number, y: number): Svg {
  return element('path', {
    d: `M${short(x)},${short(y - 4.5)}h15`,
    stroke: ink('quiet'),
    'stroke-width': 1.2,
    'stroke-dasharray': BASELINE_DASH,
  });
}

function pixels(panel: Panel, line: Line): Line {
  return line.map(([x, y]) => [positionOf(panel.x, x), positionOf(panel.y, y)]);
}

function pathOf(line: Line): string {
  return line.map(([x, y], i) => `${i === 0 ? 'M' : 'L'}${short(x)},${short(y)}`).join('');
}
