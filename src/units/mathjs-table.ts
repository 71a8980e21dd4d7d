import * as mathjs from 'mathjs';
import { invariant } from '../base/index.ts';
import type { Dimension } from './dimension.ts';
import { dimensionOf } from './dimension.ts';
import type { Ratio } from './ratio.ts';
import { decimalRatio } from './ratio.ts';

/** What we read of an entry of mathjs's unit table. */
interface TableEntry {
  /** Exponents of mass, length, time, current, temperature, luminous intensity, amount, angle, bit. */
  readonly dimensions: readonly number[];
  /** The SI factor, except of the kilogram: mathjs counts mass in kg and calls `g` 0.001. */
  readonly value: number;
}

/** mathjs publishes this factory, but its type declarations leave it out. */
type UnitClassFactory = (scope: object) => { readonly UNITS: Readonly<Record<string, TableEntry>> };

/**
 * The class is built from its factory with the plain number operations: its table is all that we use, and the
 * arithmetic it would otherwise bring along weighs five times as much as the table.
 */
const UNITS = (mathjs as unknown as { createUnitClass: UnitClassFactory }).createUnitClass({
  config: { predictable: false, number: 'number' },
  addScalar: (a: number, b: number) => a + b,
  subtractScalar: (a: number, b: number) => a - b,
  multiplyScalar: (a: number, b: number) => a * b,
  divideScalar: (a: number, b: number) => a / b,
  pow: Math.pow,
  abs: Math.abs,
  fix: Math.trunc,
  round: Math.round,
  equal: Object.is,
  isNumeric: Number.isFinite,
  format: String,
  toNumeric: Number,
  typeOf: (value: unknown) => typeof value,
  number: Number,
  Complex: Object,
  BigNumber: Object,
  Fraction: Object,
}).UNITS;

/**
 * Dimension and SI factor of a unit of mathjs's table. The table holds doubles, so this is exact only for units
 * whose factor is a short decimal by definition; `unit-symbols.ts` asks for no others.
 */
export function mathjsUnit(name: string): { dimension: Dimension; factor: Ratio } {
  const entry = UNITS[name];
  const factor = decimalRatio(String(entry?.value));
  invariant(entry && factor, `mathjs has no unit ${name} with a plain factor`);
  const [mass, length, time, current, temperature, light, amount] = entry.dimensions;
  const exponents = [mass!, length!, time!, current!, temperature!, amount!, light!];
  return { dimension: dimensionOf(exponents), factor };
}
