import { invariant, type Budget } from '../base/index.ts';
import { dependsOnLaplace } from './generator.ts';
import { contentOver, gcdPolynomials, lcmPolynomials } from './gcd.ts';
import { integerGcd } from './integer.ts';
import {
  addPolynomials,
  contentOf,
  isZeroPolynomial,
  leadingCoefficientSign,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  powPolynomial,
  scalePolynomial,
  zeroPolynomial,
} from './polynomial.ts';
import { quotientOf } from './quotient.ts';
import { ratio } from './ratio.ts';
import { hasRelations, reduceRelations } from './relation.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

/**
 * A fraction of polynomials in which common factors that contain s are kept: a mode that cancels in the signal
 * flow is still a mode of the loop. Factors without s are cancelled; `den` has a positive leading coefficient.
 */
export interface Fraction {
  readonly num: Polynomial;
  readonly den: Polynomial;
}

/** The greatest factor of both that is free of s, integer content included. */
function commonFactorWithoutLaplace(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  const moving = (p: Polynomial): Set<Generator> => new Set(p.generators.filter(dependsOnLaplace));
  const content = integerGcd(contentOf(a), contentOf(b));
  const common = gcdPolynomials(
    contentOver(a, moving(a), budget),
    contentOver(b, moving(b), budget),
    budget,
  );
  return scalePolynomial(common, content);
}

function fraction(num: Polynomial, den: Polynomial, budget?: Budget): Fraction {
  invariant(!isZeroPolynomial(den), 'a fraction with denominator zero');
  // Nothing has no poles: a branch whose gain is 0 leaves no mode behind.
  if (isZeroPolynomial(num)) return Object.freeze({ num: zeroPolynomial, den: onePolynomial });
  const common = scalePolynomial(
    commonFactorWithoutLaplace(num, den, budget),
    BigInt(leadingCoefficientSign(den)),
  );
  return Object.freeze({
    num: quotientOf(num, common, budget),
    den: quotientOf(den, common, budget),
  });
}

/** The fraction with j² and squares of roots replaced; they may stay in the denominator. */
function related(num: Polynomial, den: Polynomial, budget?: Budget): Fraction {
  if (!hasRelations(num) && !hasRelations(den)) return fraction(num, den, budget);
  const top = reduceRelations(num, budget);
  const bottom = reduceRelations(den, budget);
  return fraction(
    mulPolynomials(top.num, bottom.den, budget),
    mulPolynomials(bottom.num, top.den, budget),
    budget,
  );
}

/** The ratio as a fraction; what the ratio has cancelled already stays cancelled. */
export function fractionOfRatio(r: Ratio): Fraction {
  return Object.freeze({ num: r.num, den: r.den });
}

/** The fraction in lowest terms. */
export function ratioOfFraction(f: Fraction, budget?: Budget): Ratio {
  return ratio(f.num, f.den, budget);
}

/** The product; no common factor that contains s is cancelled. */
export function mulFractions(a: Fraction, b: Fraction, budget?: Budget): Fraction {
  return related(
    mulPolynomials(a.num, b.num, budget),
    mulPolynomials(a.den, b.den, budget),
    budget,
  );
}

/**
 * The quotient: poles common to both are the same poles and are cancelled, gcd(a.den, b.den); then as the product
 * with the inverse. A zero divisor is our bug.
 */
export function divFractions(a: Fraction, b: Fraction, budget?: Budget): Fraction {
  invariant(!isZeroPolynomial(b.num), 'a fraction divided by zero');
  const common = gcdPolynomials(a.den, b.den, budget);
  return related(
    mulPolynomials(a.num, quotientOf(b.den, common, budget), budget),
    mulPolynomials(quotientOf(a.den, common, budget), b.num, budget),
    budget,
  );
}

/** The sum over the least common multiple of the denominators; nothing that contains s is cancelled after. */
export function addFractions(a: Fraction, b: Fraction, budget?: Budget): Fraction {
  const den = lcmPolynomials(a.den, b.den, budget);
  const num = addPolynomials(
    mulPolynomials(a.num, quotientOf(den, a.den, budget), budget),
    mulPolynomials(b.num, quotientOf(den, b.den, budget), budget),
  );
  return related(num, den, budget);
}

export function negFraction(a: Fraction): Fraction {
  return Object.freeze({ num: negPolynomial(a.num), den: a.den });
}

export function subFractions(a: Fraction, b: Fraction, budget?: Budget): Fraction {
  return addFractions(a, negFraction(b), budget);
}

/** a to an integer power; a negative power of zero is our bug. */
export function powFraction(a: Fraction, power: number, budget?: Budget): Fraction {
  if (power < 0) {
    invariant(!isZeroPolynomial(a.num), 'a negative power of the zero fraction');
    return powFraction(related(a.den, a.num, budget), -power, budget);
  }
  return related(powPolynomial(a.num, power, budget), powPolynomial(a.den, power, budget), budget);
}

export const oneFraction: Fraction = Object.freeze({ num: onePolynomial, den: onePolynomial });

export function isZeroFraction(f: Fraction): boolean {
  return isZeroPolynomial(f.num);
}
