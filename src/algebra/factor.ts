import { Budget, currentBudget, spend } from '../base/index.ts';
import { contentIn } from './gcd.ts';
import { absolute } from './integer.ts';
import {
  addPolynomials,
  coefficientsIn,
  comparePolynomials,
  constantPolynomial,
  contentOf,
  degreeIn,
  generatorPolynomial,
  isConstantPolynomial,
  isOnePolynomial,
  isZeroPolynomial,
  leadingCoefficientSign,
  mulPolynomials,
  negPolynomial,
  normalPart,
  powPolynomial,
  scalePolynomial,
  subPolynomials,
} from './polynomial.ts';
import { polynomialKey } from './key.ts';
import { imageAt, termValues } from './point-image.ts';
import { ElementSequence, fieldNumber } from './prime-field.ts';
import { divideExactly, monomialContent, quotientOf } from './quotient.ts';
import { squareFreeFactors, squareRootOfPolynomial, type PowerFactor } from './square-free.ts';
import type { Generator, Polynomial } from './ring.ts';
import { factorUnivariate } from './univariate-factor.ts';

/** unit · Π factor^multiplicity; factors are primitive with positive leading coefficients, in a fixed order. */
export interface Factorization {
  readonly unit: bigint;
  readonly factors: readonly PowerFactor[];
}

/**
 * Factors a polynomial over ℤ. Monomials, contents in each generator, repeated factors, all factors of a polynomial
 * in one generator or of degree at most two in some generator, and factors linear in some generator are found. Other
 * factors may stay together (cost grows too fast otherwise), but the product is always p.
 */
export function factorPolynomial(p: Polynomial, budget?: Budget): Factorization {
  if (isZeroPolynomial(p)) return { unit: 0n, factors: [] };
  const unit = contentOf(p) * BigInt(leadingCoefficientSign(p));
  return Object.freeze({ unit, factors: factorsKept(normalPart(p), budget) });
}

/** The factors found last, by key, with the work that they took: signs and conditions ask for the same ones again. */
const kept = new Map<string, { readonly factors: readonly PowerFactor[]; readonly work: number }>();
const KEPT = 400;
const UNLIMITED = Number.MAX_SAFE_INTEGER;

/** Factors from memory, or found and remembered; the work is spent either way, so that results do not depend on it. */
function factorsKept(
  p: Polynomial,
  budget = currentBudget() ?? new Budget(UNLIMITED),
): readonly PowerFactor[] {
  const key = polynomialKey(p);
  const known = kept.get(key);
  if (known) {
    spend(budget, known.work, 'factoring');
    return known.factors;
  }
  const before = budget.spent;
  const factors = findFactors(p, budget);
  const oldest = kept.keys().next();
  if (kept.size >= KEPT && !oldest.done) kept.delete(oldest.value);
  kept.set(key, { factors, work: budget.spent - before });
  return factors;
}

function findFactors(p: Polynomial, budget?: Budget): readonly PowerFactor[] {
  const found = new Map<string, PowerFactor>();
  const collect = ({ factor, multiplicity }: PowerFactor): void => {
    const key = polynomialKey(factor);
    const before = found.get(key)?.multiplicity ?? 0;
    found.set(key, { factor, multiplicity: before + multiplicity });
  };
  for (const factor of factorsWithMonomial(p, budget)) collect(factor);
  return Object.freeze([...found.values()].sort((a, b) => comparePolynomials(a.factor, b.factor)));
}

function factorsWithMonomial(p: Polynomial, budget?: Budget): PowerFactor[] {
  const monomial = monomialContent(p);
  const powers = monomial.generators.map((g, k) => ({
    factor: generatorPolynomial(g),
    multiplicity: monomial.degrees[k],
  }));
  return [...powers, ...factorsByContent(quotientOf(p, monomial), budget)];
}

/** Splits off the content in each generator until the polynomial is primitive in all of them. */
function factorsByContent(p: Polynomial, budget?: Budget): PowerFactor[] {
  if (isConstantPolynomial(p)) return [];
  for (const g of generatorsByDegree(p)) {
    const content = contentIn(p, g, budget);
    if (isOnePolynomial(content)) continue;
    const rest = quotientOf(p, content, budget);
    return [...factorsByContent(content, budget), ...factorsByContent(rest, budget)];
  }
  return factorsOfPrimitive(p, budget);
}

function generatorsByDegree(p: Polynomial): Generator[] {
  return [...p.generators].sort((a, b) => degreeIn(p, a) - degreeIn(p, b));
}

