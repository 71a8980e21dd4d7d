import { describe, expect, it } from 'vitest';
import { integrate, solveOde } from '../../src/numeric/index.ts';
import { answer } from './answer.ts';

describe('the solution of a differential equation', () => {
  it('follows the swing of y″ = −y, between its steps too', () => {
    const times = Array.from({ length: 200 }, (_, k) => 0.1 * k);
    const states = answer(
      solveOde(
        (_, y, slope) => {
          slope[0] = y[1]!;
          slope[1] = -y[0]!;
        },
        [1, 0],
        times,
      ),
    );
    states.forEach((y, k) => expect(Math.abs(y[0]! - Math.cos(times[k]!))).toBeLessThan(1e-8));
  });

  it('of a freely turning rigid body is the elliptic functions sn, cn, dn of modulus² 0.51, periodic with 4 K(0.51) (T. E. Hull et al., Comparing numerical methods for ordinary differential equations, SIAM J. Numer. Anal. 9, 1972, problem B5; from memory)', () => {
    const quarter = Math.PI / (2 * arithmeticGeometricMean(1, Math.sqrt(1 - 0.51)));
    const [start, atQuarter, atPeriod] = answer(
      solveOde(rigidBody, [0, 1, 1], [0, quarter, 4 * quarter], {
        relative: 1e-12,
        absolute: 1e-12,
      }),
    );
    [1, 0, 0.7].forEach((value, i) => expect(Math.abs(atQuarter![i]! - value)).toBeLessThan(1e-10));
    start!.forEach((value, i) => expect(Math.abs(atPeriod![i]! - value)).toBeLessThan(1e-10));
  });

  it('is refused at a pole, and when its steps run out', () => {
    const pole = solveOde((_, y, slope) => (slope[0] = y[0]! ** 2), [1], [0, 2], { steps: 5000 });
    expect(pole).toMatchObject({ code: 'integration-failed' });
    const short = solveOde((t, _, slope) => (slope[0] = Math.cos(t)), [0], [0, 1e6], { steps: 10 });
    expect(short).toMatchObject({ code: 'integration-failed' });
  });

  it('at its first time is its start', () => {
    expect(answer(solveOde((_, y, slope) => (slope[0] = y[0]!), [2], [5]))).toEqual([
      Float64Array.of(2),
    ]);
  });
});

/** Euler's equations of a rigid body in scaled form. */
function rigidBody(_: number, y: Float64Array, slope: Float64Array): void {
  slope[0] = y[1]! * y[2]!;
  slope[1] = -y[0]! * y[2]!;
  slope[2] = -0.51 * y[0]! * y[1]!;
}

function arithmeticGeometricMean(a: number, b: number): number {
  for (let round = 0; round < 8; round++) [a, b] = [(a + b) / 2, Math.sqrt(a * b)];
  return a;
}

describe('an integral', () => {
  // I. S. Gradshteyn, I. M. Ryzhik, Table of Integrals, Series, and Products; elementary, checked by hand.
  it.each([
    ['x^7', (x: number) => x ** 7, 0, 2, 32],
    ['√x', Math.sqrt, 0, 1, 2 / 3],
    ['−log x', (x: number) => -Math.log(x), 0, 1, 1],
    ['exp(−x²)', (x: number) => Math.exp(-x * x), -Infinity, Infinity, Math.sqrt(Math.PI)],
    ['1/(1 + x²)', (x: number) => 1 / (1 + x * x), 0, Infinity, Math.PI / 2],
    ['1/(1 + x²) up to −1', (x: number) => 1 / (1 + x * x), -Infinity, -1, Math.PI / 4],
    [
      'a narrow resonance',
      (x: number) => 1 / ((1 - x * x) ** 2 + (1e-3 * x) ** 2),
      0,
      Infinity,
      Math.PI / 2 / 1e-3,
    ],
    ['cos from 3 back to 0', Math.cos, 3, 0, -Math.sin(3)],
  ])('of %s is its closed form', (_, integrand, from, to, expected) => {
    const { value, error } = answer(integrate(integrand, from, to));
    expect(Math.abs(value - expected)).toBeLessThanOrEqual(
      Math.max(error, 1e-12 * Math.abs(expected)),
    );
    expect(error).toBeLessThanOrEqual(1e-10 * Math.abs(value));
  });

  it('is refused where it diverges or meets a value that is not finite', () => {
    expect(integrate((x) => 1 / x, 0, 1)).toMatchObject({ code: 'integral-unsettled' });
    expect(integrate(() => NaN, 0, 1)).toMatchObject({ code: 'integral-unsettled' });
  });

  it('of zero is zero', () => {
    expect(answer(integrate(() => 0, 0, Infinity))).toEqual({ value: 0, error: 0 });
  });
});
