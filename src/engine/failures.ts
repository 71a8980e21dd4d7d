import { coefficientsIn, laplace, ratioFromPolynomial } from '../algebra/index.ts';
import {
  compileConditions,
  compileRatios,
  functionsOfS,
  UNDECIDED,
  YES,
  type Condition,
  type StabilityBlock,
} from '../control/index.ts';
import { polynomialRoots, type Complex } from '../numeric/index.ts';
import { complexText, conditionText, type Writing } from '../present/index.ts';
import type { Numbers, Points } from './numbers.ts';

const NOMINAL: Points = { count: 1, columns: new Map() };

/** Why a condition does not hold at a point, in a sentence that names the block and its roots; null where it does. */
export function failureOf(
  condition: Condition,
  numbers: Numbers,
  writing: Writing,
  at: Points = NOMINAL,
): string | null {
  if (verdictAt(condition, numbers, at) === YES) return null;
  switch (condition.kind) {
    case 'all':
      return firstFailure(condition.of, numbers, writing, at);
    case 'stable': {
      const block = condition.blocks.find(
        (candidate) => verdictAt({ kind: 'stable', blocks: [candidate] }, numbers, at) !== YES,
      );
      return block ? blockFailure(block, numbers, at) : null;
    }
    case 'undecided':
      return condition.reason;
    case 'truth':
      return 'it never holds';
    default:
      return `${conditionText(condition, writing)} does not hold`;
  }
}

function firstFailure(
  of: readonly Condition[],
  numbers: Numbers,
  writing: Writing,
  at: Points,
): string | null {
  for (const part of of) {
    const failure = failureOf(part, numbers, writing, at);
    if (failure) return failure;
  }
  return null;
}

function verdictAt(condition: Condition, numbers: Numbers, at: Points): number {
  const compiled = compileConditions([condition], numbers.resolve);
  return compiled.evaluate(numbers.inputs(compiled.inputs, at), at.count)[0][0];
}

function blockFailure(block: StabilityBlock, numbers: Numbers, at: Points): string {
  const name = block.signals.length === 0 ? 'it' : `the block of ${block.signals.join(', ')}`;
  if (functionsOfS(block.polynomial).length > 0) {
    const verdict = verdictAt({ kind: 'stable', blocks: [block] }, numbers, at);
    return verdict === UNDECIDED
      ? `the stability of ${name} with its dead time cannot be told; use rational_delay`
      : `${name} is not stable with its dead time`;
  }
  const roots = rootsAt(block, numbers, at).filter(
    (root) => root.re > -1e-9 * (1 + Math.hypot(root.re, root.im)),
  );
  if (roots.length === 0) return `${name} is not stable`;
  const places = roots.slice(0, 4).map(complexText).join(', ');
  const more = roots.length > 4 ? ', …' : '';
  return `${name} has ${roots.length === 1 ? 'a root' : 'roots'} outside the open left half plane, s = ${places}${more}`;
}

/** The roots of a block's characteristic polynomial at a point. */
export function rootsAt(
  block: StabilityBlock,
  numbers: Numbers,
  at: Points = NOMINAL,
): readonly Complex[] {
  const coefficients = [...coefficientsIn(block.polynomial, laplace)]
    .reverse()
    .map(ratioFromPolynomial);
  const { tape, inputs, outputs } = compileRatios(coefficients, numbers.resolve);
  const columns = tape.evaluateBatch(numbers.inputs(inputs, at), at.count);
  const values = outputs.map((output) => columns[output.re][0]);
  if (values.some((value) => !Number.isFinite(value))) return [];
  return polynomialRoots(values);
}
