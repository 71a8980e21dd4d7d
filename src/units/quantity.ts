import { isRefusal, refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import type { Ratio } from './ratio.ts';
import {
  addRatios,
  decimalRatio,
  multiplyRatios,
  ratio,
  ratioFromText,
  ratioNumber,
  ratioPower,
} from './ratio.ts';
import type { Unit } from './unit.ts';
import { scaleOf, unitFrom } from './unit.ts';
import { isUnitSymbol } from './unit-parse.ts';

/** A quantity in coherent SI units: `exactRational · π^piPower`. */
export interface SiQuantity {
  readonly exactRational: Ratio;
  readonly piPower: number;
  /** The same as a double. */
  readonly value: number;
  /** False where the number is irrational (most decibels): then `exactRational` is the value, rounded to a double. */
  readonly exact: boolean;
}

/** How a number with a unit is meant, where the unit alone does not say. */
export interface QuantityMeaning {
  /** A difference or a tolerance: °C then has no zero point. */
  readonly difference?: boolean;
  /** Whether decibels are of a ratio of amplitudes (20 log10, the default) or of densities or variances (10 log10). */
  readonly decibelsOf?: 'amplitude' | 'power';
}

/** Beyond this many decibels a ratio does not fit a double. */
const MOST_DECIBELS = 6000;

/**
 * A decimal number in a unit, exactly, in coherent SI units: `1.2` in µrad is 3/2500000, `45` in ° is 1/4 · π.
 *
 * Refuses a text that is not a decimal number, and numbers beyond 1e±300.
 */
export function quantityToSI(
  numberText: string,
  unit: Unit,
  meaning: QuantityMeaning = {},
): SiQuantity | Refusal {
  const typed = decimalRatio(numberText);
  if (!typed) return refuse('number-range', `'${numberText}' is not a number within 1e±300`);
  if (unit.logarithmic) return fromDecibels(typed, meaning.decibelsOf === 'power' ? 10 : 20);
  const scaled = multiplyRatios(typed, ratioFromText(unit.factor.rational));
  const offset = meaning.difference ? ratio(0n) : ratioFromText(unit.offset);
  return siQuantity(addRatios(scaled, offset), unit.factor.pi, true);
}

function siQuantity(exactRational: Ratio, piPower: number, exact: boolean): SiQuantity {
  const value = ratioNumber(exactRational) * Math.PI ** piPower;
  return Object.freeze({ exactRational, piPower, value, exact });
}

/** 10^(decibels/perDecade): exact where that is a power of ten, else rounded to a double. */
function fromDecibels(decibels: Ratio, perDecade: number): SiQuantity | Refusal {
  const decades = multiplyRatios(decibels, ratio(1n, BigInt(perDecade)));
  const count = ratioNumber(decades);
  if (Math.abs(count) > MOST_DECIBELS / 20) {
    return refuse('number-range', `${ratioNumber(decibels)} dB is beyond what a number can hold`);
  }
  if (decades.d === 1n) return siQuantity(ratioPower(ratio(10n), count), 0, true);
  return siQuantity(decimalRatio(String(10 ** count))!, 0, false);
}

/**
 * A unit that a worksheet defines, `unit count is 1.2 µrad`.
 *
 * Refuses a symbol that is a unit already, a size of 0, and units that cannot be multiplied (°C, dB).
 */
export function customUnit(symbol: string, numberText: string, unit: Unit): Unit | Refusal {
  if (isUnitSymbol(symbol)) return refuse('unit-taken', `${symbol} is a unit already`);
  if (unit.logarithmic || unit.offset !== '0') {
    return refuse('unit-alone', `${symbol} cannot be defined in ${unit.text}`);
  }
  const size = quantityToSI(numberText, unit);
  if (isRefusal(size)) return size;
  if (size.exactRational.n <= 0n) {
    return refuse('unit-size', `the unit ${symbol} needs a size greater than 0`);
  }
  return unitFrom(symbol, { ...scaleOf(unit), factor: size.exactRational });
}
