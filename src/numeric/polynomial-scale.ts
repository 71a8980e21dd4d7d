/**
 * A polynomial with its trailing zeros taken out and its coefficients scaled by powers of two, so that its roots lie
 * around the unit circle and nothing overflows: p(s) = s^zeros · c · q(s / unit).
 */
export interface ScaledPolynomial {
  /** Coefficients of q, highest power first; the first and last are not 0. */
  readonly coefficients: Float64Array;
  /** Number of roots at the origin. */
  readonly zeros: number;
  /** Roots of p are roots of q times this power of two. */
  readonly unit: number;
}

/** Scales a polynomial, highest power first, with finite coefficients that are not all 0; leading zeros are dropped. */
export function scalePolynomial(coefficients: readonly number[]): ScaledPolynomial {
  const first = coefficients.findIndex((coefficient) => coefficient !== 0);
  const last = coefficients.findLastIndex((coefficient) => coefficient !== 0);
  const core = coefficients.slice(first, last + 1);
  const degree = core.length - 1;
  const exponents = core.map((coefficient) => Math.log2(Math.abs(coefficient)));
  const step = degree === 0 ? 0 : Math.round((exponents[degree]! - exponents[0]!) / degree);
  const shifted = exponents.map((exponent, i) => exponent + (degree - i) * step);
  const top = Math.ceil(Math.max(...shifted));
  const scaled = core.map((coefficient, i) =>
    timesPowerOfTwo(coefficient, (degree - i) * step - top),
  );
  return {
    coefficients: Float64Array.from(scaled),
    zeros: coefficients.length - 1 - last,
    unit: timesPowerOfTwo(1, step),
  };
}

/** In three steps, since 2^exponent alone may overflow where the product does not. */
function timesPowerOfTwo(value: number, exponent: number): number {
  const third = Math.trunc(exponent / 3);
  return value * 2 ** third * 2 ** third * 2 ** (exponent - 2 * third);
}
