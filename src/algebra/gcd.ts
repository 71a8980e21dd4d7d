import type { Budget } from '../base/index.ts';
import { spend } from '../base/index.ts';
import { unionOfGenerators } from './frame.ts';
import { ElementSequence, fieldNumber } from './prime-field.ts';
import { exponentsIn, gatherPowers, termValues } from './point-image.ts';
import {
  coefficientsIn,
  contentOf,
  contentWork,
  degreeIn,
  equalPolynomials,
  isConstantPolynomial,
  isOnePolynomial,
  isZeroPolynomial,
  leadingCoefficientIn,
  leadingTermCount,
  mulPolynomials,
  normalPart,
  onePolynomial,
  scalePolynomial,
  termCount,
  zeroPolynomial,
} from './polynomial.ts';
import { gcdModulo } from './prime-polynomial.ts';
import { integerGcd } from './integer.ts';
import { divideExactly, monomialContent, quotientOf } from './quotient.ts';
import { lastRemainder } from './remainder-sequence.ts';
import type { Generator, Polynomial } from './ring.ts';
import { sparseGcd } from './sparse-gcd.ts';
import { coefficientOf, rowsOver } from './term-groups.ts';
import { polynomialOfTerms } from './terms.ts';

/**
 * The greatest common divisor of two polynomials over ℚ: primitive, with a positive leading coefficient; 0 only for
 * two zeros. Integer contents are left out (the gcd of 4 x and 6 x is x).
 *
 * Monomials, divisors and variables that the gcd lacks (seen in images modulo a prime) are settled first, then a
 * sparse modular method, then a subresultant sequence; what is returned has been proved by division.
 */
export function gcdPolynomials(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  if (isZeroPolynomial(a)) return normalPart(b);
  if (isZeroPolynomial(b)) return normalPart(a);
  if (isConstantPolynomial(a) || isConstantPolynomial(b)) return onePolynomial;
  spend(budget, contentWork(a) + contentWork(b), 'a greatest common divisor');
  const [left, right] = [normalPart(a), normalPart(b)];
  if (equalPolynomials(left, right)) return left;
  const [leftMonomial, rightMonomial] = [monomialContent(left), monomialContent(right)];
  const monomial = commonMonomial(leftMonomial, rightMonomial);
  const common = gcdOfPrimitives(
    quotientOf(left, leftMonomial),
    quotientOf(right, rightMonomial),
    budget,
  );
  return mulPolynomials(monomial, common);
}

/** The least common multiple, integer contents included, with a positive leading coefficient. */
export function lcmPolynomials(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  if (isZeroPolynomial(a) || isZeroPolynomial(b)) return zeroPolynomial;
  const [left, right] = [contentOf(a), contentOf(b)];
  const content = (left * right) / integerGcd(left, right);
  const [x, y] = [normalPart(a), normalPart(b)];
  const common = gcdPolynomials(x, y, budget);
  return scalePolynomial(mulPolynomials(quotientOf(x, common, budget), y, budget), content);
}

/** The gcd of many polynomials, the shortest first. */
export function gcdOfMany(list: readonly Polynomial[], budget?: Budget): Polynomial {
  const sorted = list
    .filter((p) => !isZeroPolynomial(p))
    .sort((a, b) => termCount(a) - termCount(b));
  let common = zeroPolynomial;
  for (const p of sorted) {
    if (isOnePolynomial(common)) return common;
    common = gcdPolynomials(common, p, budget);
  }
  return common;
}

/** The gcd of the coefficients of p's powers of g: primitive, without g. */
export function contentIn(p: Polynomial, g: Generator, budget?: Budget): Polynomial {
  return gcdOfMany(coefficientsIn(p, g), budget);
}

/** The gcd of p's coefficients of the distinct monomials in some generators: primitive, without them. */
export function contentOver(
  p: Polynomial,
  generators: ReadonlySet<Generator>,
  budget?: Budget,
): Polynomial {
  const parts = rowsOver(p, generators).map((rows) => coefficientOf(p, rows, generators));
  return gcdOfMany(parts, budget);
}

function commonMonomial(a: Polynomial, b: Polynomial): Polynomial {
  const shared = a.generators.filter((g) => b.generators.includes(g));
  const exponents = shared.map((g) => Math.min(degreeIn(a, g), degreeIn(b, g)));
  return polynomialOfTerms(shared, Int32Array.from(exponents), [1n]);
}

/** a and b primitive over ℤ, without monomial factors. */
function gcdOfPrimitives(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  if (isConstantPolynomial(a) || isConstantPolynomial(b)) return onePolynomial;
  const bounds = degreeBounds(a, b, budget);
  const absent = [...a.generators, ...b.generators].filter((g) => !bounds.get(g));
  if (absent.length > 0) return gcdWithout(a, b, new Set(absent), budget);
  for (const [x, y] of termCount(a) < termCount(b)
    ? [
        [a, b],
        [b, a],
      ]
    : [
        [b, a],
        [a, b],
      ]) {
    if (y.generators.some((g) => bounds.get(g) === degreeIn(x, g))) {
      const divides = divideExactly(y, x, budget);
      if (divides) return x;
    }
  }
  return gcdInMain(a, b, chooseMain(a, b), bounds, budget);
}

const POINTS = 5;

