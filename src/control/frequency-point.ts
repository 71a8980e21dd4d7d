import {
  addRatios,
  applyFunction,
  coefficientsIn,
  dependsOn,
  divRatios,
  isZeroRatio,
  laplace,
  mulRatios,
  negRatio,
  ratioFromPolynomial,
  ratioOf,
  subRatios,
  zeroRatio,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import { functionsOfS } from './s-polynomial.ts';

/** A complex number re + j im of exact parts. */
export interface ComplexRatio {
  readonly re: Ratio;
  readonly im: Ratio;
}

export const ZERO_POINT: ComplexRatio = Object.freeze({ re: zeroRatio, im: zeroRatio });

export function addPoints(a: ComplexRatio, b: ComplexRatio): ComplexRatio {
  return { re: addRatios(a.re, b.re), im: addRatios(a.im, b.im) };
}

export function mulPoints(a: ComplexRatio, b: ComplexRatio): ComplexRatio {
  return {
    re: subRatios(mulRatios(a.re, b.re), mulRatios(a.im, b.im)),
    im: addRatios(mulRatios(a.re, b.im), mulRatios(a.im, b.re)),
  };
}

/** |z|² */
export function squaredSize({ re, im }: ComplexRatio): Ratio {
  return addRatios(mulRatios(re, re), mulRatios(im, im));
}

/** Σ coefficients[k] z^k by Horner's rule. */
function sumOfPowers(coefficients: readonly ComplexRatio[], z: ComplexRatio): ComplexRatio {
  return coefficients.reduceRight((sum, c) => addPoints(mulPoints(sum, z), c), ZERO_POINT);
}

/** e^(−jωT) for an angular frequency ω and a time T. */
export function delayPoint(frequency: Ratio, time: Ratio): ComplexRatio | Refusal {
  const angle = mulRatios(frequency, time);
  const [re, im] = [applyFunction('cos', [angle]), applyFunction('sin', [angle])];
  if (isRefusal(re)) return re;
  return isRefusal(im) ? im : { re, im: negRatio(im) };
}

/** The dead time T of a function e^(−s T); refused for any other function of s. */
function deadTimeOf(g: Generator): Ratio | Refusal {
  const time = g.name === 'exp' ? negRatio(divRatios(g.args![0], ratioOf(laplace))) : null;
  return time && !dependsOn(time, laplace)
    ? time
    : refuse('function-of-s', `${g.name} of s has no value at a frequency`);
}

/** p(jω) for an angular frequency ω. */
function polynomialPoint(p: Polynomial, frequency: Ratio): ComplexRatio | Refusal {
  const [g] = functionsOfS(p);
  if (g) return delayedPoint(p, g, frequency);
  const coefficients = coefficientsIn(p, laplace).map((c) => ({
    re: ratioFromPolynomial(c),
    im: zeroRatio,
  }));
  return sumOfPowers(coefficients, { re: zeroRatio, im: frequency });
}

function delayedPoint(p: Polynomial, g: Generator, frequency: Ratio): ComplexRatio | Refusal {
  const time = deadTimeOf(g);
  if (isRefusal(time)) return time;
  const turn = delayPoint(frequency, time);
  if (isRefusal(turn)) return turn;
  const parts: ComplexRatio[] = [];
  for (const c of coefficientsIn(p, g)) {
    const part = polynomialPoint(c, frequency);
    if (isRefusal(part)) return part;
    parts.push(part);
  }
  return sumOfPowers(parts, turn);
}

/**
 * A transfer function at s = jω, exactly, with dead time as sines and cosines.
 *
 * `frequency`: ω in rad/s, free of s. Refused as `pole` where ω is that of a pole for all values, and for functions of s
 * other than dead time.
 */
export function atFrequency(transfer: Ratio, frequency: Ratio): ComplexRatio | Refusal {
  const top = polynomialPoint(transfer.num, frequency);
  if (isRefusal(top)) return top;
  const bottom = polynomialPoint(transfer.den, frequency);
  if (isRefusal(bottom)) return bottom;
  const size = squaredSize(bottom);
  if (isZeroRatio(size)) return refuse('pole', 'there is a pole at this frequency');
  const { re, im } = mulPoints(top, { re: bottom.re, im: negRatio(bottom.im) });
  return { re: divRatios(re, size), im: divRatios(im, size) };
}

/** |H(jω)|², as the quotient of squares; see {@link atFrequency} for ω and what is refused. */
export function squaredGain(transfer: Ratio, frequency: Ratio): Ratio | Refusal {
  const top = polynomialPoint(transfer.num, frequency);
  if (isRefusal(top)) return top;
  const bottom = polynomialPoint(transfer.den, frequency);
  if (isRefusal(bottom)) return bottom;
  const size = squaredSize(bottom);
  if (isZeroRatio(size)) return refuse('pole', 'there is a pole at this frequency');
  return divRatios(squaredSize(top), size);
}
