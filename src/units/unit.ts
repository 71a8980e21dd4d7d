import type { Dimension } from './dimension.ts';
import { dimensionless, mulDimensions, powDimension } from './dimension.ts';
import type { Ratio } from './ratio.ts';
import {
  multiplyRatios,
  ONE,
  ratioFromText,
  ratioNumber,
  ratioPower,
  ratioRoot,
  ratioText,
} from './ratio.ts';

/** An exact conversion factor, `rational · π^pi`; `rational` is `n` or `n/d` in lowest terms. */
export interface ExactFactor {
  readonly rational: string;
  readonly pi: number;
}

/**
 * A unit as typed. A number x in this unit is x · number + offset in coherent SI units, except for the decibel
 * (`logarithmic`), whose number is the logarithm of a ratio.
 */
export interface Unit {
  readonly kind: 'unit';
  /** As typed, trimmed; empty for the unit one. */
  readonly text: string;
  readonly dimension: Dimension;
  readonly factor: ExactFactor;
  /** The factor as the nearest double. */
  readonly number: number;
  /** Zero point in SI units, as a rational text: `5463/20` (273.15 K) for °C, else `0`. */
  readonly offset: string;
  /** Exponent of the plane angle, kept for display: 1 for rad, −1 for N m/rad. */
  readonly angle: number;
  /** Exponent of the hertz, which counts cycles: 1 for Hz, −1 for rad²/Hz, −1/2 for m/√Hz. */
  readonly cycles: number;
  readonly logarithmic: null | 'dB';
  /** Whether this is the bare percent sign. */
  readonly isPercent: boolean;
}

/** What multiplies when units do: a {@link Unit} without its text. */
export interface UnitScale {
  readonly dimension: Dimension;
  readonly factor: Ratio;
  readonly pi: number;
  readonly angle: number;
  readonly cycles: number;
}

/** The scale of the unit one. */
export const unitScale: UnitScale = {
  dimension: dimensionless,
  factor: ONE,
  pi: 0,
  angle: 0,
  cycles: 0,
};

/** The scale of a product of units. */
export function multiplyScales(a: UnitScale, b: UnitScale): UnitScale {
  return {
    dimension: mulDimensions(a.dimension, b.dimension),
    factor: multiplyRatios(a.factor, b.factor),
    pi: a.pi + b.pi,
    angle: a.angle + b.angle,
    cycles: a.cycles + b.cycles,
  };
}

/** The scale of an integer power of a unit. */
export function scalePower(base: UnitScale, exponent: number): UnitScale {
  return { ...scaleExponents(base, exponent), factor: ratioPower(base.factor, exponent) };
}

/** The scale of the square root of a unit, or null where its factor is irrational. */
export function scaleRoot(square: UnitScale): UnitScale | null {
  const factor = ratioRoot(square.factor);
  return factor && { ...scaleExponents(square, 0.5), factor };
}

/** Adding 0 turns −0 into 0, so that equal units are equal data. */
function scaleExponents(base: UnitScale, exponent: number): Omit<UnitScale, 'factor'> {
  return {
    dimension: powDimension(base.dimension, exponent),
    pi: base.pi * exponent + 0,
    angle: base.angle * exponent + 0,
    cycles: base.cycles * exponent + 0,
  };
}

/** The scale of a finished unit. */
export function scaleOf(unit: Unit): UnitScale {
  const { dimension, factor, angle, cycles } = unit;
  return { dimension, factor: ratioFromText(factor.rational), pi: factor.pi, angle, cycles };
}

/** A unit from its scale; `special` says what a scale does not hold. */
export function unitFrom(text: string, scale: UnitScale, special: Partial<Unit> = {}): Unit {
  const { dimension, factor, pi, angle, cycles } = scale;
  return Object.freeze({
    kind: 'unit',
    text,
    dimension,
    factor: Object.freeze({ rational: ratioText(factor), pi }),
    number: ratioNumber(factor) * Math.PI ** pi,
    offset: '0',
    angle,
    cycles,
    logarithmic: null,
    isPercent: false,
    ...special,
  });
}

/** The unit one, of a bare number. */
export const unitOne: Unit = unitFrom('', unitScale);
