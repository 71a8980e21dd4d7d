import { subRatios } from '../algebra/index.ts';
import { hurwitzVerdicts, TapeBuilder } from '../numeric/index.ts';
import type { BatchInput, Slot, Tape } from '../numeric/index.ts';
import { RatioCompiler } from './compile.ts';
import type { Resolve } from './compile.ts';
import { hurwitzMargins } from './hurwitz-margin.ts';
import { descendingInS, functionsOfS } from './s-polynomial.ts';
import type { Comparison, Condition } from './values.ts';

/** Verdict of a condition at a point. */
export const NO = 0;
export const YES = 1;
export const UNDECIDED = 2;

/** What a condition says at every point of a batch. */
export interface ConditionBatch {
  /** 1 holds, 0 does not, 2 cannot be told (a value is missing or not a number). */
  readonly verdicts: Uint8Array;
  /** Positive inside, for comparisons left minus right in the sense of the operator; null where there is no measure. */
  readonly margins: Float64Array | null;
}

/** A condition whose ratios are outputs of a tape. */
type Compiled =
  | { readonly kind: 'constant'; readonly verdict: 0 | 1 | 2 }
  | {
      readonly kind: 'compare';
      readonly operator: Comparison;
      readonly left: number;
      readonly right: number;
      readonly difference: number;
    }
  | { readonly kind: 'stable'; readonly blocks: readonly (readonly number[])[] }
  | { readonly kind: 'all' | 'any'; readonly of: readonly Compiled[] }
  | { readonly kind: 'not'; readonly of: Compiled };

/** Conditions compiled to one tape; evaluated over a batch of points. */
export interface CompiledConditions {
  /** Names of the inputs, in the order in which `evaluate` takes them. */
  readonly inputs: readonly string[];
  /** One batch for each condition, in their order. */
  evaluate(values: readonly BatchInput[], count: number): readonly ConditionBatch[];
}

class ConditionCompiler {
  readonly places: Slot[] = [];
  readonly builder = new TapeBuilder();
  private readonly compiler: RatioCompiler;

  constructor(resolve: Resolve) {
    this.compiler = new RatioCompiler(this.builder, resolve);
  }

  compile(condition: Condition): Compiled {
    switch (condition.kind) {
      case 'truth':
        return { kind: 'constant', verdict: condition.value ? YES : NO };
      case 'undecided':
        return { kind: 'constant', verdict: UNDECIDED };
      case 'compare':
        return this.comparison(condition);
      case 'stable':
        return this.stable(condition);
      case 'not':
        return { kind: 'not', of: this.compile(condition.of) };
      default:
        return { kind: condition.kind, of: condition.of.map((c) => this.compile(c)) };
    }
  }

  private comparison(condition: Extract<Condition, { kind: 'compare' }>): Compiled {
    const { left, operator, right } = condition;
    const slots = [left, right, subRatios(left, right)].map((r) => this.compiler.ratio(r));
    if (slots.some(({ im }) => im !== null)) return { kind: 'constant', verdict: UNDECIDED };
    const [leftAt, rightAt, difference] = slots.map(({ re }) => this.place(re));
    return { kind: 'compare', operator, left: leftAt, right: rightAt, difference };
  }

  private stable(condition: Extract<Condition, { kind: 'stable' }>): Compiled {
    const polynomials = condition.blocks.map((b) => b.polynomial);
    if (polynomials.some((p) => functionsOfS(p).length > 0)) {
      return { kind: 'constant', verdict: UNDECIDED };
    }
    const blocks = polynomials.map((p) =>
      descendingInS(p).map((c) => this.place(this.compiler.polynomial(c).re)),
    );
    return { kind: 'stable', blocks };
  }

  private place(slot: Slot): number {
    return this.places.push(slot) - 1;
  }
}

/** Two numbers this close, relative to the larger, count as equal. */
const EQUAL = 1e-9;

