import {
  divRatios,
  factorPolynomial,
  oneRatio,
  powPolynomial,
  productOfPolynomials,
  ratioFromPolynomial,
  symbolsOfRatio,
  quotientOf,
} from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import { refuse, spend } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certifySum } from './certificate.ts';
import {
  digitsIn,
  divideField,
  inverseModulo,
  mulField,
  overField,
  ratioOfField,
  scaleField,
} from './field-polynomial.ts';
import type { FieldPolynomial } from './field-polynomial.ts';
import { degreeInS, hasFunctionsOfS, isFreeOfS } from './s-polynomial.ts';

/** numerator / factor^power, the numerator of lower degree in s than the factor. */
export interface PartialFraction {
  /** Coefficients of s⁰, s¹, … of the numerator. */
  readonly numerator: readonly Ratio[];
  readonly factor: Polynomial;
  readonly power: number;
  /** The whole term. */
  readonly ratio: Ratio;
}

export interface PartialFractions {
  /** Coefficients of s⁰, s¹, … of the polynomial part; empty for a strictly proper ratio. */
  readonly polynomial: readonly Ratio[];
  readonly terms: readonly PartialFraction[];
}

interface PowerOfFactor {
  readonly factor: Polynomial;
  readonly multiplicity: number;
}

function hasSymbols(p: Polynomial): boolean {
  return symbolsOfRatio(ratioFromPolynomial(p)).length > 0;
}

/** The share of rest/whole that belongs to one factor: its numerator modulo factor^multiplicity, in digits. */
function shareOf(
  rest: FieldPolynomial,
  whole: Polynomial,
  { factor, multiplicity }: PowerOfFactor,
  budget?: Budget,
): readonly PartialFraction[] {
  const power = powPolynomial(factor, multiplicity, budget);
  const modulus = overField(power);
  const others = overField(quotientOf(whole, power, budget));
  spend(budget, modulus.length * others.length * 16, 'partial fractions');
  const inverse = inverseModulo(others, modulus);
  const numerator = divideField(mulField(rest, inverse), modulus).remainder;
  return digitsIn(numerator, overField(factor))
    .map((digit, k) => termOf(digit, factor, multiplicity - k))
    .filter((term) => term.numerator.length > 0);
}

function termOf(numerator: FieldPolynomial, factor: Polynomial, power: number): PartialFraction {
  const ratio = divRatios(
    ratioOfField(numerator),
    ratioFromPolynomial(powPolynomial(factor, power)),
  );
  return Object.freeze({ numerator, factor, power, ratio });
}

/**
 * The partial fractions of a ratio in s, exact over the field of its other symbols.
 *
 * One term for each power of each factor that `factorPolynomial` finds. Factors of degree above 2 without symbols stay
 * whole; with symbols they are refused (`needs-numbers`), as is dead time. The terms add up to the ratio exactly.
 * Source: D. E. Knuth, The Art of Computer Programming, vol. 2, section 4.6.2 (exercise on partial fractions), from memory.
 */
export function partialFractions(r: Ratio, budget?: Budget): PartialFractions | Refusal {
  if (hasFunctionsOfS(r)) {
    return refuse(
      'dead-time',
      'there are no partial fractions with dead time; use rational_delay(Td, n)',
    );
  }
  const { factors } = factorPolynomial(r.den, budget);
  const dynamic = factors.filter(({ factor }) => !isFreeOfS(factor));
  const large = dynamic.find(({ factor }) => degreeInS(factor) > 2 && hasSymbols(factor));
  if (large) {
    return refuse(
      'needs-numbers',
      `a factor of degree ${degreeInS(large.factor)} of the denominator does not split with symbols; give numbers for them`,
    );
  }
  const denominator = productOfPolynomials(
    dynamic.map((f) => powPolynomial(f.factor, f.multiplicity, budget)),
    budget,
  );
  const constant = ratioFromPolynomial(quotientOf(r.den, denominator, budget));
  const numerator = scaleField(overField(r.num), divRatios(oneRatio, constant));
  const { quotient, remainder } = divideField(numerator, overField(denominator));
  const terms = dynamic.flatMap((f) => shareOf(remainder, denominator, f, budget));
  certifySum(r, [ratioOfField(quotient), ...terms.map((term) => term.ratio)]);
  return Object.freeze({ polynomial: quotient, terms });
}
