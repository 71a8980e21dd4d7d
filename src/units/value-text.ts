import { ratioFromText, ratioNumber } from './ratio.ts';
import type { QuantityMeaning } from './quantity.ts';
import type { Unit } from './unit.ts';
import { unitText } from './unit-text.ts';

/** How a value is written. */
export interface ValueStyle extends QuantityMeaning {
  /** Significant digits, 4 unless said. */
  readonly digits?: number;
}

/** Magnitudes from here on are written with a power of ten. */
const LARGE = 1e6;
/** Magnitudes below this are written with a power of ten. */
const SMALL = 1e-4;

/**
 * A number with a few significant digits: `0.3`, `-28.9`, `12346`, `1.2e-9`. Digits before the decimal point are
 * never rounded away below a million; infinities and NaN are said in words.
 */
export function formatNumber(value: number, digits = 4): string {
  if (Number.isNaN(value)) return 'not a number';
  if (!Number.isFinite(value)) return value > 0 ? 'infinite' : '-infinite';
  if (value === 0) return '0';
  const rounded = Number(value.toPrecision(digits));
  const magnitude = Math.abs(rounded);
  if (magnitude >= LARGE || magnitude < SMALL) return withPowerOfTen(rounded);
  if (magnitude >= 10 ** (digits - 1)) return wholeNumber(value);
  return String(rounded);
}

/** Rounding to a whole number may reach the limit: 999 999.7 is 1e6. */
function wholeNumber(value: number): string {
  const whole = Math.round(value);
  return Math.abs(whole) >= LARGE ? withPowerOfTen(whole) : String(whole);
}

function withPowerOfTen(rounded: number): string {
  return rounded.toExponential().replace('e+', 'e');
}

/**
 * The number that stands before `unit` for a value in coherent SI units: 0.0289 rad is 28.9 in mrad. Decibels are of
 * the magnitude; the decibels of 0 are −∞.
 */
export function valueIn(si: number, unit: Unit, meaning: QuantityMeaning = {}): number {
  if (unit.logarithmic)
    return (meaning.decibelsOf === 'power' ? 10 : 20) * Math.log10(Math.abs(si));
  const offset = meaning.difference ? 0 : ratioNumber(ratioFromText(unit.offset));
  return (si - offset) / unit.number;
}

/** A value in coherent SI units as text in a unit: `-28.9 mrad`, `45°`, `8 %`, `1.2e-9 m`. */
export function formatValue(si: number, unit: Unit, style: ValueStyle = {}): string {
  const value = valueIn(si, unit, style);
  const number = formatNumber(value, style.digits);
  const text = unitText(unit);
  if (text === '' || !Number.isFinite(value)) return number;
  // SI Brochure, 9th ed., 5.4.3: no space before °, ′ and ″ alone; a space before every other unit, % and °C too.
  return /^[°′″]$/.test(text) ? number + text : `${number} ${text}`;
}
