import {
  type AssumptionStatement,
  type Quantity,
  type ToleranceClause,
} from '../language/index.ts';
import { type CustomUnits, type SiQuantity, type Unit } from '../units/index.ts';
import { siOfQuantity, unitOfQuantity } from './quantities.ts';
import { outcomeOf, stopAt, type Outcome } from './stop.ts';

/** An assumption's number, in coherent SI units. */
export interface AssumptionReading {
  readonly unit: Unit;
  readonly value: SiQuantity;
  readonly tolerance: ToleranceReading | null;
}

/** Hard bounds in SI units, or a normal distribution whose half-width is so many standard deviations. */
export interface ToleranceReading {
  readonly low: number;
  readonly high: number;
  readonly sigma: number | null;
}

/** Reads the number, the unit and the tolerance of an assumption. */
export function readAssumption(
  node: AssumptionStatement,
  units: CustomUnits,
): Outcome<AssumptionReading> {
  return outcomeOf(node.span, () => {
    const unit = unitOfQuantity(typedNominal(node), units);
    const value = siOfQuantity(node.value, unit);
    return {
      unit,
      value,
      tolerance: node.tolerance && readTolerance(node, node.tolerance, unit, value, units),
    };
  });
}

/** The nominal with its unit: in `480 ± 20 kg m^2` and `260 from 0 to 400 N m` a bare number takes that of its partner. */
export function typedNominal({ value, tolerance }: AssumptionStatement): Quantity {
  if (value.unit !== '' || tolerance === null) return value;
  const partner =
    tolerance.kind === 'half-width'
      ? tolerance.half
      : [tolerance.to, tolerance.from].find((end) => end.unit !== '');
  if (!partner || partner.unit === '%') return value;
  return { ...value, unit: partner.unit, unitSpan: partner.unitSpan };
}

function readTolerance(
  node: AssumptionStatement,
  tolerance: ToleranceClause,
  unit: Unit,
  value: SiQuantity,
  units: CustomUnits,
): ToleranceReading {
  if (tolerance.kind === 'range') return readRange(node, tolerance, unit, value, units);
  const [low, high] = boundsAround(node, tolerance.half, unit, value, units);
  if (Number(tolerance.half.text) < 0)
    stopAt(
      tolerance.half.span,
      'negative-tolerance',
      'A tolerance is a half-width; it cannot be negative.',
    );
  const sigmas = tolerance.sigmas === null ? null : Number(tolerance.sigmas);
  if (sigmas !== null && !(sigmas > 0)) {
    stopAt(
      tolerance.span,
      'bad-sigma',
      'The number of standard deviations is positive, as in `at 3 sigma`.',
    );
  }
  const sigma = sigmas === null ? null : (high - low) / (2 * sigmas);
  return { low, high, sigma };
}

/** Nominal minus and plus the half-width; decibels are added as decibels, so that the ratio is multiplied and divided. */
function boundsAround(
  node: AssumptionStatement,
  half: Quantity,
  unit: Unit,
  value: SiQuantity,
  units: CustomUnits,
): readonly [number, number] {
  if (unit.logarithmic && half.unit !== '%') {
    if (half.unit !== '') requireSameKind(half, unitOfQuantity(half, units), unit, node.name);
    const factor = siOfQuantity(half, unit).value;
    return [value.value / factor, value.value * factor];
  }
  const width = halfWidth(node, half, unit, value, units);
  return [value.value - width, value.value + width];
}

function halfWidth(
  node: AssumptionStatement,
  half: Quantity,
  unit: Unit,
  value: SiQuantity,
  units: CustomUnits,
): number {
  const typed = half.unit === '' ? unit : unitOfQuantity(half, units);
  if (!typed.isPercent || half.unit === '') {
    requireSameKind(half, typed, unit, node.name);
    return siOfQuantity(half, typed, { difference: true }).value;
  }
  if (unit.isPercent) {
    stopAt(
      half.span,
      'percent-of-percent',
      `${node.name} is in %, so ± % could mean two things; give the tolerance as a number without unit.`,
    );
  }
  if (unit.logarithmic) {
    stopAt(
      half.span,
      'percent-of-decibels',
      `${node.name} is in dB, so ± % could mean two things; give the tolerance in dB.`,
    );
  }
  if (Number(unit.offset.split('/')[0]) !== 0) {
    stopAt(
      half.span,
      'percent-of-temperature',
      'A percentage of a temperature in °C has no meaning; give the tolerance in K.',
    );
  }
  if (value.value === 0) {
    stopAt(
      half.span,
      'percent-of-zero',
      `${node.name} is 0, so a tolerance in % is 0 too; give it as a quantity or a range.`,
    );
  }
  return (Math.abs(value.value) * Number(half.text)) / 100;
}

function requireSameKind(quantity: Quantity, typed: Unit, unit: Unit, name: string): void {
  const same = typed.dimension.exponents.every(
    (exponent, index) => exponent === unit.dimension.exponents[index],
  );
  if (same && typed.logarithmic === unit.logarithmic) return;
  stopAt(
    quantity.unit === '' ? quantity.span : quantity.unitSpan,
    'unit-mismatch',
    `${name} is given in ${unit.text || 'no unit'}, and ${typed.text || 'no unit'} does not fit it.`,
  );
}

function readRange(
  node: AssumptionStatement,
  range: Extract<ToleranceClause, { kind: 'range' }>,
  unit: Unit,
  value: SiQuantity,
  units: CustomUnits,
): ToleranceReading {
  const [low, high] = readBounds(range.from, range.to, unit, node.name, units);
  if (value.value < low || value.value > high) {
    stopAt(
      range.span,
      'nominal-outside-range',
      `The nominal of ${node.name}, ${node.value.text} ${node.value.unit}, is outside its range.`,
    );
  }
  return { low, high, sigma: null };
}

/** The two ends of a range in SI; a bare number takes the unit of its partner, else the nominal's. */
export function readBounds(
  from: Quantity,
  to: Quantity,
  unit: Unit,
  name: string,
  units: CustomUnits,
): readonly [number, number] {
  const pick = (own: Quantity, partner: Quantity): Unit => {
    if (own.unit !== '') return unitOfQuantity(own, units);
    return partner.unit !== '' ? unitOfQuantity(partner, units) : unit;
  };
  const ends = [
    [from, pick(from, to)],
    [to, pick(to, from)],
  ] as const;
  for (const [end, typed] of ends) requireSameKind(end, typed, unit, name);
  const [low, high] = ends.map(([end, typed]) => siOfQuantity(end, typed).value);
  if (low > high)
    stopAt(
      { from: from.span.from, to: to.span.to },
      'reversed-range',
      'The range runs backwards; the smaller number comes first.',
    );
  return [low, high];
}
