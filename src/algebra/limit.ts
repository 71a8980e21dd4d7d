import { isRefusal, refuse, type Budget, type Refusal } from '../base/index.ts';
import { derivativeRatio } from './derivative.ts';
import { substituteRatio } from './evaluation.ts';
import { generatorDependsOn } from './generator.ts';
import { degreeIn, leadingCoefficientIn } from './polynomial.ts';
import { signRational } from './rational.ts';
import {
  asRational,
  divRatios,
  generatorsOfRatio,
  isZeroRatio,
  ratio,
  ratioFromPolynomial,
  zeroRatio,
} from './ratio.ts';
import type { Generator, Ratio } from './ring.ts';

/**
 * The limit of r as a generator goes to a finite value or to +infinity. Refused as `infinite` (with the sign where
 * it is the same from both sides and known) where it grows without bound, and as `undefined` where it cannot be
 * decided, as for a function at infinity.
 */
export function limitRatio(
  r: Ratio,
  g: Generator,
  to: Ratio | 'infinity',
  budget?: Budget,
): Ratio | Refusal {
  return to === 'infinity' ? limitAtInfinity(r, g, budget) : limitAtPoint(r, g, to, budget);
}

function infinite(sign: -1 | 0 | 1): Refusal {
  const direction = sign > 0 ? ' towards +∞' : sign < 0 ? ' towards −∞' : '';
  return refuse('infinite', `it grows without bound${direction}`);
}

function signOf(r: Ratio): -1 | 0 | 1 {
  const number = asRational(r);
  return number ? signRational(number) : 0;
}

function limitAtInfinity(r: Ratio, g: Generator, budget?: Budget): Ratio | Refusal {
  const nested = generatorsOfRatio(r).find((other) => other !== g && generatorDependsOn(other, g));
  if (nested) return refuse('undefined', `the limit of ${nested.name} at infinity is not decided`);
  const excess = degreeIn(r.num, g) - degreeIn(r.den, g);
  if (excess < 0 || isZeroRatio(r)) return zeroRatio;
  const lead = ratio(leadingCoefficientIn(r.num, g), leadingCoefficientIn(r.den, g), budget);
  return excess === 0 ? lead : infinite(signOf(lead));
}

const DERIVATIVES = 24;

/** Differentiates numerator and denominator until one of them does not vanish (the rule of l'Hôpital). */
function limitAtPoint(r: Ratio, g: Generator, to: Ratio, budget?: Budget): Ratio | Refusal {
  const values = new Map([[g, to]]);
  let top: Ratio = ratioFromPolynomial(r.num);
  let bottom: Ratio = ratioFromPolynomial(r.den);
  for (let order = 0; order < DERIVATIVES; order += 1) {
    const above = substituteRatio(top, values, budget);
    const below = substituteRatio(bottom, values, budget);
    if (isRefusal(above) || isRefusal(below)) {
      return refuse('undefined', 'the limit is not decided: a function has no value there');
    }
    if (!isZeroRatio(below)) return divRatios(above, below, budget);
    if (!isZeroRatio(above)) return infinite(signAtPole(above, bottom, g, values, budget));
    const topSlope = derivativeRatio(top, g, budget);
    const bottomSlope = derivativeRatio(bottom, g, budget);
    if (isRefusal(topSlope)) return topSlope;
    if (isRefusal(bottomSlope)) return bottomSlope;
    [top, bottom] = [topSlope, bottomSlope];
  }
  return refuse('undefined', 'the limit is not decided');
}

/** The sign on both sides of a pole where `den` vanishes: known only for an even order and plain numbers. */
function signAtPole(
  num: Ratio,
  den: Ratio,
  g: Generator,
  values: ReadonlyMap<Generator, Ratio>,
  budget?: Budget,
): -1 | 0 | 1 {
  let slope: Ratio | Refusal = den;
  for (let order = 1; order < DERIVATIVES; order += 1) {
    slope = derivativeRatio(slope, g, budget);
    if (isRefusal(slope)) return 0;
    const value = substituteRatio(slope, values, budget);
    if (isRefusal(value)) return 0;
    if (!isZeroRatio(value)) return order % 2 === 0 ? signOf(divRatios(num, value, budget)) : 0;
  }
  return 0;
}
