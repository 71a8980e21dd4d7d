import { refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import type { Matrix } from './matrix.ts';
import { matrixExponential } from './matrix-exponential.ts';

/** An input of a linear system, from t = 0 on: impulse size·δ(t), step, ramp size·t, parabola size·t²/2, sine size·sin(ωt). */
export type TestInput =
  | { readonly kind: 'impulse' | 'step' | 'ramp' | 'parabola'; readonly size: number }
  | { readonly kind: 'sine'; readonly size: number; readonly frequency: number };

/**
 * The response of a transfer function to an input, at the times start, start + dt, …, start + (count − 1) dt.
 *
 * Polynomials in s, highest power first; `frequency` is in rad/s. For the inverse Laplace transform of X(s), ask for
 * the response of X to a unit impulse. Refuses a ratio that is improper with this input (an impulse in the answer), a
 * zero denominator and coefficients that are not finite.
 *
 * The samples are C exp(A dt)^k B of the companion form, balanced; see `matrix-exponential.ts` for the exponential.
 * Cost: n² for each sample.
 */
export function timeResponse(
  numerator: readonly number[],
  denominator: readonly number[],
  input: TestInput,
  dt: number,
  count: number,
  start = 0,
): Float64Array | Refusal {
  const [above, below] = withInput(
    withoutLeadingZeros(numerator),
    withoutLeadingZeros(denominator),
    input,
  );
  if (!above.every(Number.isFinite) || !below.every(Number.isFinite)) {
    return refuse('not-finite', 'the transfer function has a coefficient that is not finite');
  }
  if (below.length === 0) return refuse('zero-denominator', 'the denominator is 0');
  if (above.length >= below.length) {
    return refuse('improper', `the response to ${articleOf(input.kind)} contains an impulse`);
  }
  return companionSamples(above, below, dt, count, start);
}

function articleOf(kind: TestInput['kind']): string {
  return `${kind === 'impulse' ? 'an' : 'a'} ${kind}`;
}

function withoutLeadingZeros(coefficients: readonly number[]): readonly number[] {
  const first = coefficients.findIndex((coefficient) => coefficient !== 0);
  return first < 0 ? [] : coefficients.slice(first);
}

/** Numerator and denominator of the transfer function times the transform of the input. */
function withInput(
  numerator: readonly number[],
  denominator: readonly number[],
  input: TestInput,
): [readonly number[], readonly number[]] {
  if (input.kind === 'sine') {
    const { size, frequency } = input;
    const squared = denominator.map((c) => c * frequency * frequency);
    const below = [...denominator, 0, 0].map((c, i) => c + (i < 2 ? 0 : squared[i - 2]!));
    return [numerator.map((c) => c * size * frequency), denominator.length === 0 ? [] : below];
  }
  const integrations = { impulse: 0, step: 1, ramp: 2, parabola: 3 }[input.kind];
  const zeros = denominator.length === 0 ? [] : new Array<number>(integrations).fill(0);
  return [numerator.map((c) => c * input.size), [...denominator, ...zeros]];
}

/**
 * Samples of the inverse transform of a strictly proper ratio. With the states scaled by powers of `unit` the companion
 * matrix is, for s³ + a₁ s² + a₂ s + a₃,
 *
 *     ⎡ −a₁   −a₂/u   −a₃/u² ⎤          ⎡ 1 ⎤
 *     ⎢  u      0       0    ⎥ ,  B  =  ⎢ 0 ⎥ ,  C = [c₁  c₂/u  c₃/u²]
 *     ⎣  0      u       0    ⎦          ⎣ 0 ⎦
 */
function companionSamples(
  numerator: readonly number[],
  denominator: readonly number[],
  dt: number,
  count: number,
  start: number,
): Float64Array {
  const size = denominator.length - 1;
  const lead = denominator[0]!;
  const unit = balancingUnit(denominator);
  const scaled = (c: number, k: number): number => c / lead / unit ** k;
  const over = (time: number): Matrix => {
    const data = new Float64Array(size * size);
    for (let k = 0; k < size; k++) {
      data[k] = -scaled(denominator[k + 1]!, k) * time;
      if (k > 0) data[k * size + k - 1] = unit * time;
    }
    return matrixExponential({ rows: size, columns: size, data });
  };
  const offset = size - numerator.length;
  const row = new Float64Array(size);
  numerator.forEach((c, k) => (row[offset + k] = scaled(c, offset + k)));
  return march(over(dt), row, firstColumn(over(start)), count);
}

/** M · (1, 0, …, 0)ᵀ. */
function firstColumn({ rows, data }: Matrix): Float64Array {
  return Float64Array.from({ length: rows }, (_, i) => data[i * rows]!);
}

/** A power of two near the mean magnitude of the roots that are not 0. */
function balancingUnit(denominator: readonly number[]): number {
  const last = denominator.findLastIndex((coefficient) => coefficient !== 0);
  if (last <= 0) return 1;
  const ratio = Math.log2(Math.abs(denominator[last]!)) - Math.log2(Math.abs(denominator[0]!));
  return 2 ** Math.round(ratio / last);
}

/** row · step^k · state for k = 0 … count − 1, in two vectors that take turns. */
function march(step: Matrix, row: Float64Array, state: Float64Array, count: number): Float64Array {
  const size = step.rows;
  const { data } = step;
  let next: Float64Array = new Float64Array(size);
  const samples = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    let sample = 0;
    for (let i = 0; i < size; i++) sample += row[i]! * state[i]!;
    samples[k] = sample;
    for (let i = 0; i < size; i++) {
      let sum = 0;
      for (let j = 0; j < size; j++) sum += data[i * size + j]! * state[j]!;
      next[i] = sum;
    }
    [state, next] = [next, state];
  }
  return samples;
}
