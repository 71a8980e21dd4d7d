import type { Budget } from '../base/index.ts';
import { factorPolynomial } from './factor.ts';
import { generatorDependsOn, imaginary, laplace } from './generator.ts';
import {
  coefficientsIn,
  degreeIn,
  isZeroPolynomial,
  mulPolynomials,
  scalePolynomial,
  subPolynomials,
  termCount,
} from './polynomial.ts';
import { rational } from './rational.ts';
import { countRealRoots } from './real-roots.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

export type Sign = 'positive' | 'negative' | 'zero' | 'nonnegative' | 'nonpositive' | 'unknown';

/** What is known of the sign of a generator; asked for symbols and for functions that have no sign of their own. */
export type SignOf = (g: Generator) => Sign;

const NEGATED: Readonly<Record<Sign, Sign>> = {
  positive: 'negative',
  negative: 'positive',
  zero: 'zero',
  nonnegative: 'nonpositive',
  nonpositive: 'nonnegative',
  unknown: 'unknown',
};

/** The sign of −x. */
export function negatedSign(sign: Sign): Sign {
  return NEGATED[sign];
}

const isStrict = (sign: Sign): boolean => sign === 'positive' || sign === 'negative';
const isUpper = (sign: Sign): boolean => sign === 'positive' || sign === 'nonnegative';

/** The sign of a product. */
export function productSign(a: Sign, b: Sign): Sign {
  if (a === 'zero' || b === 'zero') return 'zero';
  if (a === 'unknown' || b === 'unknown') return 'unknown';
  const same = isUpper(a) === isUpper(b);
  if (isStrict(a) && isStrict(b)) return same ? 'positive' : 'negative';
  return same ? 'nonnegative' : 'nonpositive';
}

/** The sign of a sum, as far as the signs of its terms decide it. */
function sumSign(signs: readonly Sign[]): Sign {
  const present = signs.filter((sign) => sign !== 'zero');
  if (present.length === 0) return 'zero';
  if (present.includes('unknown')) return 'unknown';
  const upper = isUpper(present[0]);
  if (present.some((sign) => isUpper(sign) !== upper)) return 'unknown';
  if (present.some(isStrict)) return upper ? 'positive' : 'negative';
  return upper ? 'nonnegative' : 'nonpositive';
}

function powerSign(sign: Sign, exponent: number, real: boolean): Sign {
  if (exponent % 2 === 1) return sign;
  if (isStrict(sign)) return 'positive';
  if (sign === 'zero') return 'zero';
  return real ? 'nonnegative' : 'unknown';
}

/** Whether a generator stands for a real number: it contains neither s nor j. */
function isReal(g: Generator): boolean {
  return !generatorDependsOn(g, laplace) && !generatorDependsOn(g, imaginary);
}

/** The sign of a generator: what its kind fixes, otherwise what the caller knows. */
function generatorSign(g: Generator, signOf: SignOf): Sign {
  if (!isReal(g)) return 'unknown';
  if (g.kind === 'constant') return 'positive';
  const [argument] = g.args ?? [];
  if (!argument) return signOf(g);
  if (g.name === 'exp') return 'positive';
  if (g.name === 'sqrt')
    return signOfRatio(argument, signOf) === 'positive' ? 'positive' : 'nonnegative';
  if (g.name === 'abs') return isStrict(signOfRatio(argument, signOf)) ? 'positive' : 'nonnegative';
  if (g.name === 'atan') return signOfRatio(argument, signOf);
  return signOf(g);
}

/** The sign that the terms alone decide. */
function signOfTerms(p: Polynomial, signs: readonly Sign[]): Sign {
  const width = p.generators.length;
  const real = p.generators.map(isReal);
  const termSigns = p.coefficients.map((coefficient, i) =>
    signs.reduce<Sign>(
      (product, sign, k) => {
        const exponent = p.exponents[i * width + k];
        return exponent === 0 ? product : productSign(product, powerSign(sign, exponent, real[k]));
      },
      coefficient > 0n ? 'positive' : 'negative',
    ),
  );
  return sumSign(termSigns);
}

