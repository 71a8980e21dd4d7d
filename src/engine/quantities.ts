import {
  functionOf,
  mulRatios,
  parseRational,
  pi,
  powRatio,
  ratioFromRational,
  ratioOf,
  rational,
  type Ratio,
} from '../algebra/index.ts';
import type { InUnit, Quantity } from '../language/index.ts';
import {
  parseUnit,
  quantityToSI,
  type CustomUnits,
  type QuantityMeaning,
  type SiQuantity,
  type Unit,
} from '../units/index.ts';
import { demand } from './stop.ts';

/** The unit of a quantity as typed; stops at it where it is none. */
export function unitOfQuantity(quantity: Quantity, units: CustomUnits): Unit {
  return demand(parseUnit(quantity.unit, units), quantity.unitSpan);
}

/** Stops at the unit of `x in mrad` where it is none. */
export function requireUnit(
  { unit, unitSpan }: InUnit,
  meanings: { customUnits(): CustomUnits },
): void {
  demand(parseUnit(unit, meanings.customUnits()), unitSpan);
}

/** A quantity in coherent SI units. */
export function siOfQuantity(
  quantity: Quantity,
  unit: Unit,
  meaning?: QuantityMeaning,
): SiQuantity {
  return demand(quantityToSI(quantity.text, unit, meaning), quantity.span);
}

/** A quantity in a formula, exactly: a rational number times a power of π; decibels as a power of 10. */
export function quantityRatio(quantity: Quantity, meanings: { customUnits(): CustomUnits }): Ratio {
  const unit = unitOfQuantity(quantity, meanings.customUnits());
  if (unit.logarithmic) return decibelRatio(quantity.text);
  return exactRatio(siOfQuantity(quantity, unit));
}

/** The exact value of an SI quantity. */
export function exactRatio(si: SiQuantity): Ratio {
  const { n, d } = si.exactRational;
  const number = ratioFromRational(rational(n, d));
  return si.piPower === 0 ? number : mulRatios(number, powRatio(ratioOf(pi), si.piPower));
}

/** 10^(x/20) as exp(x/20 · log 10), so that nothing is rounded. */
function decibelRatio(text: string): Ratio {
  const logarithm = ratioOf(functionOf('log', [ratioFromRational(rational(10n))]));
  const twentieth = ratioFromRational(rational(1n, 20n));
  const exponent = mulRatios(
    mulRatios(ratioFromRational(parseRational(text)), twentieth),
    logarithm,
  );
  return ratioOf(functionOf('exp', [exponent]));
}
