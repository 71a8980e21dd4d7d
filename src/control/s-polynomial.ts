import {
  coefficientsIn,
  contentOver,
  degreeIn,
  dependsOnLaplace,
  generatorPolynomial,
  generatorsOf,
  isZeroPolynomial,
  laplace,
  normalPart,
  powPolynomial,
  quotientOf,
  zeroPolynomial,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { invariant } from '../base/index.ts';
import type { Budget } from '../base/index.ts';

/** The degree in s; −1 for the zero polynomial. */
export function degreeInS(p: Polynomial): number {
  return isZeroPolynomial(p) ? -1 : degreeIn(p, laplace);
}

/** Whether neither s nor a function of s occurs. */
export function isFreeOfS(p: Polynomial): boolean {
  return !generatorsOf(p).some(dependsOnLaplace);
}

/** The functions of s in a polynomial, such as exp(−s Td): what makes it no polynomial in s. */
export function functionsOfS(p: Polynomial): readonly Generator[] {
  return generatorsOf(p).filter((g) => g !== laplace && dependsOnLaplace(g));
}

/** Whether a ratio holds functions of s, such as a dead time. */
export function hasFunctionsOfS(r: Ratio): boolean {
  return functionsOfS(r.num).length > 0 || functionsOfS(r.den).length > 0;
}

/** The coefficients of s in descending powers, leading one first; [0] for the zero polynomial. */
export function descendingInS(p: Polynomial): readonly Polynomial[] {
  return isZeroPolynomial(p) ? [zeroPolynomial] : [...coefficientsIn(p, laplace)].reverse();
}

/** How often s divides a nonzero polynomial. */
export function powerOfS(p: Polynomial): number {
  const coefficients = coefficientsIn(p, laplace);
  const lowest = coefficients.findIndex((c) => !isZeroPolynomial(c));
  invariant(lowest >= 0, 'the power of s in a zero polynomial');
  return lowest;
}

/** A nonzero polynomial divided by s as often as s divides it. */
export function withoutPowerOfS(p: Polynomial): Polynomial {
  return quotientOf(p, powPolynomial(generatorPolynomial(laplace), powerOfS(p)));
}

/** The greatest factor of a nonzero polynomial that is free of s and of functions of s, integer content left out. */
export function contentFreeOfS(p: Polynomial, budget?: Budget): Polynomial {
  return normalPart(contentOver(p, new Set(generatorsOf(p).filter(dependsOnLaplace)), budget));
}

/** A nonzero polynomial without the factors that are free of s. */
export function primitiveInS(p: Polynomial, budget?: Budget): Polynomial {
  return normalPart(quotientOf(p, contentFreeOfS(p, budget), budget));
}
