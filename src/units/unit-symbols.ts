import type { Dimension } from './dimension.ts';
import { dimensionless, dimensionOf } from './dimension.ts';
import { mathjsUnit } from './mathjs-table.ts';
import type { Ratio } from './ratio.ts';
import { decimalRatio, multiplyRatios, ONE, ratio, ratioPower } from './ratio.ts';

/** One unit symbol without its prefix: `factor · pi^pi` coherent SI units. */
export interface UnitSymbol {
  readonly symbol: string;
  readonly dimension: Dimension;
  readonly factor: Ratio;
  /** Exponent of π in the factor. */
  readonly pi: number;
  /** Exponent of the plane angle, which has no dimension but is kept for display. */
  readonly angle: number;
  /** 1 for the hertz: the unit counts cycles, not radians. */
  readonly cycles: number;
  /** Whether SI prefixes may stand before it. */
  readonly prefixed: boolean;
}

/** A symbol as it stands in a unit: prefix and unit. */
export interface PrefixedSymbol {
  readonly prefix: string;
  readonly unit: UnitSymbol;
}

/** SI prefixes by their power of ten: BIPM, The International System of Units, 9th ed., 2019, table 7. */
export const PREFIXES: ReadonlyMap<string, number> = new Map([
  ...['Q', 'R', 'Y', 'Z', 'E', 'P', 'T', 'G', 'M', 'k'].map((p, i) => [p, 30 - 3 * i] as const),
  ...['m', 'µ', 'n', 'p', 'f', 'a', 'z', 'y', 'r', 'q'].map((p, i) => [p, -3 - 3 * i] as const),
  ...([
    ['h', 2],
    ['da', 1],
    ['d', -1],
    ['c', -2],
  ] as const),
]);

/** Symbols taken from mathjs's table, with its name where it differs. All these factors are exact by definition. */
const FROM_MATHJS: readonly (readonly [symbol: string, name: string, prefixed: boolean])[] = [
  ...[
    'm',
    'g',
    's',
    'A',
    'K',
    'mol',
    'cd',
    'N',
    'J',
    'W',
    'Pa',
    'V',
    'C',
    'F',
    'H',
    'T',
    'Wb',
    'S',
  ].map((symbol) => [symbol, symbol, true] as const),
  ...['ohm', 'L', 'l', 't', 'bar', 'Wh', 'Ah', 'VA'].map(
    (symbol) => [symbol, symbol, true] as const,
  ),
  ...['min', 'h', 'inch', 'ft', 'yd', 'mi', 'lb', 'oz', 'lbf', 'kgf', 'atm'].map(
    (symbol) => [symbol, symbol, false] as const,
  ),
  ['Ω', 'ohm', true],
  ['d', 'day', false],
];

const PER_SECOND = dimensionOf([0, 0, -1]);
const PRESSURE = dimensionOf([1, -1, -2]);
/** Pound-force: 0.45359237 kg × 9.80665 m/s², NIST SP 811 (2008), appendix B.8. */
const POUND_FORCE = mathjsUnit('lbf').factor;
const FOOT = mathjsUnit('ft').factor;
const INCH = mathjsUnit('inch').factor;

/**
 * Symbols of our own: angles, which mathjs holds as rounded multiples of π, and what it lacks or rounds.
 * Angles: SI Brochure, 9th ed., table 8. Revolution per minute, slug, psi, millimetre of mercury, knot: A. Thompson,
 * B. N. Taylor, NIST Special Publication 811 (2008), appendix B.8.
 */
