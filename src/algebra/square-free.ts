import type { Budget } from '../base/index.ts';
import { gcdPolynomials } from './gcd.ts';
import {
  coefficientsIn,
  degreeIn,
  derivativePolynomial,
  isConstantPolynomial,
  isZeroPolynomial,
  leadingCoefficientSign,
  mulPolynomials,
  normalPart,
  polynomialFromCoefficients,
  scalePolynomial,
  subPolynomials,
  zeroPolynomial,
} from './polynomial.ts';
import { divideExactly, quotientOf } from './quotient.ts';
import { constantPolynomial } from './polynomial.ts';
import { integerSquareRoot } from './integer.ts';
import type { Generator, Polynomial } from './ring.ts';

/** A factor and how often it divides. */
export interface PowerFactor {
  readonly factor: Polynomial;
  readonly multiplicity: number;
}

/**
 * The square-free decomposition in g of a polynomial that is primitive in g: pairwise coprime square-free factors
 * whose powers multiply to p.
 *
 * Source: D. Y. Y. Yun, "On square-free decomposition algorithms", SYMSAC '76, 26–35.
 */
export function squareFreeFactors(
  p: Polynomial,
  g: Generator,
  budget?: Budget,
): readonly PowerFactor[] {
  const factors: PowerFactor[] = [];
  const slope = derivativePolynomial(p, g);
  const repeated = gcdPolynomials(p, slope, budget);
  let rest = quotientOf(p, repeated, budget);
  let gap = subPolynomials(quotientOf(slope, repeated, budget), derivativePolynomial(rest, g));
  for (let multiplicity = 1; degreeIn(rest, g) > 0; multiplicity += 1) {
    const factor = gcdPolynomials(rest, gap, budget);
    if (degreeIn(factor, g) > 0) factors.push({ factor, multiplicity });
    rest = quotientOf(rest, factor, budget);
    gap = subPolynomials(quotientOf(gap, factor, budget), derivativePolynomial(rest, g));
  }
  return factors;
}

/** The product of the distinct factors of p that contain g, each once: p without repetitions in g. */
export function squareFreePart(p: Polynomial, g: Generator, budget?: Budget): Polynomial {
  if (degreeIn(p, g) < 1) return p;
  const repeated = gcdPolynomials(p, derivativePolynomial(p, g), budget);
  return quotientOf(normalPart(p), repeated, budget);
}

/**
 * The polynomial with a positive leading coefficient whose square is p, or null if there is none. The coefficients
 * of the root follow from the top half of those of p; the square then has to agree.
 */
export function squareRootOfPolynomial(p: Polynomial, budget?: Budget): Polynomial | null {
  if (isZeroPolynomial(p)) return zeroPolynomial;
  if (leadingCoefficientSign(p) < 0) return null;
  if (isConstantPolynomial(p)) return integerRoot(p.coefficients[0]);
  if (p.degrees.some((degree) => degree % 2 === 1)) return null;
  const [main] = p.generators;
  const coefficients = coefficientsIn(p, main);
  const half = (coefficients.length - 1) / 2;
  const lead = squareRootOfPolynomial(coefficients[2 * half], budget);
  if (!lead) return null;
  const root = new Array<Polynomial>(half + 1).fill(zeroPolynomial);
  root[half] = lead;
  for (let k = half - 1; k >= 0; k -= 1) {
    let rest = coefficients[half + k];
    for (let i = k + 1; i < half; i += 1) {
      rest = subPolynomials(rest, mulPolynomials(root[i], root[half + k - i], budget));
    }
    const next = divideExactly(rest, scalePolynomial(lead, 2n), budget);
    if (!next) return null;
    root[k] = next;
  }
  const candidate = polynomialFromCoefficients(root, main);
  const gap = subPolynomials(mulPolynomials(candidate, candidate, budget), p);
  return isZeroPolynomial(gap) ? candidate : null;
}

function integerRoot(value: bigint): Polynomial | null {
  const root = integerSquareRoot(value);
  return root * root === value ? constantPolynomial(root) : null;
}
