import { refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';

/** The right side of y' = f(t, y): writes the derivative of `y` at `t` into `slope`. */
export type RightSide = (t: number, y: Float64Array, slope: Float64Array) => void;

/** Tolerances of a solution; a component's local error is kept below absolute + relative·|y|. */
export interface OdeTolerance {
  readonly relative?: number;
  readonly absolute?: number;
  /** Steps after which it gives up. */
  readonly steps?: number;
}

/** Nodes, weights and error weights of the Dormand–Prince pair: Hairer, Nørsett, Wanner, table II.5.2. */
const NODES = [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1];
const STAGES = [
  [],
  [1 / 5],
  [3 / 40, 9 / 40],
  [44 / 45, -56 / 15, 32 / 9],
  [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
  [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
];
const ERROR = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40];
/** Weights of the correction in the continuous solution: Hairer, Nørsett, Wanner, II.6, program DOPRI5. */
const DENSE = [
  -12715105075 / 11282082432,
  0,
  87487479700 / 32700410799,
  -10690763975 / 1880347072,
  701980252875 / 199316789632,
  -1453857185 / 822651844,
  69997945 / 29380423,
];

/**
 * The solution of an initial value problem at rising times, the first of which is where `start` holds; one array of
 * the state for each time.
 *
 * Refuses when the steps run out or become too small, as at a pole of the solution. Cost: six evaluations a step.
 *
 * Source: J. R. Dormand, P. J. Prince, A family of embedded Runge–Kutta formulae, Journal of Computational and Applied
 * Mathematics 6 (1980), 19–26; step control and continuous solution after E. Hairer, S. P. Nørsett, G. Wanner, Solving
 * Ordinary Differential Equations I, 2nd ed., 1993, sections II.4 to II.6.
 */
export function solveOde(
  rightSide: RightSide,
  start: ArrayLike<number>,
  times: readonly number[],
  tolerance: OdeTolerance = {},
): Float64Array[] | Refusal {
  const run = new DormandPrince(rightSide, Float64Array.from(start), times[0]!, tolerance);
  const states: Float64Array[] = [];
  for (const time of times) {
    while (run.time < time) {
      const problem = run.advance(times.at(-1)!);
      if (problem) return problem;
    }
    states.push(run.stateAt(time));
  }
  return states;
}

/** One integration in progress; `advance` takes one accepted step. */
class DormandPrince {
  private readonly slopes: Float64Array[];
  private before: Float64Array;
  private next: Float64Array;
  private step = 0;
  private lastStep = 0;
  private left: number;

  constructor(
    private readonly rightSide: RightSide,
    private state: Float64Array,
    public time: number,
    private readonly tolerance: OdeTolerance,
  ) {
    this.slopes = STAGES.map(() => new Float64Array(state.length));
    this.before = state.slice();
    this.next = state.slice();
    this.left = tolerance.steps ?? 100_000;
    rightSide(time, state, this.slopes[0]!);
  }

  advance(end: number): Refusal | null {
    if (this.step === 0) this.step = this.firstStep(end);
    // The slope at the end of the last step is the first of this one; the last step keeps its slopes for `stateAt`.
    if (this.lastStep > 0) this.slopes[0]!.set(this.slopes[6]!);
    for (;;) {
      if (this.left-- === 0) return this.giveUp('more steps than allowed');
      const isTooSmall =
        this.step <= 4 * Number.EPSILON * Math.max(Math.abs(this.time), Number.MIN_VALUE);
      if (isTooSmall || Number.isNaN(this.step)) return this.giveUp('steps that are too small');
      const error = this.trial();
      const growth = Math.min(5, Math.max(0.2, 0.9 * error ** -0.2));
      const tried = this.step;
      this.step *= Number.isNaN(error) ? 0.2 : growth;
      if (error <= 1) {
        this.accept(tried);
        return null;
      }
    }
  }

  /** The state at a time within the last step, by the continuous solution of order four. */
  stateAt(time: number): Float64Array {
    if (this.lastStep === 0) return this.state.slice();
    const h = this.lastStep;
    const theta = 1 - (this.time - time) / h;
    return this.state.map((end, i) => {
      const start = this.before[i]!;
      const change = end - start;
      const bend = h * this.slopes[0]![i]! - change;
      const twist = change - h * this.slopes[6]![i]! - bend;
      const rest = h * weighted(this.slopes, DENSE, i);
      const inner = bend + theta * (twist + (1 - theta) * rest);
      return start + theta * (change + (1 - theta) * inner);
    });
  }

  /** Fills slopes and the next state; the error of the step, 1 being the tolerance. */
  private trial(): number {
    for (let stage = 1; stage < STAGES.length; stage++) {
      for (let i = 0; i < this.state.length; i++) {
        const rise = weighted(this.slopes, STAGES[stage]!, i);
        this.next[i] = this.state[i]! + this.step * rise;
      }
      this.rightSide(this.time + NODES[stage]! * this.step, this.next, this.slopes[stage]!);
    }
    const squares = this.state.map((value, i) => {
      const size = Math.max(Math.abs(value), Math.abs(this.next[i]!));
      return ((this.step * weighted(this.slopes, ERROR, i)) / this.allowed(size)) ** 2;
    });
    return Math.sqrt(squares.reduce((sum, square) => sum + square, 0) / squares.length);
  }

  private allowed(size: number): number {
    return (this.tolerance.absolute ?? 1e-12) + (this.tolerance.relative ?? 1e-10) * size;
  }

  private accept(taken: number): void {
    [this.before, this.state, this.next] = [this.state, this.next, this.before];
    this.time += taken;
    this.lastStep = taken;
  }

  /** A hundredth of the time in which the solution changes by its own size, or of the whole time. */
  private firstStep(end: number): number {
    const size = Math.hypot(...this.state);
    const rate = Math.hypot(...this.slopes[0]!);
    const span = (end - this.time) / 100;
    return size > 0 && rate > 0 ? Math.min(span, (0.01 * size) / rate) : span * 1e-3;
  }

  private giveUp(why: string): Refusal {
    return refuse('integration-failed', `the integration needs ${why} at t = ${this.time}`);
  }
}

function weighted(slopes: readonly Float64Array[], weights: readonly number[], i: number): number {
  let sum = 0;
  for (let k = 0; k < weights.length; k++) sum += weights[k]! * slopes[k]![i]!;
  return sum;
}
