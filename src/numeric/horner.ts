import type { Complex } from './complex.ts';
import { DoubledComplex } from './double-double.ts';

/** The value and the slope of a polynomial, highest power first, at z by Horner's rule. */
export function hornerWithSlope(coefficients: Float64Array, z: Complex): [Complex, Complex] {
  let [re, im, slopeRe, slopeIm] = [0, 0, 0, 0];
  for (const coefficient of coefficients) {
    const nextSlope = slopeRe * z.re - slopeIm * z.im + re;
    slopeIm = slopeRe * z.im + slopeIm * z.re + im;
    slopeRe = nextSlope;
    const next = re * z.re - im * z.im + coefficient;
    im = re * z.im + im * z.re;
    re = next;
  }
  return [
    { re, im },
    { re: slopeRe, im: slopeIm },
  ];
}

/** The same in doubled precision, rounded at the end. */
export function doubledHornerWithSlope(coefficients: Float64Array, z: Complex): [Complex, Complex] {
  const value = new DoubledComplex();
  const slope = new DoubledComplex();
  for (const coefficient of coefficients) {
    slope.times(z);
    slope.add(value);
    value.times(z);
    value.re.addNumber(coefficient);
  }
  return [value.rounded(), slope.rounded()];
}

/** The sum of the magnitudes of a polynomial's terms where |z| = modulus. */
export function termSizes(coefficients: Float64Array, modulus: number): number {
  let sum = 0;
  for (const coefficient of coefficients) sum = sum * modulus + Math.abs(coefficient);
  return sum;
}