/** The sign of a x² + b x + c for real x where b² − 4ac is negative: that of a. */
function signOfDefinite(p: Polynomial, signOf: SignOf, budget?: Budget): Sign {
  for (const g of p.generators) {
    if (degreeIn(p, g) !== 2 || !isReal(g)) continue;
    const [c, b, a] = coefficientsIn(p, g);
    const lead = signByTerms(a, signOf);
    if (!isStrict(lead)) continue;
    const product = scalePolynomial(mulPolynomials(a, c, budget), 4n);
    const discriminant = subPolynomials(mulPolynomials(b, b, budget), product);
    const sign = signByTerms(discriminant, signOf);
    if (sign === 'negative') return lead;
    if (sign === 'zero' || sign === 'nonpositive')
      return lead === 'positive' ? 'nonnegative' : 'nonpositive';
  }
  return 'unknown';
}

function signByTerms(p: Polynomial, signOf: SignOf): Sign {
  return signOfTerms(
    p,
    p.generators.map((g) => generatorSign(g, signOf)),
  );
}

/**
 * The sign of a polynomial where the signs of its generators are known in part: from its terms, from its factors
 * (an even power is not negative), and from negative discriminants. `unknown` means not decided, not mixed.
 */
export function signOfPolynomial(p: Polynomial, signOf: SignOf, budget?: Budget): Sign {
  const direct = signByTerms(p, signOf);
  if (isZeroPolynomial(p) || termCount(p) === 1 || isStrict(direct)) return direct;
  const { unit, factors } = factorPolynomial(p, budget);
  const byFactors = factors.reduce<Sign>(
    (product, { factor, multiplicity }) =>
      productSign(
        product,
        powerSign(signOfFactor(factor, signOf, budget), multiplicity, isRealPolynomial(factor)),
      ),
    unit > 0n ? 'positive' : 'negative',
  );
  return byFactors === 'unknown' ? direct : byFactors;
}

function isRealPolynomial(p: Polynomial): boolean {
  return p.generators.every(isReal);
}

function signOfFactor(p: Polynomial, signOf: SignOf, budget?: Budget): Sign {
  const direct = signByTerms(p, signOf);
  if (isStrict(direct)) return direct;
  const isAlone = p.generators.length === 1 && termCount(p) > 1;
  const alone = isAlone ? signOfUnivariate(p, signOf) : 'unknown';
  if (alone !== 'unknown') return alone;
  const definite = signOfDefinite(p, signOf, budget);
  return definite === 'unknown' ? direct : definite;
}

const zeroRational = rational(0n);

/** Of higher degrees the real roots are not counted. */
const LARGEST_COUNTED_DEGREE = 40;

/** The sign of an irreducible sum in one real symbol (no root is 0): that of its end, if it has no root where the symbol lies. */
function signOfUnivariate(p: Polynomial, signOf: SignOf): Sign {
  const [g] = p.generators;
  if (g.kind !== 'symbol' || p.degrees[0] > LARGEST_COUNTED_DEGREE) return 'unknown';
  const sign = signOf(g);
  const lead = p.coefficients[0] > 0n ? 'positive' : 'negative';
  const isEven = p.degrees[0] % 2 === 0;
  if (sign === 'positive' || sign === 'nonnegative') {
    return countRealRoots(p, zeroRational) === 0 ? lead : 'unknown';
  }
  if (sign === 'negative' || sign === 'nonpositive') {
    const none = countRealRoots(p, undefined, zeroRational) === 0;
    return none ? (isEven ? lead : negatedSign(lead)) : 'unknown';
  }
  return isEven && countRealRoots(p) === 0 ? lead : 'unknown';
}

/** The sign of a ratio wherever it is defined. */
export function signOfRatio(r: Ratio, signOf: SignOf, budget?: Budget): Sign {
  const den = signOfPolynomial(r.den, signOf, budget);
  const nonzero = den === 'nonnegative' ? 'positive' : den === 'nonpositive' ? 'negative' : den;
  return productSign(signOfPolynomial(r.num, signOf, budget), nonzero);
}
