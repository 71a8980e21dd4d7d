import {
  coefficientsIn,
  degreeIn,
  divRatios,
  factorPolynomial,
  generatorDependsOn,
  generatorsOf,
  isZeroPolynomial,
  negRatio,
  ratioFromPolynomial,
  signOfRatio,
  sqrtOf,
  subRatios,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio, Sign } from '../algebra/index.ts';
import { isRefusal, refuse } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certifySolution } from './certificate.ts';
import { solveForGain } from './readable-condition.ts';
import { reduceCondition, relationOf } from './reduced-condition.ts';
import type { SignOf } from '../algebra/index.ts';
import type { Condition } from './values.ts';

function occursInFunction(p: Polynomial, unknown: Generator): boolean {
  return generatorsOf(p).some((g) => g !== unknown && generatorDependsOn(g, unknown));
}

/** Whether a value of one sign can be of another. */
function signsAgree(found: Sign, wanted: Sign): boolean {
  const clashes: Readonly<Partial<Record<Sign, readonly Sign[]>>> = {
    positive: ['negative', 'zero', 'nonpositive'],
    negative: ['positive', 'zero', 'nonnegative'],
    nonnegative: ['negative'],
    nonpositive: ['positive'],
  };
  return !(clashes[wanted]?.includes(found) ?? false);
}

/** a x² = −c for an unknown of known sign; null where no real number solves it. */
function solveSquare(
  factor: Polynomial,
  unknown: Generator,
  signOf: SignOf,
  budget?: Budget,
): Ratio | null | Refusal {
  const [c, b, a] = coefficientsIn(factor, unknown);
  if (degreeIn(factor, unknown) !== 2 || !isZeroPolynomial(b)) {
    return refuse(
      'not-linear',
      `the equation has degree ${degreeIn(factor, unknown)} in ${unknown.name} and no rational solution for it was found`,
    );
  }
  const sign = signOf(unknown);
  const square = negRatio(divRatios(ratioFromPolynomial(c), ratioFromPolynomial(a)));
  if (signOfRatio(square, signOf) === 'negative') return null;
  const root = sqrtOf(square, budget);
  if (sign === 'positive' || sign === 'nonnegative') return root;
  if (sign === 'negative' || sign === 'nonpositive') return negRatio(root);
  return refuse(
    'two-solutions',
    `${unknown.name}^2 is given, which leaves its sign open; say whether ${unknown.name} is positive`,
  );
}

function solveFactor(
  factor: Polynomial,
  unknown: Generator,
  signOf: SignOf,
  budget?: Budget,
): Ratio | null | Refusal {
  if (degreeIn(factor, unknown) !== 1) return solveSquare(factor, unknown, signOf, budget);
  const [rest, coefficient] = coefficientsIn(factor, unknown);
  return negRatio(divRatios(ratioFromPolynomial(rest), ratioFromPolynomial(coefficient), budget));
}

/**
 * The solutions of left = right for a symbol, rational ones (one for each factor linear in it) or, where the sign of
 * the symbol is known, a square root. Solutions whose sign contradicts the symbol's are left out.
 *
 * Refuses where the equation does not hold the symbol, holds for every value or none, holds it inside a function, or
 * has a factor that is not solved here.
 */
export function solutionsFor(
  left: Ratio,
  right: Ratio,
  unknown: Generator,
  signOf: SignOf,
  budget?: Budget,
): readonly Ratio[] | Refusal {
  const equation = subRatios(left, right, budget).num;
  if (isZeroPolynomial(equation)) {
    return refuse('always-true', `the equation holds for every ${unknown.name}`);
  }
  if (occursInFunction(equation, unknown)) {
    return refuse(
      'not-rational',
      `${unknown.name} stands inside a function, where it is not solved for`,
    );
  }
  const factors = factorPolynomial(equation, budget)
    .factors.map(({ factor }) => factor)
    .filter((factor) => degreeIn(factor, unknown) > 0);
  if (factors.length === 0)
    return refuse('unknown-absent', `the equation does not contain ${unknown.name}`);
  const solutions: Ratio[] = [];
  for (const factor of factors) {
    const solution = solveFactor(factor, unknown, signOf, budget);
    if (solution === null) continue;
    if (isRefusal(solution)) return solution;
    certifySolution(equation, unknown, solution);
    if (signsAgree(signOfRatio(solution, signOf), signOf(unknown))) solutions.push(solution);
  }
  return solutions;
}

/** The one solution of left = right for a symbol, see `solutionsFor`; refuses where there are several or none. */
export function solveLinearFor(
  left: Ratio,
  right: Ratio,
  unknown: Generator,
  signOf: SignOf,
  budget?: Budget,
): Ratio | Refusal {
  const solutions = solutionsFor(left, right, unknown, signOf, budget);
  if (isRefusal(solutions)) return solutions;
  if (solutions.length === 1) return solutions[0];
  return solutions.length === 0
    ? refuse('no-solution', `no solution for ${unknown.name} has the sign that is assumed of it`)
    : refuse(
        'several-solutions',
        `the equation has ${solutions.length} solutions for ${unknown.name}`,
      );
}

/**
 * An inequality solved for a symbol in which it is linear, with the direction that the signs allow.
 *
 * Returns true or false where the signs decide the inequality without the symbol. Refuses where it is not linear or
 * where the sign of the symbol's coefficient is not known, naming what has to be known.
 */
export function solveInequality(
  condition: Extract<Condition, { kind: 'compare' }>,
  unknown: Generator,
  signOf: SignOf,
  budget?: Budget,
): Condition | Refusal {
  const reduced = reduceCondition(condition, signOf, budget);
  if (reduced.kind === 'truth') return reduced;
  if (reduced.kind !== 'compare') {
    return refuse('not-linear', `the inequality is not linear in ${unknown.name}`);
  }
  const relation = relationOf(reduced, signOf);
  const solved = solveForGain(relation, unknown, signOf);
  if (solved) return solved;
  const degree = degreeIn(relation.polynomial, unknown);
  if (degree < 1)
    return refuse('unknown-absent', `the inequality does not contain ${unknown.name}`);
  if (degree > 1 || occursInFunction(relation.polynomial, unknown)) {
    return refuse('not-linear', `the inequality is not linear in ${unknown.name}`);
  }
  const symbols = generatorsOf(coefficientsIn(relation.polynomial, unknown)[1]).map((g) => g.name);
  return refuse(
    'unknown-sign',
    `the sign of what multiplies ${unknown.name} is not known; it depends on ${symbols.join(', ')}`,
  );
}
