import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import {
  ALWAYS,
  type Condition,
  type FormulaValue,
  type NoValue,
  type SignalValue,
  type Value,
} from '../control/index.ts';
import {
  constantValue,
  isConstantPolynomial,
  laplace,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../algebra/index.ts';
import type { Argument, LoopMeaning } from './spec.ts';

/** A formula as a function's answer. */
export function formulaAnswer(ratio: Ratio, more: Partial<FormulaValue> = {}): FormulaValue {
  return {
    kind: 'formula',
    ratio,
    hidden: null,
    origin: 'formula',
    when: ALWAYS,
    notes: [],
    ...more,
  };
}

/** A condition as a function's answer. */
export function conditionAnswer(condition: Condition, when: Condition = ALWAYS): Value {
  return { kind: 'condition', condition, when, notes: [] };
}

/** No value, with the reason. */
export function absentAnswer(reason: string): NoValue {
  return { kind: 'none', reason, growth: null, when: ALWAYS, notes: [] };
}

/** The answer of a computation on a formula, with the formula's own conditions, or its refusal. */
export function onFormula(
  argument: Argument,
  compute: (ratio: Ratio) => Ratio | Value | Refusal,
): Value | Refusal {
  const value = valueOf(argument) as FormulaValue;
  const answer = compute(value.ratio);
  if (isRefusal(answer)) return answer;
  return answer.kind === 'ratio' ? formulaAnswer(answer, { when: value.when }) : answer;
}

/** The value of an argument that is one; the evaluator has checked its kind. */
export function valueOf(argument: Argument): Value {
  return (argument as Extract<Argument, { kind: 'value' }>).value;
}

/** The formula of an argument; the evaluator has checked its kind. */
export function ratioOfArgument(argument: Argument): Ratio {
  return (valueOf(argument) as FormulaValue).ratio;
}

export function signalOf(argument: Argument): SignalValue {
  return (argument as Extract<Argument, { kind: 'signal' }>).signal;
}

export function loopOf(argument: Argument): LoopMeaning {
  return (argument as Extract<Argument, { kind: 'loop' }>).loop;
}

export function nameOf(argument: Argument): { name: string; generator: Generator } {
  return argument as Extract<Argument, { kind: 'name' }>;
}

/** The formula as a polynomial in s, or a refusal. Factors free of s in the denominator are multiplied out. */
export function polynomialOf(ratio: Ratio, what: string): Polynomial | Refusal {
  if (isConstantPolynomial(ratio.den) && constantValue(ratio.den) !== 0n) return ratio.num;
  if (!ratio.den.generators.includes(laplace)) return ratio.num;
  return refuse(
    'not-a-polynomial',
    `${what} takes a polynomial in s, and this has s in its denominator; take \`denominator(…)\` of a transfer function`,
  );
}

/** The largest order, power or number of digits that is worked out. */
const LARGEST_INTEGER = 1000;

/** The integer that a formula is, or a refusal. */
export function integerOf(ratio: Ratio, least: number, what: string): number | Refusal {
  const { num, den } = ratio;
  const whole = isConstantPolynomial(num) && isConstantPolynomial(den) && constantValue(den) === 1n;
  const value = whole ? Number(constantValue(num)) : NaN;
  return value >= least && value <= LARGEST_INTEGER
    ? value
    : refuse('not-an-integer', `${what} is a whole number from ${least} to ${LARGEST_INTEGER}`);
}