/**
 * Upper bounds for the degree of the gcd in each generator: the degree of the gcd of the images in that generator,
 * the others at a point where neither image loses degree. Generators that only one of them has get none.
 */
function degreeBounds(
  a: Polynomial,
  b: Polynomial,
  budget?: Budget,
  attempt = 0,
): ReadonlyMap<Generator, number> {
  const field = fieldNumber(attempt);
  const elements = new ElementSequence(7 + attempt);
  const generators = unionOfGenerators(a.generators, b.generators);
  const point = new Map(generators.map((g) => [g, elements.next(field)]));
  const [left, right] = [termValues(a, point, field), termValues(b, point, field)];
  const bounds = new Map<Generator, number>();
  for (const g of generators) {
    const [m, n] = [degreeIn(a, g), degreeIn(b, g)];
    if (m === 0 || n === 0) continue;
    spend(budget, termCount(a) + termCount(b) + m * n, 'a greatest common divisor');
    // With the values of whole terms the images come out in z = g/point(g): the same degrees.
    const x = gatherPowers(left, exponentsIn(a, g), field);
    const y = gatherPowers(right, exponentsIn(b, g), field);
    const kept = x.length === m + 1 && y.length === n + 1;
    if (!kept && attempt < POINTS) return degreeBounds(a, b, budget, attempt + 1);
    bounds.set(g, kept ? gcdModulo(x, y, field).length - 1 : Math.min(m, n));
  }
  return bounds;
}

/**
 * The gcd of two polynomials without monomial factors where it is known to lack some generators: it divides every
 * coefficient of monomials in those, and is 1 where one of the coefficients is a monomial.
 */
function gcdWithout(
  a: Polynomial,
  b: Polynomial,
  absent: ReadonlySet<Generator>,
  budget?: Budget,
): Polynomial {
  const groups = [a, b].map((p) => rowsOver(p, absent));
  if (groups.some((list) => list.some((rows) => rows.length === 1))) return onePolynomial;
  const parts = [a, b].flatMap((p, k) => groups[k].map((rows) => coefficientOf(p, rows, absent)));
  return gcdOfMany(parts, budget);
}

/** The shared generator with the simplest leading coefficients, which the sparse method has to scale by. */
function chooseMain(a: Polynomial, b: Polynomial): Generator {
  const cost = (g: Generator): number =>
    leadingTermCount(a, g) +
    leadingTermCount(b, g) +
    0.1 * Math.min(degreeIn(a, g), degreeIn(b, g));
  const shared = a.generators.filter((g) => b.generators.includes(g));
  return shared.reduce((best, g) => (cost(g) < cost(best) ? g : best));
}

function gcdInMain(
  a: Polynomial,
  b: Polynomial,
  main: Generator,
  bounds: ReadonlyMap<Generator, number>,
  budget?: Budget,
): Polynomial {
  const [leftContent, rightContent] = [contentIn(a, main, budget), contentIn(b, main, budget)];
  const content = gcdPolynomials(leftContent, rightContent, budget);
  if (!isOnePolynomial(leftContent) || !isOnePolynomial(rightContent)) {
    const left = quotientOf(a, leftContent, budget);
    const right = quotientOf(b, rightContent, budget);
    return mulPolynomials(content, gcdPolynomials(left, right, budget), budget);
  }
  return gcdByImages(a, b, main, bounds, budget) ?? gcdByRemainders(a, b, main, budget);
}

function primitiveIn(p: Polynomial, main: Generator, budget?: Budget): Polynomial {
  return normalPart(quotientOf(p, contentIn(p, main, budget), budget));
}

/** The gcd of two polynomials that are primitive in `main`, from images; null where luck ran out. */
function gcdByImages(
  a: Polynomial,
  b: Polynomial,
  main: Generator,
  bounds: ReadonlyMap<Generator, number>,
  budget?: Budget,
): Polynomial | null {
  const [leadA, leadB] = [leadingCoefficientIn(a, main), leadingCoefficientIn(b, main)];
  const integer = integerGcd(contentOf(leadA), contentOf(leadB));
  const gamma = scalePolynomial(gcdPolynomials(leadA, leadB, budget), integer);
  const generators = unionOfGenerators(a.generators, b.generators);
  const others = generators.filter((g) => g !== main);
  const problem = {
    a,
    b,
    gamma,
    main,
    generators,
    others,
    mainDegree: bounds.get(main) as number,
    bounds: others.map((g) => (bounds.get(g) ?? 0) + degreeIn(gamma, g)),
  };
  const accept = (candidate: Polynomial): Polynomial | null => {
    const primitive = primitiveIn(candidate, main, budget);
    const divides = divideExactly(a, primitive, budget) && divideExactly(b, primitive, budget);
    return divides ? primitive : null;
  };
  return sparseGcd(problem, accept, budget);
}

/** The same by a subresultant sequence: slow, never wrong. */
function gcdByRemainders(
  a: Polynomial,
  b: Polynomial,
  main: Generator,
  budget?: Budget,
): Polynomial {
  if (degreeIn(a, main) === 0 || degreeIn(b, main) === 0) return onePolynomial;
  const last = lastRemainder(a, b, main, budget);
  return degreeIn(last, main) === 0 ? onePolynomial : primitiveIn(last, main, budget);
}
