import {
  equalPolynomials,
  generatorPolynomial,
  generatorsOf,
  isConstantPolynomial,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  powPolynomial,
  ratioFromPolynomial,
  subRatios,
  zeroRatio,
} from '../algebra/index.ts';
import type { Generator, Polynomial, PowerFactor, Sign, SignOf } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import {
  allOf,
  anyOf,
  compare,
  decideBySign,
  equalConditions,
  negation,
  truth,
} from './conditions.ts';
import { isImplied } from './implied-condition.ts';
import { simpleFactors, simpleSign } from './simple-factors.ts';
import type { Comparison, Condition } from './values.ts';

/** `polynomial > 0`, `>= 0`, `= 0` or `!= 0`. */
export interface Relation {
  readonly polynomial: Polynomial;
  readonly operator: '>' | '>=' | '=' | '!=';
}

type Compare = Extract<Condition, { kind: 'compare' }>;

function turned(polynomial: Polynomial, operator: Comparison): Relation {
  if (operator === '<') return { polynomial: negPolynomial(polynomial), operator: '>' };
  if (operator === '<=') return { polynomial: negPolynomial(polynomial), operator: '>=' };
  return { polynomial, operator };
}

/** A comparison of ratios as one polynomial compared with zero; denominators are taken to be nonzero. */
export function relationOf(condition: Compare, signOf: SignOf): Relation {
  const { num, den } = subRatios(condition.left, condition.right);
  const { operator } = condition;
  if (operator === '=' || operator === '!=') return { polynomial: num, operator };
  const sign = simpleSign(den, signOf);
  if (sign === 'positive') return turned(num, operator);
  if (sign === 'negative') return turned(negPolynomial(num), operator);
  return turned(mulPolynomials(num, den), operator);
}

/** A relation as a condition against zero. */
export function conditionOf(relation: Relation): Condition {
  return compare(ratioFromPolynomial(relation.polynomial), relation.operator, zeroRatio);
}

interface Split {
  /** Product of the factors that stay. */
  rest: Polynomial;
  negative: boolean;
  /** What the dropped factors ask for. */
  readonly also: Condition[];
}

function splitStrict(split: Split, { factor, multiplicity }: PowerFactor, sign: Sign): void {
  const odd = multiplicity % 2 === 1;
  if (sign === 'negative' || sign === 'nonpositive') split.negative = split.negative !== odd;
  if (sign === 'positive' || sign === 'negative') return;
  if (sign === 'unknown' && odd) {
    split.rest = mulPolynomials(split.rest, factor);
  } else {
    split.also.push(conditionOf({ polynomial: factor, operator: '!=' }));
  }
}

function splitWeak(split: Split, { factor, multiplicity }: PowerFactor, sign: Sign): void {
  const odd = multiplicity % 2 === 1;
  if (sign === 'negative') split.negative = split.negative !== odd;
  if (sign === 'positive' || sign === 'negative') return;
  split.rest = mulPolynomials(split.rest, powPolynomial(factor, odd ? 1 : 2));
}

function decided(relation: Relation, signOf: SignOf, budget?: Budget): Condition | null {
  const truthValue = decideBySign(
    simpleSign(relation.polynomial, signOf, budget),
    relation.operator,
  );
  return truthValue === null ? null : truth(truthValue);
}

function reduceInequality(relation: Relation, signOf: SignOf, budget?: Budget): Condition {
  const { unit, factors } = simpleFactors(relation.polynomial, budget);
  const split: Split = { rest: onePolynomial, negative: unit < 0n, also: [] };
  const take = relation.operator === '>' ? splitStrict : splitWeak;
  for (const power of factors) take(split, power, simpleSign(power.factor, signOf, budget));
  const polynomial = split.negative ? negPolynomial(split.rest) : split.rest;
  const rest = { polynomial, operator: relation.operator };
  return allOf([decided(rest, signOf, budget) ?? conditionOf(rest), ...split.also]);
}

function reduceEquation(relation: Relation, signOf: SignOf, budget?: Budget): Condition {
  const zeros = simpleFactors(relation.polynomial, budget).factors.map(({ factor }) => {
    const equation: Relation = { polynomial: factor, operator: '=' };
    return decided(equation, signOf, budget) ?? conditionOf(equation);
  });
  const vanishes = anyOf(zeros);
  return relation.operator === '=' ? vanishes : negation(vanishes);
}