const OWN: readonly UnitSymbol[] = [
  own('rad', { angle: 1, prefixed: true }),
  own('sr', { angle: 2, prefixed: true }),
  own('deg', { factor: ratio(1n, 180n), pi: 1, angle: 1, prefixed: true }),
  own('°', { factor: ratio(1n, 180n), pi: 1, angle: 1 }),
  ...['arcmin', '′'].map((symbol) => own(symbol, { factor: ratio(1n, 10800n), pi: 1, angle: 1 })),
  ...['arcsec', '″'].map((symbol) =>
    own(symbol, { factor: ratio(1n, 648000n), pi: 1, angle: 1, prefixed: symbol === 'arcsec' }),
  ),
  own('rev', { factor: ratio(2n), pi: 1, angle: 1 }),
  own('rpm', { dimension: PER_SECOND, factor: ratio(1n, 30n), pi: 1, angle: 1 }),
  own('Hz', { dimension: PER_SECOND, cycles: 1, prefixed: true }),
  own('Bq', { dimension: PER_SECOND, prefixed: true }),
  own('lm', { dimension: mathjsUnit('cd').dimension, prefixed: true }),
  own('lx', { dimension: dimensionOf([0, -2, 0, 0, 0, 0, 1]), prefixed: true }),
  own('Gy', { dimension: dimensionOf([0, 2, -2]), prefixed: true }),
  own('Sv', { dimension: dimensionOf([0, 2, -2]), prefixed: true }),
  own('kat', { dimension: dimensionOf([0, 0, -1, 0, 0, 1]), prefixed: true }),
  own('%', { factor: ratio(1n, 100n) }),
  own('‰', { factor: ratio(1n, 1000n) }),
  own('ppm', { factor: ratio(1n, 1_000_000n) }),
  own('slug', { dimension: dimensionOf([1]), factor: quotient(POUND_FORCE, FOOT) }),
  own('psi', { dimension: PRESSURE, factor: quotient(POUND_FORCE, ratioPower(INCH, 2)) }),
  own('mmHg', { dimension: PRESSURE, factor: decimalRatio('133.322387415')! }),
  own('kn', { dimension: dimensionOf([0, 1, -1]), factor: ratio(1852n, 3600n) }),
  own('nmi', { dimension: dimensionOf([0, 1]), factor: ratio(1852n) }),
];

function own(symbol: string, said: Partial<UnitSymbol>): UnitSymbol {
  const plain = { dimension: dimensionless, factor: ONE, pi: 0, angle: 0, cycles: 0 };
  return Object.freeze({ ...plain, prefixed: false, ...said, symbol });
}

function quotient(a: Ratio, b: Ratio): Ratio {
  return multiplyRatios(a, ratioPower(b, -1));
}

/** All symbols without prefixes. */
export const SYMBOLS: ReadonlyMap<string, UnitSymbol> = new Map(
  [
    ...FROM_MATHJS.map(([symbol, name, prefixed]) =>
      own(symbol, { ...mathjsUnit(name), prefixed }),
    ),
    ...OWN,
  ].map((unit) => [unit.symbol, unit]),
);

/** The look-alikes of a symbol in its one spelling: Greek mu and `u` before a unit are µ, the ohm sign is Ω. */
export function symbolSpelling(text: string): string {
  const plain = text.replaceAll('μ', 'µ').replaceAll('\u2126', 'Ω');
  return plain.length > 1 && plain.startsWith('u') ? `µ${plain.slice(1)}` : plain;
}

/** The unit symbol that a text is, with or without a prefix; a whole symbol (`min`, `ft`) goes before a prefix. */
export function findSymbol(text: string): PrefixedSymbol | null {
  const spelled = symbolSpelling(text);
  const whole = SYMBOLS.get(spelled);
  if (whole) return { prefix: '', unit: whole };
  for (const prefix of PREFIXES.keys()) {
    const unit = spelled.startsWith(prefix) ? SYMBOLS.get(spelled.slice(prefix.length)) : undefined;
    if (unit?.prefixed) return { prefix, unit };
  }
  return null;
}

/** The exact factor of a prefix; 1 for none. */
export function prefixFactor(prefix: string): Ratio {
  return ratioPower(ratio(10n), PREFIXES.get(prefix) ?? 0);
}
