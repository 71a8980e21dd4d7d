import { invariant } from '../base/index.ts';
import { operate, operateArrays } from './tape-operations.ts';
import { argumentsOf } from './tape-step.ts';
import type { ExternalFunction, TapeStep } from './tape-step.ts';

/** An input of a batch: one number for all points, or one for each. */
export type BatchInput = number | Float64Array;

/** Points worked on at a time, so that the arrays in use stay in the processor's first cache. */
const BLOCK = 512;

/**
 * A formula compiled to a flat list of operations on numbers, evaluated at one point or over a batch of points, step
 * by step over typed arrays. What is the same for all points of a batch is computed once. Built by `TapeBuilder`.
 */
export class Tape {
  constructor(
    /** Names of the inputs, in the order in which they are passed. */
    readonly inputs: readonly string[],
    private readonly steps: readonly TapeStep[],
    private readonly outputs: readonly number[],
  ) {}

  /** Number of operations, for budgets and benchmarks. */
  get length(): number {
    return this.steps.length;
  }

  /** The outputs at one point; `values` in the order of {@link inputs}. */
  evaluate(values: ArrayLike<number>): Float64Array {
    invariant(
      values.length >= this.inputs.length,
      `a tape of ${this.inputs.length} inputs got ${values.length}`,
    );
    const slots = new Float64Array(this.steps.length);
    this.steps.forEach((step, i) => {
      if (step.kind === 'input') slots[i] = values[step.index]!;
      else slots[i] = stepValue(step, (slot) => slots[slot]!);
    });
    return Float64Array.from(this.outputs, (slot) => slots[slot]!);
  }

  /**
   * The outputs at `count` points, one array for each output; inputs in the order of {@link inputs}, arrays of at
   * least `count` elements. Cost: one pass over the points for each operation that differs between them.
   */
  evaluateBatch(values: readonly BatchInput[], count: number): Float64Array[] {
    invariant(
      values.length >= this.inputs.length,
      `a tape of ${this.inputs.length} inputs got ${values.length}`,
    );
    const plan = planBatch(this.steps, values, this.outputs);
    const results = this.outputs.map((slot) => {
      const uniform = plan.uniform[slot];
      return uniform === null ? new Float64Array(count) : new Float64Array(count).fill(uniform!);
    });
    for (let from = 0; from < count; from += BLOCK) {
      const size = Math.min(BLOCK, count - from);
      for (const run of plan.runs) runStep(run, values, from, size);
      this.outputs.forEach((slot, k) => {
        if (plan.uniform[slot] !== null) return;
        results[k]!.set(plan.registers[slot]!.subarray(0, size), from);
      });
    }
    return results;
  }
}

/** The value of a step that is not an input, from those of its arguments. */
function stepValue(
  step: Exclude<TapeStep, { kind: 'input' }>,
  valueOf: (slot: number) => number,
): number {
  if (step.kind === 'constant') return step.value;
  if (step.kind === 'external') return step.find(Float64Array.from(step.slots, valueOf));
  return operate(step.name, valueOf(step.a), step.b < 0 ? 0 : valueOf(step.b));
}

/** A step that differs between the points, with the arrays of its arguments and the one that it fills. */
interface Run {
  readonly step: TapeStep;
  readonly args: readonly Float64Array[];
  readonly target: Float64Array;
}

interface BatchPlan {
  /** The value of each step that is the same for all points; null for the others. */
  readonly uniform: readonly (number | null)[];
  /** The array of each step; arrays are shared by steps that are never needed at the same time. */
  readonly registers: readonly Float64Array[];
  readonly runs: readonly Run[];
}

function planBatch(
  steps: readonly TapeStep[],
  values: readonly BatchInput[],
  outputs: readonly number[],
): BatchPlan {
  const uniform = uniformValues(steps, values);
  const lastUse = lastUses(steps, outputs);
  const registers: Float64Array[] = [];
  const free: Float64Array[] = [];
  const runs: Run[] = [];
  steps.forEach((step, i) => {
    const value = uniform[i]!;
    if (value !== null) {
      registers.push(new Float64Array(BLOCK).fill(value));
      return;
    }
    const slots = argumentsOf(step);
    for (const slot of new Set(slots)) {
      if (lastUse[slot] === i && uniform[slot] === null) free.push(registers[slot]!);
    }
    const target = free.pop() ?? new Float64Array(BLOCK);
    registers.push(target);
    runs.push({ step, args: slots.map((slot) => registers[slot]!), target });
  });
  return { uniform, registers, runs };
}

function uniformValues(
  steps: readonly TapeStep[],
  values: readonly BatchInput[],
): (number | null)[] {
  const uniform: (number | null)[] = [];
  for (const step of steps) {
    if (step.kind === 'input') {
      const value = values[step.index]!;
      uniform.push(typeof value === 'number' ? value : null);
    } else {
      const isUniform = argumentsOf(step).every((slot) => uniform[slot] !== null);
      uniform.push(isUniform ? stepValue(step, (slot) => uniform[slot]!) : null);
    }
  }
  return uniform;
}

/** The step that last needs each step's array; outputs are needed to the end. */
function lastUses(steps: readonly TapeStep[], outputs: readonly number[]): number[] {
  const last = steps.map((_, i) => i);
  steps.forEach((step, i) => {
    for (const slot of argumentsOf(step)) last[slot] = i;
  });
  for (const slot of outputs) last[slot] = Infinity;
  return last;
}

function runStep(run: Run, values: readonly BatchInput[], from: number, size: number): void {
  const { step, args, target } = run;
  if (step.kind === 'operation') operateArrays(step.name, args[0], args[1] ?? target, target, size);
  else if (step.kind === 'external') findEach(step.find, args, target, size);
  else if (step.kind === 'input') {
    target.set((values[step.index] as Float64Array).subarray(from, from + size));
  }
}

/** `target` may be one of the arguments: each point reads only its own place. */
function findEach(
  find: ExternalFunction,
  args: readonly Float64Array[],
  target: Float64Array,
  size: number,
): void {
  const values = new Float64Array(args.length);
  for (let i = 0; i < size; i++) {
    for (let k = 0; k < args.length; k++) values[k] = args[k]![i]!;
    target[i] = find(values);
  }
}
