import { Budget, currentBudget, spend } from '../base/index.ts';
import { contentIn } from './gcd.ts';
import {
  coefficientsIn,
  comparePolynomials,
  contentOf,
  degreeIn,
  generatorPolynomial,
  isConstantPolynomial,
  isOnePolynomial,
  isZeroPolynomial,
  leadingCoefficientSign,
  mulPolynomials,
  normalPart,
  scalePolynomial,
  subPolynomials,
} from './polynomial.ts';
import { polynomialKey } from './key.ts';
import { monomialContent, quotientOf } from './quotient.ts';
import { squareFreeFactors, squareRootOfPolynomial, type PowerFactor } from './square-free.ts';
import { splitMultivariate } from './multivariate-factor.ts';
import type { Generator, Polynomial } from './ring.ts';
import { factorUnivariate } from './univariate-factor.ts';

/** unit · Π factor^multiplicity; factors are primitive with positive leading coefficients, in a fixed order. */
export interface Factorization {
  readonly unit: bigint;
  readonly factors: readonly PowerFactor[];
}

/**
 * Factors a polynomial over ℤ: monomials, contents in each generator, repeated factors, then factors of degree one
 * or two in some generator, of one generator, and of several. Where coefficients are too large for the lifting or
 * factors at points too many, factors may stay together, but the product is always p.
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
  const pair = splitMultivariate(p, budget);
  return pair ? pair.flatMap((part) => splitSquareFree(part, budget)) : [p];
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
