import { hurwitzVerdicts, TapeBuilder } from '../numeric/index.ts';
import type { BatchInput, Slot, Tape } from '../numeric/index.ts';
import { RatioCompiler } from './compile.ts';
import type { Resolve } from './compile.ts';
import { delayTerms, isDelayStable } from './dead-time.ts';
import type { DelayTerm } from './dead-time.ts';
import { descendingInS } from './s-polynomial.ts';
import type { Comparison, Condition } from './values.ts';

/** Verdict of a condition at a point. */
export const NO = 0;
export const YES = 1;
export const UNDECIDED = 2;

/** The terms of a block's characteristic function, one without dead time, as outputs of a tape. */
type CompiledBlock = readonly DelayTerm<readonly number[], number>[];

/** A condition whose ratios are outputs of a tape. */
type Compiled =
  | { readonly kind: 'constant'; readonly verdict: 0 | 1 | 2 }
  | {
      readonly kind: 'compare';
      readonly operator: Comparison;
      readonly left: number;
      readonly right: number;
    }
  | { readonly kind: 'stable'; readonly blocks: readonly CompiledBlock[] }
  | { readonly kind: 'all' | 'any'; readonly of: readonly Compiled[] }
  | { readonly kind: 'not'; readonly of: Compiled };

/** Conditions compiled to one tape; evaluated over a batch of points. */
export interface CompiledConditions {
  /** Names of the inputs, in the order in which `evaluate` takes them. */
  readonly inputs: readonly string[];
  /** For each condition, in their order, the verdict at every point: {@link YES}, {@link NO} or {@link UNDECIDED}. */
  evaluate(values: readonly BatchInput[], count: number): readonly Uint8Array[];
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
    const slots = [left, right].map((r) => this.compiler.ratio(r));
    if (slots.some(({ im }) => im !== null)) return { kind: 'constant', verdict: UNDECIDED };
    const [leftAt, rightAt] = slots.map(({ re }) => this.place(re));
    return { kind: 'compare', operator, left: leftAt, right: rightAt };
  }

  private stable(condition: Extract<Condition, { kind: 'stable' }>): Compiled {
    const blocks: CompiledBlock[] = [];
    for (const { polynomial } of condition.blocks) {
      const terms = delayTerms(polynomial);
      if (!terms) return { kind: 'constant', verdict: UNDECIDED };
      blocks.push(
        terms.map(({ coefficients, delay }) => ({
          coefficients: descendingInS(coefficients).map((c) =>
            this.place(this.compiler.polynomial(c).re),
          ),
          delay: this.place(this.compiler.ratio(delay).re),
        })),
      );
    }
    return { kind: 'stable', blocks };
  }

  private place(slot: Slot): number {
    return this.places.push(slot) - 1;
  }
}

/** Two numbers this close, relative to the smaller, are equal but for the rounding of their computation. */
const EQUAL = 1e-12;

function compareVerdict(operator: Comparison, left: number, right: number): 0 | 1 | 2 {
  if (Number.isNaN(left) || Number.isNaN(right)) return UNDECIDED;
  const gap = Math.abs(left - right);
  const isEqual = left === right || gap <= EQUAL * Math.min(Math.abs(left), Math.abs(right));
  if (isEqual) return operator === '=' || operator === '<=' || operator === '>=' ? YES : NO;
  const isLess = operator === '<' || operator === '<=';
  return operator === '!=' || (operator !== '=' && isLess === left < right) ? YES : NO;
}

type Columns = readonly Float64Array[];

function compareVerdicts(
  node: Extract<Compiled, { kind: 'compare' }>,
  columns: Columns,
  count: number,
): Uint8Array {
  const verdicts = new Uint8Array(count);
  const [left, right] = [columns[node.left], columns[node.right]];
  for (let i = 0; i < count; i++) verdicts[i] = compareVerdict(node.operator, left[i], right[i]);
  return verdicts;
}

function routhVerdicts(coefficients: Columns, count: number): Uint8Array {
  const verdicts = hurwitzVerdicts(coefficients, count);
  for (let i = 0; i < count; i++) {
    // A coefficient that is not a number never counts as stable, but neither is it known to be unstable.
    if (verdicts[i] === NO && coefficients.some((column) => Number.isNaN(column[i])))
      verdicts[i] = UNDECIDED;
  }
  return verdicts;
}

function delayVerdicts(block: CompiledBlock, columns: Columns, count: number): Uint8Array {
  return Uint8Array.from({ length: count }, (_, i) => {
    const terms = block.map(({ coefficients, delay }) => ({
      coefficients: coefficients.map((k) => columns[k][i]),
      delay: columns[delay][i],
    }));
    const stable = isDelayStable(terms);
    return stable === null ? UNDECIDED : stable ? YES : NO;
  });
}

function stableVerdicts(block: CompiledBlock, columns: Columns, count: number): Uint8Array {
  if (block.length > 1) return delayVerdicts(block, columns, count);
  const [{ coefficients }] = block;
  return routhVerdicts(
    coefficients.map((k) => columns[k]),
    count,
  );
}

const conjoin = (a: number, b: number): number =>
  a === NO || b === NO ? NO : a === YES && b === YES ? YES : UNDECIDED;
const disjoin = (a: number, b: number): number =>
  a === YES || b === YES ? YES : a === NO && b === NO ? NO : UNDECIDED;

function joined(kind: 'all' | 'any', parts: readonly Uint8Array[]): Uint8Array {
  const join = kind === 'all' ? conjoin : disjoin;
  return parts.reduce((a, b) => a.map((verdict, i) => join(verdict, b[i])));
}

function evaluateNode(node: Compiled, columns: Columns, count: number): Uint8Array {
  switch (node.kind) {
    case 'constant':
      return new Uint8Array(count).fill(node.verdict);
    case 'compare':
      return compareVerdicts(node, columns, count);
    case 'stable':
      return joined(
        'all',
        node.blocks.map((block) => stableVerdicts(block, columns, count)),
      );
    case 'not':
      return evaluateNode(node.of, columns, count).map((v) => (v === UNDECIDED ? v : 1 - v));
    default:
      return joined(
        node.kind,
        node.of.map((part) => evaluateNode(part, columns, count)),
      );
  }
}

/**
 * Compiles conditions to one tape for evaluation over batches of points.
 *
 * Stability is judged by Routh's test on the coefficients of every block; leading coefficients that are exactly 0 are
 * dropped, so that stability is that of the equations as they are there. Blocks with dead time are judged for the dead
 * time itself, point by point, see `isDelayStable`; that takes about a hundred times as long.
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
