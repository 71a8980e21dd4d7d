import { describe, expect, it } from 'vitest';
import {
  randomInteger,
  randomNormal,
  seededRandom,
  solveOde,
  timeResponse,
} from '../../src/numeric/index.ts';
import type { TestInput } from '../../src/numeric/index.ts';
import { answer } from './answer.ts';
import { product, withRoots } from './polynomials.ts';

const a = 0.7;
const b = 1.9;
const TABLE =
  'M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions, 1964, table 29.3, entry';
const unitImpulse: TestInput = { kind: 'impulse', size: 1 };

function expectResponse(
  [numerator, denominator]: readonly [readonly number[], readonly number[]],
  input: TestInput,
  closed: (t: number) => number,
): void {
  const dt = 0.05;
  const samples = answer(timeResponse(numerator, denominator, input, dt, 400));
  const size = Math.max(...samples.map(Math.abs));
  samples.forEach((sample, k) => {
    expect(Math.abs(sample - closed(k * dt)), `at t = ${k * dt}`).toBeLessThan(1e-9 * size);
  });
}

describe('the inverse transform by samples', () => {
  const square = [1, 0, a * a];
  it.each([
    ['29.3.8', [1], [1, a], (t: number) => Math.exp(-a * t)],
    ['29.3.15', [1], square, (t: number) => Math.sin(a * t) / a],
    ['29.3.19', [1], [...square, 0], (t: number) => (1 - Math.cos(a * t)) / a ** 2],
    [
      '29.3.21',
      [1],
      product(square, square),
      (t: number) => (Math.sin(a * t) - a * t * Math.cos(a * t)) / (2 * a ** 3),
    ],
    ['29.3.22', [1, 0], product(square, square), (t: number) => (t * Math.sin(a * t)) / (2 * a)],
    [
      '29.3.26',
      [1],
      [1, 2 * a, a * a + b * b],
      (t: number) => (Math.exp(-a * t) * Math.sin(b * t)) / b,
    ],
    [
      '29.3.10, n = 3',
      [1],
      [1, 3 * a, 3 * a * a, a ** 3],
      (t: number) => (t * t * Math.exp(-a * t)) / 2,
    ],
    [
      '29.3.12',
      [1],
      product([1, a], [1, b]),
      (t: number) => (Math.exp(-a * t) - Math.exp(-b * t)) / (b - a),
    ],
  ])(
    `agrees with ${TABLE} %s (from memory, confirmed by recomputation)`,
    (_, above, below, closed) => {
      expectResponse([above, below], unitImpulse, closed);
    },
  );
});

describe('the response to a test input', () => {
  it('of (s + 1)/(s² + s + 1) to a step is its closed form (A&S 29.3.26 and 29.3.27; recomputed)', () => {
    const damped = Math.sqrt(3) / 2;
    expectResponse(
      [
        [1, 1],
        [1, 1, 1],
      ],
      { kind: 'step', size: 1 },
      (t) => {
        const wave = Math.cos(damped * t) - Math.sin(damped * t) / (2 * damped);
        return 1 - Math.exp(-t / 2) * wave;
      },
    );
  });

  it('of a lag to a ramp, a parabola and a sine is what integration by hand gives', () => {
    const lag = [[1], [2, 1]] as const;
    const decay = (t: number): number => Math.exp(-t / 2);
    expectResponse(lag, { kind: 'ramp', size: 3 }, (t) => 3 * (t - 2 * (1 - decay(t))));
    expectResponse(
      lag,
      { kind: 'parabola', size: 1 },
      (t) => (t * t) / 2 - 2 * t + 4 * (1 - decay(t)),
    );
    expectResponse(lag, { kind: 'sine', size: 5, frequency: 3 }, (t) => {
      const steady = Math.sin(3 * t) - 6 * Math.cos(3 * t);
      return (5 * (steady + 6 * decay(t))) / 37;
    });
  });

  it('passes a direct path straight on', () => {
    expectResponse(
      [
        [2, 1],
        [1, 1],
      ],
      { kind: 'step', size: 1 },
      (t) => 1 + Math.exp(-t),
    );
    expect(answer(timeResponse([4], [2], { kind: 'step', size: 1 }, 1, 3))).toEqual(
      Float64Array.of(2, 2, 2),
    );
  });

  it('is exact to 1e-9 where modes differ by 10⁴', () => {
    const fast = 1e4;
    expectResponse([[fast], product([1, 1], [1, fast])], unitImpulse, (t) => {
      return (fast * (Math.exp(-t) - Math.exp(-fast * t))) / (fast - 1);
    });
  });

  it('grows where the system is unstable', () => {
    expectResponse([[1], [1, -0.5]], unitImpulse, (t) => Math.exp(t / 2));
  });

  it('agrees with an integration of the differential equation on random systems', () => {
    const random = seededRandom(51);
    for (let trial = 0; trial < 20; trial++) {
      const roots = Array.from({ length: randomInteger(random, 1, 3) }, () => ({
        re: -Math.abs(randomNormal(random)),
        im: random() < 0.5 ? 0 : 2 * randomNormal(random),
      }));
      const below = withRoots(roots);
      const above = Array.from({ length: below.length - 1 }, () => randomNormal(random));
      const samples = answer(timeResponse(above, below, { kind: 'step', size: 1 }, 0.5, 12));
      const integrated = stepByIntegration(above, below, 0.5, 12);
      samples.forEach((sample, k) => {
        expect(Math.abs(sample - integrated[k]!), `seed 51, trial ${trial}`).toBeLessThan(1e-7);
      });
    }
  });
});

describe('a refused response', () => {
  it.each([
    [[1, 0], [1, 1], 'the response to an impulse contains an impulse'],
    [[1], [0, 0], 'the denominator is 0'],
    [[NaN], [1, 1], 'the transfer function has a coefficient that is not finite'],
  ])('of %j over %j says why', (above, below, reason) => {
    expect(timeResponse(above, below, unitImpulse, 1, 2)).toMatchObject({ reason });
  });

  it('is not refused where leading zeros only look improper', () => {
    expect(answer(timeResponse([0, 0, 1], [0, 1, 1], unitImpulse, 1, 1))).toEqual(
      Float64Array.of(1),
    );
    expect(answer(timeResponse([0], [1, 1], unitImpulse, 1, 2))).toEqual(Float64Array.of(0, 0));
  });
});

/** The step response in controllable form, x₁' = u − a₁x₁ − …, x₂' = x₁, …, by an independent integrator. */
function stepByIntegration(
  above: readonly number[],
  below: readonly number[],
  dt: number,
  count: number,
): number[] {
  const size = below.length - 1;
  const times = Array.from({ length: count }, (_, k) => k * dt);
  const slope = (_: number, x: Float64Array, dx: Float64Array): void => {
    dx[0] = 1 - x.reduce((sum, value, k) => sum + below[k + 1]! * value, 0);
    for (let k = 1; k < size; k++) dx[k] = x[k - 1]!;
  };
  const states = answer(solveOde(slope, new Float64Array(size), times));
  return states.map((x) => x.reduce((sum, value, k) => sum + above[k]! * value, 0));
}
