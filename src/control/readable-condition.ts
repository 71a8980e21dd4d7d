import {
  coefficientsIn,
  degreeIn,
  divRatios,
  generatorDependsOn,
  generatorsOf,
  isConstantPolynomial,
  negPolynomial,
  negRatio,
  polynomialOfTermList,
  ratioFromPolynomial,
  ratioOf,
  termsOf,
} from '../algebra/index.ts';
import type { Generator, Polynomial } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { allOf, anyOf, compare, mirrored, negation } from './conditions.ts';
import { partsOf, reduceCondition, relationOf, signsUnder } from './reduced-condition.ts';
import type { SignOf } from '../algebra/index.ts';
import type { Relation } from './reduced-condition.ts';
import { simpleSign } from './simple-factors.ts';
import type { Condition } from './values.ts';

/**
 * A relation solved for a gain in which it is linear: `gain operator bound`.
 *
 * Returns null where the gain is not linear in it, or its coefficient has no known sign.
 */
export function solveForGain(
  relation: Relation,
  gain: Generator,
  signOf: SignOf,
): Condition | null {
  if (degreeIn(relation.polynomial, gain) !== 1 || hiddenIn(relation.polynomial, gain)) return null;
  const [rest, coefficient] = coefficientsIn(relation.polynomial, gain);
  const sign = simpleSign(coefficient, signOf);
  if (sign !== 'positive' && sign !== 'negative') return null;
  const bound = negRatio(divRatios(ratioFromPolynomial(rest), ratioFromPolynomial(coefficient)));
  const { operator } = relation;
  return compare(ratioOf(gain), sign === 'positive' ? operator : mirrored(operator), bound);
}

/** Whether a generator also occurs inside a function of a polynomial. */
function hiddenIn(p: Polynomial, gain: Generator): boolean {
  return generatorsOf(p).some((g) => g !== gain && generatorDependsOn(g, gain));
}

/** Terms with positive and (their negatives) terms with negative integer coefficients. */
function bothSides(p: Polynomial): { readonly plus: Polynomial; readonly minus: Polynomial } {
  const terms = termsOf(p);
  return {
    plus: polynomialOfTermList(terms.filter((t) => t.coefficient > 0n)),
    minus: negPolynomial(polynomialOfTermList(terms.filter((t) => t.coefficient < 0n))),
  };
}

/** Only positive terms on both sides: a₁ a₂ > a₀ a₃. */
function balanced(relation: Relation): Condition {
  const { plus, minus } = bothSides(relation.polynomial);
  const swap = isConstantPolynomial(plus) && !isConstantPolynomial(minus);
  const [left, right] = swap ? [minus, plus] : [plus, minus];
  const operator = swap ? mirrored(relation.operator) : relation.operator;
  return compare(ratioFromPolynomial(left), operator, ratioFromPolynomial(right));
}

function readableRelation(
  relation: Relation,
  signOf: SignOf,
  preferred: readonly Generator[],
): Condition {
  const generators = generatorsOf(relation.polynomial);
  const candidates = generators.length === 1 ? generators : preferred;
  for (const gain of candidates) {
    const solved = solveForGain(relation, gain, signOf);
    if (solved) return solved;
  }
  return balanced(relation);
}

function readableTogether(
  conditions: readonly Condition[],
  signOf: SignOf,
  preferred: readonly Generator[],
  budget?: Budget,
): readonly Condition[] {
  return conditions.map((condition, i) => {
    const others = conditions.filter((_, k) => k !== i);
    return readable(condition, signsUnder(others, signOf), preferred, budget);
  });
}

/**
 * A condition as an engineer expects to read it: without factors of known sign, solved for the first of the
 * `preferred` symbols in which it is linear with a coefficient of known sign (`Kp > J Ki/Kd`), else with positive
 * terms on both sides (`a1 a2 > a0 a3`).
 */
export function readable(
  condition: Condition,
  signOf: SignOf,
  preferred: readonly Generator[],
  budget?: Budget,
): Condition {
  const reduced = reduceCondition(condition, signOf, budget);
  switch (reduced.kind) {
    case 'compare':
      return readableRelation(relationOf(reduced, signOf), signOf, preferred);
    case 'all':
      return allOf(readableTogether(partsOf(reduced), signOf, preferred, budget));
    case 'any':
      return anyOf(reduced.of.map((c) => readable(c, signOf, preferred, budget)));
    case 'not':
      return negation(readable(reduced.of, signOf, preferred, budget));
    default:
      return reduced;
  }
}
