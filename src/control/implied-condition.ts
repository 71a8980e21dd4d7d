import {
  generatorPower,
  isZeroPolynomial,
  mulPolynomials,
  onePolynomial,
  scalePolynomial,
  signOfPolynomial,
  subPolynomials,
  termCount,
  termsOf,
} from '../algebra/index.ts';
import type { Polynomial, Sign, SignOf, Term } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';

/** What is known besides the signs: `polynomial > 0`, or `>= 0` where it is not strict. */
export interface Premise {
  readonly polynomial: Polynomial;
  readonly isStrict: boolean;
}

/** Longer polynomials, and more pairs of terms than this, are not searched. */
const MOST_TERMS = 24;
const MOST_PAIRS = 120;

/** A multiplier num/den, a monomial over a monomial with numbers, of known positive sign. */
interface Multiplier {
  readonly num: Polynomial;
  readonly den: Polynomial;
}

/** The quotient of two terms as a monomial over a monomial. */
function quotientOfTerms(a: Term, b: Term): Multiplier {
  const sign = b.coefficient < 0n ? -1n : 1n;
  return {
    num: scalePolynomial(excessPowers(a, b), sign * a.coefficient),
    den: scalePolynomial(excessPowers(b, a), sign * b.coefficient),
  };
}

/** The powers by which a term exceeds another one. */
function excessPowers(a: Term, b: Term): Polynomial {
  return [...a.exponents].reduce((product, [g, exponent]) => {
    const excess = exponent - (b.exponents.get(g) ?? 0);
    return excess > 0 ? mulPolynomials(product, generatorPower(g, excess)) : product;
  }, onePolynomial);
}

const isPositive = (p: Polynomial, signOf: SignOf): boolean =>
  signOfPolynomial(p, signOf) === 'positive';

function provesPositive(remainder: Sign, premise: Premise, isStrict: boolean): boolean {
  if (remainder === 'positive') return true;
  return (remainder === 'nonnegative' || remainder === 'zero') && (premise.isStrict || !isStrict);
}

/** Whether p = m · premise + something that is never negative, for a positive monomial m that cancels one of p's terms. */
function followsFromOne(
  p: Polynomial,
  premise: Premise,
  isStrict: boolean,
  signOf: SignOf,
  budget?: Budget,
): boolean {
  if (termCount(p) * termCount(premise.polynomial) > MOST_PAIRS) return false;
  return termsOf(p).some((a) =>
    termsOf(premise.polynomial).some((b) => {
      const { num, den } = quotientOfTerms(a, b);
      if (!isPositive(num, signOf) || !isPositive(den, signOf)) return false;
      const rest = subPolynomials(
        mulPolynomials(den, p, budget),
        mulPolynomials(num, premise.polynomial, budget),
      );
      const sign = isZeroPolynomial(rest) ? 'zero' : signOfPolynomial(rest, signOf, budget);
      return provesPositive(sign, premise, isStrict);
    }),
  );
}

/** The products of two of the premises. */
function products(premises: readonly Premise[], budget?: Budget): readonly Premise[] {
  return premises.flatMap((a, i) =>
    premises.slice(i + 1).map((b) => ({
      polynomial: mulPolynomials(a.polynomial, b.polynomial, budget),
      isStrict: a.isStrict && b.isStrict,
    })),
  );
}

/**
 * Whether p > 0 (or p >= 0) follows from what else is known: p is a positive monomial times one premise, or times the
 * product of two, and a rest that the signs show never to be negative. `false` means not shown.
 */
export function isImplied(
  p: Polynomial,
  isStrict: boolean,
  premises: readonly Premise[],
  signOf: SignOf,
  budget?: Budget,
): boolean {
  const short = premises.filter(({ polynomial }) => termCount(polynomial) <= MOST_TERMS);
  if (termCount(p) > MOST_TERMS || short.length === 0) return false;
  const follows = (premise: Premise): boolean =>
    followsFromOne(p, premise, isStrict, signOf, budget);
  return short.some(follows) || products(short, budget).some(follows);
}
