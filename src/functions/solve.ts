import {
  decimalBound,
  exactForm,
  generatorsOf,
  laplace,
  ratioFromPolynomial,
  ratioFromRational,
  ratioOf,
  type AlgebraicNumber,
  type Generator,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import {
  ALWAYS,
  allOf,
  anyOf,
  compare,
  solutionsFor,
  solveInequality,
  stabilityConditions,
  stableIntervals,
  type Condition,
  type StabilityBlock,
  type Value,
} from '../control/index.ts';
import {
  absentAnswer,
  conditionAnswer,
  formulaAnswer,
  integerOf,
  nameOf,
  ratioOfArgument,
} from './answer.ts';
import {
  one,
  optional,
  type Argument,
  type FunctionContext,
  type WorksheetFunction,
} from './spec.ts';

export const solve: WorksheetFunction = {
  name: 'solve',
  summary:
    'An equation or an inequality solved for a symbol, with the direction that the signs allow; for `stable(…)` the intervals of a gain.',
  source: null,
  example: 'a, b are positive\nsolve(a x + b = 0, x)',
  parameters: [one('relation', 'relation'), one('K', 'unknown'), optional('digits', 'parameter')],
  unit: 'second',
  availability: 'now',
  evaluate: ([relation, unknown, wanted], context) => {
    const { generator } = nameOf(unknown);
    const digits = wanted ? integerOf(ratioOfArgument(wanted), 1, 'the number of digits') : DIGITS;
    if (isRefusal(digits)) return digits;
    if (relation.kind === 'relation') return solveRelation(relation, generator, context);
    const value = (relation as Extract<Argument, { kind: 'value' }>).value;
    if (value.kind === 'condition' && value.condition.kind === 'stable') {
      const blocks = value.condition.blocks.map((block) => openedBlock(block, generator, context));
      return solveStable(blocks, generator, digits, context);
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
  if (solutions.length === 0) {
    const kind = signOf(unknown) === 'unknown' ? 'no real' : 'no';
    const sign = signOf(unknown) === 'unknown' ? '' : ' of the sign assumed';
    return absentAnswer(`${kind} ${unknown.name}${sign} solves this`);
  }
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
  digits: number,
  context: FunctionContext,
): Value | Refusal {
  const numeric = blocks.every((block) =>
    generatorsOf(block.polynomial).every((g) => g === gain || g === laplace),
  );
  if (numeric) return intervalAnswer(blocks, gain, digits, context);
  const conditions = blocks.flatMap((block) =>
    stabilityConditions(block.polynomial, context.signOf, context.budget),
  );
  const notes = new Set<string>();
  const solved = conditions.map((condition): Condition => {
    if (condition.kind !== 'compare') return condition;
    const answer = solveInequality(condition, gain, context.signOf, context.budget);
    if (!isRefusal(answer)) return answer;
    if (answer.code === 'not-linear') notes.add(unsolvedNote(gain));
    return context.readable(condition);
  });
  return { kind: 'condition', condition: allOf(solved), when: ALWAYS, notes: [...notes] };
}

function unsolvedNote({ name }: Generator): string {
  return `A condition is not linear in ${name}; with numbers for all other symbols, stable(… with (…)), the intervals of ${name} are exact.`;
}

/** Digits of an end that no square root writes exactly, unless more are asked for. */
const DIGITS = 12;

function intervalAnswer(
  blocks: readonly StabilityBlock[],
  gain: Generator,
  digits: number,
  context: FunctionContext,
): Value {
  const polynomials = blocks.map((block) => block.polynomial);
  const notes: string[] = [];
  const intervals = stableIntervals(polynomials, gain, context.budget).map(({ from, to }) => {
    const parts: Condition[] = [];
    const end = (x: AlgebraicNumber, direction: 'up' | 'down'): Ratio => {
      const exact = exactForm(x, context.budget);
      if (!exact) notes.push(roundedNote(x, digits, context));
      return exact ?? ratioFromRational(decimalBound(x, digits, direction));
    };
    if (from) parts.push(compare(ratioOf(gain), '>', end(from, 'up')));
    if (to) parts.push(compare(ratioOf(gain), '<', end(to, 'down')));
    return allOf(parts);
  });
  return {
    kind: 'condition',
    condition: anyOf(intervals),
    when: ALWAYS,
    notes: [...new Set(notes)],
  };
}

/** What an end is exactly, and how it is shown. */
function roundedNote(x: AlgebraicNumber, digits: number, { write }: FunctionContext): string {
  const near = write(ratioFromRational(decimalBound(x, 4, 'down')));
  return `The end near ${near} is a root of ${write(ratioFromPolynomial(x.polynomial))}; it is rounded inwards to ${digits} digits.`;
}
