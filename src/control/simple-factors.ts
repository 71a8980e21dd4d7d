import {
  contentOf,
  factorPolynomial,
  generatorPolynomial,
  generatorsOf,
  degreeIn,
  isConstantPolynomial,
  leadingCoefficientSign,
  monomialContent,
  negatedSign,
  normalPart,
  productSign,
  quotientOf,
  signOfPolynomial,
  termCount,
  termsOf,
} from '../algebra/index.ts';
import type { Factorization, Generator, Polynomial, Sign, SignOf } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';

/**
 * Conditions with more terms than this are not searched for factors beyond monomials: nobody reads them, numbers
 * decide them, and the search would take longer than all the rest.
 */
const SEARCHED_TERMS = 60;

function monomialFactors(p: Polynomial): Factorization {
  const unit = contentOf(p) * BigInt(leadingCoefficientSign(p));
  const monomial = monomialContent(p);
  const rest = normalPart(quotientOf(p, monomial));
  const powers = generatorsOf(monomial).map((g) => ({
    factor: generatorPolynomial(g),
    multiplicity: degreeIn(monomial, g),
  }));
  const factors = isConstantPolynomial(rest)
    ? powers
    : [...powers, { factor: rest, multiplicity: 1 }];
  return { unit, factors };
}

/** The factors of a polynomial; of a long one only its monomial factors and the rest. */
export function simpleFactors(p: Polynomial, budget?: Budget): Factorization {
  return termCount(p) > SEARCHED_TERMS ? monomialFactors(p) : factorPolynomial(p, budget);
}

function signsOfGenerators(p: Polynomial, signOf: SignOf): ReadonlyMap<Generator, Sign> {
  return new Map(generatorsOf(p).map((g) => [g, signOfPolynomial(generatorPolynomial(g), signOf)]));
}

/** The sum of two values of these signs. */
function sumSign(a: Sign, b: Sign): Sign {
  if (a === b || b === 'zero') return a;
  if (a === 'zero') return b;
  const pair = new Set([a, b]);
  if (pair.has('positive') && pair.has('nonnegative')) return 'positive';
  if (pair.has('negative') && pair.has('nonpositive')) return 'negative';
  return 'unknown';
}

function signByTerms(p: Polynomial, signOf: SignOf): Sign {
  const signs = signsOfGenerators(p, signOf);
  let sum: Sign = 'zero';
  for (const { coefficient, exponents } of termsOf(p)) {
    let term: Sign = 'positive';
    for (const [g, power] of exponents) {
      const sign = signs.get(g) ?? 'unknown';
      term = productSign(term, power % 2 === 0 ? productSign(sign, sign) : sign);
    }
    sum = sumSign(sum, coefficient < 0n ? negatedSign(term) : term);
    if (sum === 'unknown') return sum;
  }
  return sum;
}

/** The sign of a polynomial, of a long one as far as its terms alone decide it. */
export function simpleSign(p: Polynomial, signOf: SignOf, budget?: Budget): Sign {
  return termCount(p) > SEARCHED_TERMS
    ? signByTerms(p, signOf)
    : signOfPolynomial(p, signOf, budget);
}
