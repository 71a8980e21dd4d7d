import type { Axis } from './data.ts';
import { FONT, ink } from './ink.ts';
import { labelText } from './label-text.ts';
import { positionOf, type Panel } from './scale.ts';
import { element, escape, type Svg } from './svg.ts';
import { ticksOver, type Tick } from './ticks.ts';

const TICK_LENGTH = 5;
export const TICK_SIZE = 12;
export const LABEL_SIZE = 13;

/** Pixels between ticks that leave room for their numbers. */
const TICK_SPACING = { x: 90, y: 48 };

/** Width of a text in pixels, estimated from its letters: enough for placing, never for clipping. */
export function textWidth(text: string, size: number): number {
  return [...text].reduce((width, letter) => width + size * letterWidth(letter), 0);
}

function letterWidth(letter: string): number {
  if (/[ijlt.,:;|'() /I[\]]/.test(letter)) return 0.32;
  return /[mwMW≥≤<>=+−%]/.test(letter) ? 0.8 : 0.56;
}

interface Lettering {
  readonly size: number;
  readonly anchor?: 'start' | 'middle' | 'end';
  readonly fill?: string;
  readonly class?: string;
  /** How the text is set; as it stands, if not given. */
  readonly typeset?: (text: string) => Svg;
}

/** One line of text at a baseline position. */
export function lettering(x: number, y: number, text: string, style: Lettering): Svg {
  const attributes = {
    x,
    y,
    class: style.class ?? null,
    'font-family': FONT,
    'font-size': style.size,
    'text-anchor': style.anchor ?? 'start',
    fill: style.fill ?? ink('ink'),
  };
  return element('text', attributes, (style.typeset ?? escape)(text));
}

/** What is written at an axis: a quantity, and its unit after it. */
interface AxisLabel {
  readonly label: string;
  readonly unit: string;
}

/** The label of an axis: names in its quantity are set as such, its unit as it stands. */
function axisLettering(x: number, y: number, { label, unit }: AxisLabel, style: Lettering): Svg {
  const end = label.endsWith(unit) ? label.length - unit.length : label.length;
  const typeset = (text: string) =>
    labelText(text.slice(0, end), () => true, style.size) + escape(text.slice(end));
  return lettering(x, y, label, { ...style, typeset });
}

/** Axis lines, ticks and numbers of a panel, the quantity and unit at the right end of x and on top of y. */
export function axesSvg(panel: Panel, x: Axis, y: AxisLabel, showX = true): Svg {
  const { plot } = panel;
  const frame = element('path', {
    d: `M${plot.left},${plot.top}V${plot.bottom}H${plot.right}`,
    fill: 'none',
    stroke: ink('quiet'),
    'stroke-width': 1,
  });
  const label = axisLettering(plot.left - 46, plot.top - 12, y, { size: LABEL_SIZE });
  return element('g', { class: 'axes' }, frame, ...xAxis(panel, x, showX), ...yAxis(panel), label);
}

function xAxis(panel: Panel, x: Axis, showNumbers: boolean): Svg[] {
  const { plot } = panel;
  const count = Math.max(2, Math.round((plot.right - plot.left) / TICK_SPACING.x));
  const marks = ticksOver(panel.x.domain, count).flatMap((tick) => {
    const at = positionOf(panel.x, tick.value);
    const number = lettering(at, plot.bottom + 19, tick.text, numberStyle('middle'));
    const mark = tickMark(at, plot.bottom, 0, TICK_LENGTH);
    return showNumbers ? [mark, number] : [mark];
  });
  if (!showNumbers) return marks;
  const style = { size: LABEL_SIZE, anchor: 'end' as const };
  return [...marks, axisLettering(plot.right, plot.bottom + 38, x, style)];
}

function yAxis(panel: Panel): Svg[] {
  const { plot } = panel;
  return verticalTicks(panel).flatMap((tick) => {
    const at = positionOf(panel.y, tick.value);
    return [
      tickMark(plot.left, at, -TICK_LENGTH, 0),
      lettering(plot.left - 9, at + 4, tick.text, numberStyle('end')),
    ];
  });
}

function verticalTicks(panel: Panel): readonly Tick[] {
  const count = Math.max(2, Math.round((panel.plot.bottom - panel.plot.top) / TICK_SPACING.y));
  return ticksOver(panel.y.domain, count);
}

function numberStyle(anchor: 'middle' | 'end'): Lettering {
  return { size: TICK_SIZE, anchor, fill: ink('quiet') };
}

function tickMark(x: number, y: number, dx: number, dy: number): Svg {
  return element('line', {
    x1: x,
    y1: y,
    x2: x + dx,
    y2: y + dy,
    stroke: ink('quiet'),
    'stroke-width': 1,
  });
}