function compareVerdict(operator: Comparison, left: number, right: number): 0 | 1 | 2 {
  if (Number.isNaN(left) || Number.isNaN(right)) return UNDECIDED;
  switch (operator) {
    case '>':
      return left > right ? YES : NO;
    case '>=':
      return left >= right ? YES : NO;
    case '<':
      return left < right ? YES : NO;
    case '<=':
      return left <= right ? YES : NO;
    default: {
      const gap = Math.abs(left - right);
      const equal = left === right || gap <= EQUAL * Math.max(Math.abs(left), Math.abs(right));
      return equal === (operator === '=') ? YES : NO;
    }
  }
}

type Columns = readonly Float64Array[];

function compareBatch(
  node: Extract<Compiled, { kind: 'compare' }>,
  columns: Columns,
  count: number,
): ConditionBatch {
  const verdicts = new Uint8Array(count);
  const [left, right] = [columns[node.left], columns[node.right]];
  for (let i = 0; i < count; i++) verdicts[i] = compareVerdict(node.operator, left[i], right[i]);
  if (node.operator === '=' || node.operator === '!=') return { verdicts, margins: null };
  const difference = columns[node.difference];
  const upward = node.operator === '>' || node.operator === '>=';
  return { verdicts, margins: upward ? difference : difference.map((x) => -x) };
}

function stableBatch(coefficients: readonly Float64Array[], count: number): ConditionBatch {
  const verdicts = hurwitzVerdicts(coefficients, count);
  coefficients.forEach((column) => {
    for (let i = 0; i < count; i++) if (Number.isNaN(column[i])) verdicts[i] = UNDECIDED;
  });
  return { verdicts, margins: hurwitzMargins(coefficients, count) };
}

const conjoin = (a: number, b: number): number =>
  a === NO || b === NO ? NO : a === YES && b === YES ? YES : UNDECIDED;
const disjoin = (a: number, b: number): number =>
  a === YES || b === YES ? YES : a === NO && b === NO ? NO : UNDECIDED;

function joinBatches(kind: 'all' | 'any', parts: readonly ConditionBatch[]): ConditionBatch {
  const [join, nearest] = kind === 'all' ? [conjoin, Math.min] : [disjoin, Math.max];
  return parts.reduce((a, b) => ({
    verdicts: a.verdicts.map((v, i) => join(v, b.verdicts[i])),
    margins: a.margins && b.margins ? a.margins.map((m, i) => nearest(m, b.margins![i])) : null,
  }));
}

function opposite({ verdicts, margins }: ConditionBatch): ConditionBatch {
  return {
    verdicts: verdicts.map((v) => (v === UNDECIDED ? v : 1 - v)),
    margins: margins && margins.map((m) => -m),
  };
}

function evaluateNode(node: Compiled, columns: Columns, count: number): ConditionBatch {
  switch (node.kind) {
    case 'constant':
      return { verdicts: new Uint8Array(count).fill(node.verdict), margins: null };
    case 'compare':
      return compareBatch(node, columns, count);
    case 'stable':
      return joinBatches(
        'all',
        node.blocks.map((block) =>
          stableBatch(
            block.map((k) => columns[k]),
            count,
          ),
        ),
      );
    case 'not':
      return opposite(evaluateNode(node.of, columns, count));
    default:
      return joinBatches(
        node.kind,
        node.of.map((part) => evaluateNode(part, columns, count)),
      );
  }
}

/**
 * Compiles conditions to one tape for evaluation over batches of points.
 *
 * Stability is judged by Routh's test on the coefficients of every block; leading coefficients that are exactly 0 are
 * dropped, so that stability is that of the equations as they are there.
 */
export function compileConditions(
  conditions: readonly Condition[],
  resolve: Resolve,
): CompiledConditions {
  const compiler = new ConditionCompiler(resolve);
  const nodes = conditions.map((c) => compiler.compile(c));
  const tape: Tape = compiler.builder.build(compiler.places);
  return {
    inputs: tape.inputs,
    evaluate(values, count) {
      const columns = tape.evaluateBatch(values, count);
      return nodes.map((node) => evaluateNode(node, columns, count));
    },
  };
}
