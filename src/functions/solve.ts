import {
  compareRational,
  parseRational,
  ratioOf,
  ratioFromPolynomial,
  ratioFromRational,
  generatorsOf,
  laplace,
  type Generator,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import {
  allOf,
  anyOf,
  compare,
  solutionsFor,
  solveInequality,
  stabilityConditions,
  stableIntervals,
  type Condition,
  type GainInterval,
  type RangeEnd,
  type StabilityBlock,
  type Value,
} from '../control/index.ts';
import { absentAnswer, conditionAnswer, formulaAnswer, nameOf } from './answer.ts';
import { one, type Argument, type FunctionContext, type WorksheetFunction } from './spec.ts';

export const solve: WorksheetFunction = {
  name: 'solve',
  summary:
    'An equation or an inequality solved for a symbol, with the direction that the signs allow; for `stable(…)` the intervals of a gain.',
  source: null,
  example: 'a, b are positive\nsolve(a x + b = 0, x)',
  parameters: [one('relation', 'relation'), one('K', 'unknown')],
  unit: 'second',
  availability: 'now',
  evaluate: ([relation, unknown], context) => {
    const { generator } = nameOf(unknown);
    if (relation.kind === 'relation') return solveRelation(relation, generator, context);
    const value = (relation as Extract<Argument, { kind: 'value' }>).value;
    if (value.kind === 'condition' && value.condition.kind === 'stable') {
      const blocks = value.condition.blocks.map((block) => openedBlock(block, generator, context));
      return solveStable(blocks, generator, context);
    }
    return refuse('not-a-relation', 'solve takes an equation, an inequality or stable(…)');
  },
};

function solveRelation(
  relation: Extract<Argument, { kind: 'relation' }>,
  unknown: Generator,
  context: FunctionContext,
): Value | Refusal {
  const ratios = relation.sides.map((side) => (side.kind === 'formula' ? side.ratio : null));
  const absent = relation.sides.find((side) => side.kind === 'none');
  if (absent) return absent;
  if (ratios.includes(null))
    return refuse('not-a-relation', 'both sides of the relation must be formulas');
  const when = allOf(relation.sides.map((side) => side.when));
  const sides = (ratios as Ratio[]).map((side) => context.openFor(side, unknown));
  if (relation.operators.length === 1 && relation.operators[0] === '=') {
    return solveEquation(sides[0], sides[1], unknown, when, context);
  }
  const parts: Condition[] = [];
  for (const [index, operator] of relation.operators.entries()) {
    const inequality = compare(sides[index], operator, sides[index + 1]) as Extract<
      Condition,
      { kind: 'compare' }
    >;
    const solved = solveInequality(inequality, unknown, context.signOf, context.budget);
    if (isRefusal(solved)) return solved;
    parts.push(solved);
  }
  return conditionAnswer(allOf(parts), when);
}

function solveEquation(
  left: Ratio,
  right: Ratio,
  unknown: Generator,
  when: Condition,
  { signOf, budget }: FunctionContext,
): Value | Refusal {
  const solutions = solutionsFor(left, right, unknown, signOf, budget);
  if (isRefusal(solutions)) return solutions;
  if (solutions.length === 0)
    return absentAnswer(`no ${unknown.name} of the sign assumed solves this`);
  if (solutions.length === 1) return formulaAnswer(solutions[0], { when });
  return {
    kind: 'parts',
    parts: solutions.map((ratio) => ({ name: unknown.name, value: formulaAnswer(ratio) })),
    joined: 'list',
    when,
    notes: [`There are ${solutions.length} solutions.`],
  };
}

/** The block with the gain in sight; a common denominator changes no root. */
function openedBlock(
  block: StabilityBlock,
  gain: Generator,
  { openFor }: FunctionContext,
): StabilityBlock {
  return { ...block, polynomial: openFor(ratioFromPolynomial(block.polynomial), gain).num };
}

/** With numbers for all else the exact intervals; in symbols the conditions, each solved for the gain where it is linear. */
function solveStable(
  blocks: readonly StabilityBlock[],
  gain: Generator,
  context: FunctionContext,
): Value | Refusal {
  const numeric = blocks.every((block) =>
    generatorsOf(block.polynomial).every((g) => g === gain || g === laplace),
  );
  if (numeric) return intervalAnswer(blocks, gain, context);
  const conditions = blocks.flatMap((block) =>
    stabilityConditions(block.polynomial, context.signOf, context.budget),
  );
  const solved = conditions.map((condition): Condition => {
    if (condition.kind !== 'compare') return condition;
    const answer = solveInequality(condition, gain, context.signOf, context.budget);
    return isRefusal(answer) ? context.readable(condition) : answer;
  });
  return conditionAnswer(allOf(solved));
}

function intervalAnswer(
  blocks: readonly StabilityBlock[],
  gain: Generator,
  { budget }: FunctionContext,
): Value {
  const ranges = blocks.map((block) => stableIntervals(block.polynomial, gain, budget));
  const each = ranges.map((block) => anyOf(block.map((range) => within(range, gain))));
  const isRounded = ranges
    .flat()
    .some(({ from, to }) => [from, to].some((end) => end !== null && !isExact(end)));
  return {
    ...conditionAnswer(allOf(each)),
    notes: isRounded ? [`Ends are roots of polynomials, given to ${END_DIGITS} digits.`] : [],
  };
}

function within(range: GainInterval, gain: Generator): Condition {
  const parts: Condition[] = [];
  if (range.from) parts.push(compare(ratioOf(gain), '>', endRatio(range.from)));
  if (range.to) parts.push(compare(ratioOf(gain), '<', endRatio(range.to)));
  return allOf(parts);
}

const END_DIGITS = 6;

function isExact({ low, high }: RangeEnd): boolean {
  return compareRational(low, high) === 0;
}

/** An end of an interval; where it is not rational, as a decimal. */
function endRatio(end: RangeEnd): Ratio {
  const decimal = String(Number(end.value.toPrecision(END_DIGITS)));
  return ratioFromRational(isExact(end) ? end.low : parseRational(decimal));
}
