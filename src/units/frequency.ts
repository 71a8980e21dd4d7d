import { dimensionOf, equalDimensions } from './dimension.ts';
import type { Unit } from './unit.ts';

const PER_SECOND = dimensionOf([0, 0, -1]);

/**
 * What to multiply a frequency by before it is shown in a unit: 1/(2π) for an angular frequency shown in Hz, 2π for a
 * frequency f shown in rad/s or rpm, else 1.
 *
 * `cycles` is 1 where the value is a frequency f in cycles per second; every other value in 1/s is angular, since formulas
 * do not convert (ISO 80000-3, items 3-17 and 3-18). Units of other dimensions need no factor: densities are
 * per Hz throughout.
 */
export function cycleFactor(cycles: number, unit: Unit): number {
  if (!equalDimensions(unit.dimension, PER_SECOND)) return 1;
  if (cycles === 0 && unit.cycles === 1) return 1 / (2 * Math.PI);
  return cycles === 1 && unit.angle === 1 ? 2 * Math.PI : 1;
}