/** A relation without the factors of known sign; true or false where the signs decide it. */
export function reduceRelation(relation: Relation, signOf: SignOf, budget?: Budget): Condition {
  const known = decided(relation, signOf, budget);
  if (known) return known;
  if (relation.operator === '>' || relation.operator === '>=') {
    return reduceInequality(relation, signOf, budget);
  }
  return reduceEquation(relation, signOf, budget);
}

/**
 * A condition without factors of known sign, with what the signs decide replaced by true or false.
 *
 * Conditions joined by `and` are read together: one that fixes the sign of a symbol simplifies the others.
 */
export function reduceCondition(condition: Condition, signOf: SignOf, budget?: Budget): Condition {
  switch (condition.kind) {
    case 'compare':
      return reduceRelation(relationOf(condition, signOf), signOf, budget);
    case 'all':
      return allOf(reduceTogether(condition.of, signOf, budget));
    case 'any':
      return anyOf(condition.of.map((c) => reduceCondition(c, signOf, budget)));
    case 'not':
      return negation(reduceCondition(condition.of, signOf, budget));
    default:
      return condition;
  }
}

/** The symbol whose sign a condition fixes, with that sign; null if it does not. */
function fixedSign(condition: Condition): { generator: Generator; sign: Sign } | null {
  if (condition.kind !== 'compare') return null;
  const { polynomial, operator } = relationOf(condition, () => 'unknown');
  if (operator !== '>') return null;
  const { unit, factors } = simpleFactors(polynomial);
  if (factors.length !== 1 || factors[0].multiplicity !== 1) return null;
  const generator = soleGenerator(factors[0].factor);
  return generator && { generator, sign: unit > 0n ? 'positive' : 'negative' };
}

function soleGenerator(p: Polynomial): Generator | null {
  if (isConstantPolynomial(p)) return null;
  const [first, ...others] = generatorsOf(p);
  return others.length === 0 && equalPolynomials(p, generatorPolynomial(first)) ? first : null;
}

/** The signs assumed, together with those that other conditions fix. */
export function signsUnder(conditions: readonly Condition[], signOf: SignOf): SignOf {
  const fixed = new Map<Generator, Sign>();
  for (const condition of conditions) {
    const found = fixedSign(condition);
    if (found) fixed.set(found.generator, found.sign);
  }
  return (g) => fixed.get(g) ?? signOf(g);
}

/** Conditions that hold together, each reduced by what the others say of signs, until nothing changes. */
export function reduceTogether(
  conditions: readonly Condition[],
  signOf: SignOf,
  budget?: Budget,
): readonly Condition[] {
  let current = partsOf(allOf(conditions.map((c) => reduceCondition(c, signOf, budget))));
  for (;;) {
    const next = [...current];
    next.forEach((condition, i) => {
      const others = next.filter((_, k) => k !== i);
      next[i] = reduceCondition(condition, signsUnder(others, signOf), budget);
    });
    const flat = partsOf(allOf(next));
    if (equalConditions(allOf(flat), allOf(current))) return withoutImplied(flat, signOf, budget);
    current = flat;
  }
}

/** The conditions but those that the others imply, one after the other. */
function withoutImplied(
  conditions: readonly Condition[],
  signOf: SignOf,
  budget?: Budget,
): readonly Condition[] {
  let kept = conditions;
  for (const condition of conditions) {
    const others = kept.filter((other) => other !== condition);
    if (others.length < kept.length && follows(condition, others, signOf, budget)) kept = others;
  }
  return kept;
}

function follows(
  condition: Condition,
  others: readonly Condition[],
  signOf: SignOf,
  budget?: Budget,
): boolean {
  if (condition.kind !== 'compare') return false;
  const premises = others.flatMap((other) => {
    const relation = other.kind === 'compare' ? relationOf(other, signOf) : null;
    return relation?.operator === '>' || relation?.operator === '>='
      ? [{ polynomial: relation.polynomial, isStrict: relation.operator === '>' }]
      : [];
  });
  const { polynomial, operator } = relationOf(condition, signOf);
  const shows = (p: Polynomial, isStrict: boolean): boolean =>
    isImplied(p, isStrict, premises, signOf, budget);
  if (operator === '=') return false;
  if (operator === '!=') return shows(polynomial, true) || shows(negPolynomial(polynomial), true);
  return shows(polynomial, operator === '>');
}

/** The conditions that a conjunction joins; none for true. */
export function partsOf(condition: Condition): readonly Condition[] {
  if (condition.kind === 'all') return condition.of;
  return condition.kind === 'truth' && condition.value ? [] : [condition];
}
