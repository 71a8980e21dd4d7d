/**
 * The dimension of a quantity: exponents of the seven SI base units in the order kg, m, s, A, K, mol, cd. They are
 * integers or, under a root (√Hz), multiples of 1/2, which doubles hold exactly. The plane angle has no dimension.
 */
export interface Dimension {
  readonly exponents: readonly number[];
}

/** Symbols of the base units, in the order of {@link Dimension.exponents}. */
export const BASE_UNITS = ['kg', 'm', 's', 'A', 'K', 'mol', 'cd'] as const;

/** The dimension of pure numbers and angles. */
export const dimensionless: Dimension = dimensionOf([]);

/** The dimension with the given leading exponents, in the order kg, m, s, A, K, mol, cd; the others are 0. */
export function dimensionOf(exponents: readonly number[]): Dimension {
  // Adding 0 turns −0 into 0, so that equal dimensions are equal data.
  const padded = BASE_UNITS.map((_, i) => (exponents[i] ?? 0) + 0);
  return Object.freeze({ exponents: Object.freeze(padded) });
}

/** Whether two dimensions are the same. */
export function equalDimensions(a: Dimension, b: Dimension): boolean {
  return a.exponents.every((exponent, i) => Math.abs(exponent - b.exponents[i]!) < 1e-9);
}

/** The dimension of a product. */
export function mulDimensions(a: Dimension, b: Dimension): Dimension {
  return dimensionOf(a.exponents.map((exponent, i) => exponent + b.exponents[i]!));
}

/** The dimension of a power with the rational exponent `numerator/denominator`. */
export function powDimension(base: Dimension, numerator: number, denominator = 1): Dimension {
  return dimensionOf(base.exponents.map((exponent) => (exponent * numerator) / denominator));
}
