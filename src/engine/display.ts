import { isRefusal } from '../base/index.ts';
import type { Expression } from '../language/index.ts';
import {
  chooseUnit,
  coherentUnit,
  cycleFactor,
  formatNumber,
  formatValue,
  parseUnit,
  unitText,
  valueIn,
  type CustomUnits,
  type QuantityMeaning,
  type Unit,
} from '../units/index.ts';
import {
  cyclesOf,
  dimensionIn,
  isRate,
  shownAngle,
  shownCycles,
  type Measure,
} from './measures.ts';

/** How the value of an expression is shown: the unit, and the factor from its own SI value to the shown quantity's. */
export interface Display {
  /** Null where nothing gives a unit: chosen by the value's size where it is. */
  readonly fixed: Unit | null;
  readonly measure: Measure | null;
  readonly factor: number;
  /** How decibels are meant. */
  readonly meaning: QuantityMeaning;
  readonly notes: readonly string[];
}

/** The way to show an expression: in the unit that `in` names, else in one that fits its measure. */
export function displayOf(
  expression: Expression,
  measure: Measure | null,
  units: CustomUnits,
): Display {
  const meaning: QuantityMeaning = { decibelsOf: measure?.densities ? 'power' : 'amplitude' };
  const plain = { fixed: null, measure, factor: 1, meaning, notes: [] };
  if (expression.kind !== 'in-unit') return plain;
  const unit = parseUnit(expression.unit, units);
  if (isRefusal(unit)) return plain;
  const factor = measure && isRate(measure) ? cycleFactor(cyclesOf(measure), unit) : 1;
  if (factor === 1) return { ...plain, fixed: unit };
  const note =
    factor < 1
      ? 'An angular frequency is divided by 2π to be shown in Hz.'
      : 'A frequency in Hz is multiplied by 2π to be shown as an angular frequency.';
  return { ...plain, fixed: unit, factor, notes: [note] };
}

/** The unit in which a value of this size is shown. */
export function unitFor(display: Display, si: number, hints: readonly Unit[]): Unit | null {
  if (display.fixed) return display.fixed;
  const { measure } = display;
  if (!measure) return null;
  return chooseUnit(dimensionIn(measure), hints, si, {
    angle: shownAngle(measure),
    cycles: shownCycles(measure),
  });
}

/** The coherent SI unit of a value, or null for a pure number or an unknown unit. */
export function coherentText(measure: Measure | null): string | null {
  if (!measure) return null;
  const unit = coherentUnit(dimensionIn(measure), {
    angle: shownAngle(measure),
    cycles: shownCycles(measure),
  });
  return unitText(unit) || null;
}

/** A value as text: `-28.9 mrad`. */
export function showValue(si: number, display: Display, hints: readonly Unit[]): string {
  const unit = unitFor(display, si, hints);
  return unit ? formatValue(si * display.factor, unit, display.meaning) : formatNumber(si);
}

/** A span as text: `-44 to 0 mrad`. */
export function showSpan(
  low: number,
  high: number,
  display: Display,
  hints: readonly Unit[],
): string {
  const unit = unitFor(display, Math.max(Math.abs(low), Math.abs(high)), hints);
  if (!unit) return `${formatNumber(low)} to ${formatNumber(high)}`;
  const end = formatValue(high * display.factor, unit, display.meaning);
  return `${formatNumber(valueIn(low * display.factor, unit, display.meaning))} to ${end}`;
}
