import type { Dimension } from './dimension.ts';
import { BASE_UNITS, dimensionOf, mulDimensions } from './dimension.ts';

/** A unit symbol with its exponent. */
interface Factor {
  readonly symbol: string;
  readonly exponent: number;
}

/** Derived units that may stand in for the kilogram, as exponents of kg, m, s, A. On a tie the earlier is chosen. */
const MASS_SUBSTITUTES: readonly (readonly [string, readonly number[]])[] = [
  ['N', [1, 1, -2, 0]],
  ['kg', [1, 0, 0, 0]],
  ['V', [1, 2, -3, -1]],
  ['W', [1, 2, -3, 0]],
];

/** Dimensions with a name that the general rule would not find, as exponents of kg, m, s, A, K. */
const NAMED: readonly (readonly [string, readonly number[]])[] = [
  ['Pa', [1, -1, -2, 0]],
  ['Pa s', [1, -1, -1, 0]],
  ['C', [0, 0, 1, 1]],
  ['F', [-1, -2, 4, 2]],
  ['Ω', [1, 2, -3, -2]],
  ['H', [1, 2, -2, -2]],
  ['T', [1, 0, -2, -1]],
  ['J/K', [1, 2, -2, 0, -1]],
];

/** What a value counts besides its dimension: exponents of the plane angle (rad) and of the hertz. */
export interface Counted {
  readonly angle?: number;
  readonly cycles?: number;
}

/**
 * A coherent SI unit of a dimension, in words an engineer uses: `N m`, `m/s²`, `N² m² s`, with rad and Hz where they
 * are counted (`N m/rad`, `rad²/Hz`); the empty text for a pure number. Torque and energy have one dimension and are
 * both `N m`. The text reads back with `parseUnit`.
 */
export function dimensionText(dimension: Dimension, counted: Counted = {}): string {
  const { angle = 0, cycles = 0 } = counted;
  const plain = mulDimensions(dimension, dimensionOf([0, 0, cycles]));
  const isCounted = angle !== 0 || cycles !== 0;
  const named = NAMED.find(([, exponents]) =>
    plain.exponents.every((exponent, i) => exponent === (exponents[i] ?? 0)),
  );
  if (named && !isCounted) return named[0];
  const candidates = MASS_SUBSTITUTES.filter(([symbol]) => suits(symbol, plain, isCounted)).map(
    (substitute) => factorsWith(plain, ...substitute),
  );
  const best = candidates.reduce((least, next) => (cost(next) < cost(least) ? next : least));
  const counting = [
    { symbol: 'rad', exponent: angle },
    ...best,
    { symbol: 'Hz', exponent: cycles },
  ];
  return productText(counting.filter((factor) => factor.exponent !== 0));
}

/**
 * No volts without a current; heat per kelvin in watts, W/(m² K), rather than newtons; per radian or per hertz
 * torques and forces, N m/(rad s), rather than power, W/rad.
 */
function suits(symbol: string, dimension: Dimension, isCounted: boolean): boolean {
  const [, , , current, temperature] = dimension.exponents;
  if (symbol === 'V') return current !== 0;
  return symbol === 'N' ? temperature === 0 : symbol !== 'W' || !isCounted;
}

/** The dimension as powers of `symbol` (in place of kg) and the other base units. */
function factorsWith(dimension: Dimension, symbol: string, per: readonly number[]): Factor[] {
  const mass = dimension.exponents[0]!;
  const rest = dimension.exponents.map((exponent, i) => exponent - mass * (per[i] ?? 0));
  return [
    { symbol, exponent: mass },
    ...rest.map((e, i) => ({ symbol: BASE_UNITS[i]!, exponent: e })),
  ].filter((factor) => factor.exponent !== 0);
}

function cost(factors: readonly Factor[]): number {
  return factors.reduce((sum, factor) => sum + Math.abs(factor.exponent), 0);
}

function productText(factors: readonly Factor[]): string {
  const above = factors.filter((factor) => factor.exponent > 0).flatMap(powerTexts);
  const below = factors
    .filter((factor) => factor.exponent < 0)
    .flatMap(({ symbol, exponent }) => powerTexts({ symbol, exponent: -exponent }));
  if (below.length === 0) return above.join(' ');
  const denominator = below.length === 1 ? below[0]! : `(${below.join(' ')})`;
  return `${above.join(' ') || '1'}/${denominator}`;
}

/** `s³` for 3, `s √s` for 3/2: only what the unit syntax can read back, where it can. */
function powerTexts({ symbol, exponent }: Factor): string[] {
  const whole = Math.floor(exponent);
  if (exponent - whole === 0.5) {
    return [...(whole > 0 ? [powerText(symbol, whole)] : []), `√${symbol}`];
  }
  return [powerText(symbol, exponent)];
}

function powerText(symbol: string, exponent: number): string {
  if (exponent === 1) return symbol;
  return Number.isInteger(exponent) ? symbol + superscript(exponent) : `${symbol}^${exponent}`;
}

/** An integer in superscript digits: `⁻²`. */
export function superscript(exponent: number): string {
  return [...String(exponent)].map((c) => (c === '-' ? '⁻' : '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(c)]!)).join('');
}
