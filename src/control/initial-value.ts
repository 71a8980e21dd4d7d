import {
  addRatios,
  coefficientsIn,
  divRatios,
  isZeroPolynomial,
  isZeroRatio,
  leadingCoefficientIn,
  laplace,
  mulRatios,
  ratioFromPolynomial,
  ratioOf,
  subRatios,
  zeroPolynomial,
  zeroRatio,
} from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import { noValue, plainValue } from './final-value.ts';
import { degreeInS, functionsOfS } from './s-polynomial.ts';
import type { FormulaValue, NoValue, SignalValue } from './values.ts';

/** A polynomial for s → +∞ along the real axis, where every dead time e^(−s T) vanishes. */
function withoutDeadTime(p: Polynomial): Polynomial {
  return functionsOfS(p).reduce(
    (rest, g) => (isZeroPolynomial(rest) ? rest : (coefficientsIn(rest, g)[0] ?? zeroPolynomial)),
    p,
  );
}

/** The limit of s X(s) for s → +∞, or 'impulse' where it is infinite. */
function limitAtInfinity(transform: Ratio): Ratio | 'impulse' {
  const numerator = withoutDeadTime(transform.num);
  const denominator = withoutDeadTime(transform.den);
  const excess = degreeInS(denominator) - degreeInS(numerator);
  if (isZeroPolynomial(numerator) || excess > 1) return zeroRatio;
  if (excess < 1) return 'impulse';
  return divRatios(
    ratioFromPolynomial(leadingCoefficientIn(numerator, laplace)),
    ratioFromPolynomial(leadingCoefficientIn(denominator, laplace)),
  );
}

/**
 * The transform of x' for t > 0, of a signal that does not start at rest: s X(s) − x(0+). Its jump from nothing at
 * t = 0 is no part of the motion, so that it leaves no impulse.
 */
export function derivativeFromStart(transform: Ratio): Ratio {
  const start = limitAtInfinity(transform);
  const raised = mulRatios(ratioOf(laplace), transform);
  return start === 'impulse' ? raised : subRatios(raised, start);
}

/**
 * The value of a signal just after t = 0, from the limit of s X(s) for s → ∞.
 *
 * Sources that begin later do not count. There is no value where the signal holds an impulse at t = 0, or noise.
 * Source: G. F. Franklin, J. D. Powell, A. Emami-Naeini, Feedback Control of Dynamic Systems, 6th ed., Pearson, 2010,
 * appendix A (from memory).
 */
export function initialValue(x: SignalValue): FormulaValue | NoValue {
  let sum = zeroRatio;
  for (const term of x.terms) {
    if (isZeroRatio(term.transform) || !isZeroRatio(term.after)) continue;
    if (term.source === 'random')
      return noValue(x, `the noise in ${term.input} has no initial value`);
    const limit = limitAtInfinity(term.transform);
    if (limit === 'impulse')
      return noValue(x, `an impulse at t = 0, from ${term.input || 'the transform'}`);
    sum = addRatios(sum, limit);
  }
  return plainValue(x, sum);
}