/** p is primitive in each of its generators: any one of them shows the repeated factors. */
function factorsOfPrimitive(p: Polynomial, budget?: Budget): PowerFactor[] {
  const [g] = generatorsByDegree(p);
  if (degreeIn(p, g) === 1) return [{ factor: p, multiplicity: 1 }];
  return squareFreeFactors(p, g, budget).flatMap(({ factor, multiplicity }) =>
    splitSquareFree(factor, budget).map((part) => ({ factor: part, multiplicity })),
  );
}

function splitSquareFree(p: Polynomial, budget?: Budget): Polynomial[] {
  const [g] = generatorsByDegree(p);
  const degree = degreeIn(p, g);
  if (degree === 1) return [p];
  if (degree === 2) return splitQuadratic(p, g, budget);
  if (p.generators.length === 1) return factorUnivariate(p, g, budget);
  const factor = findLinearFactor(p, budget);
  return factor ? [factor, ...splitSquareFree(quotientOf(p, factor, budget), budget)] : [p];
}

/** p = a x² + b x + c, primitive in x, splits exactly where b² − 4ac is a square r²: into 2 a x + b ± r. */
function splitQuadratic(p: Polynomial, g: Generator, budget?: Budget): Polynomial[] {
  const [c, b, a] = coefficientsIn(p, g);
  const square = mulPolynomials(b, b, budget);
  const discriminant = subPolynomials(square, scalePolynomial(mulPolynomials(a, c, budget), 4n));
  const root = squareRootOfPolynomial(discriminant, budget);
  if (!root) return [p];
  const twice = mulPolynomials(scalePolynomial(a, 2n), generatorPolynomial(g));
  const linear = subPolynomials(subPolynomials(twice, scalePolynomial(b, -1n)), root);
  const factor = normalPart(quotientOf(linear, contentIn(linear, g, budget), budget));
  return [factor, quotientOf(p, factor, budget)];
}

const MOST_CANDIDATES = 4096;

/** A factor a x + b in some generator x, or null: a divides the leading coefficient in x and b the trailing one. */
function findLinearFactor(p: Polynomial, budget?: Budget): Polynomial | null {
  for (const g of p.generators) {
    const coefficients = coefficientsIn(p, g);
    const leads = divisorsOf(coefficients[coefficients.length - 1], budget);
    const trails = divisorsOf(coefficients[0], budget);
    if (leads.length * trails.length > MOST_CANDIDATES) continue;
    budget?.spend(2 * leads.length * trails.length, 'factoring a polynomial');
    const vanishes = rootTest(p, g);
    for (const a of leads) {
      for (const b of trails.flatMap((trail) => [trail, negPolynomial(trail)])) {
        if (!vanishes(a, b)) continue;
        const factor = addPolynomials(mulPolynomials(a, generatorPolynomial(g)), b);
        const normal = normalPart(factor);
        if (divideExactly(p, normal, budget)) return normal;
      }
    }
  }
  return null;
}

/** All divisors with positive leading coefficients, as far as factors are found and integers are small. */
function divisorsOf(p: Polynomial, budget?: Budget): readonly Polynomial[] {
  const { unit, factors } = factorPolynomial(p, budget);
  return factors.reduce<readonly Polynomial[]>(
    (divisors, { factor, multiplicity }) =>
      divisors.flatMap((divisor) =>
        Array.from({ length: multiplicity + 1 }, (_, k) =>
          mulPolynomials(divisor, powPolynomial(factor, k)),
        ),
      ),
    integerDivisors(absolute(unit)).map(constantPolynomial),
  );
}

const LARGEST_CONTENT = 10_000n;

/** The positive divisors of n; of a large n only 1 and n itself. */
function integerDivisors(n: bigint): readonly bigint[] {
  if (n > LARGEST_CONTENT) return [1n, n];
  const numbers = Array.from({ length: Number(n) }, (_, k) => BigInt(k + 1));
  return numbers.filter((k) => n % k === 0n);
}

/** A test, at one point modulo a prime, of whether −b/a can be a root of p in g. */
function rootTest(p: Polynomial, g: Generator): (a: Polynomial, b: Polynomial) => boolean {
  const field = fieldNumber(0);
  const elements = new ElementSequence(23);
  const point = new Map(p.generators.map((other) => [other, elements.next(field)]));
  const image = imageAt(p, g, point, field);
  const valueAt = (q: Polynomial): number =>
    termValues(q, point, field).reduce((sum, value) => field.add(sum, value), 0);
  return (a, b) => {
    const lead = valueAt(a);
    if (lead === 0) return true;
    const root = field.mul(field.sub(0, valueAt(b)), field.inverse(lead));
    return image.reduceRight((sum, c) => field.add(field.mul(sum, root), c), 0) === 0;
  };
}
