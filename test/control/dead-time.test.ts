import { describe, expect, test } from 'vitest';
import {
  compileConditions,
  finalValue,
  NO,
  stable,
  UNDECIDED,
  YES,
  type Condition,
} from '../../src/control/index.ts';
import { polynomialRoots, randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { polynomialOf, positive, read, signal } from './formulas.ts';
import { published } from './published-cases.ts';

const stability = (text: string): Condition =>
  stable([{ signals: ['x'], polynomial: polynomialOf(text) }]);

function verdict(condition: Condition, values: Readonly<Record<string, number>>): number {
  const { inputs, evaluate } = compileConditions([condition], () => 'input');
  return evaluate(
    inputs.map((name) => values[name]),
    1,
  )[0][0];
}

describe('stability with dead time', () => {
  test.each(published((c) => c.kind === 'delay_range'))('%s', (_, { given, expect: wanted }) => {
    const { pole, L } = given as unknown as { pole: number; L: number };
    const { lower, upper } = wanted as unknown as { lower: string; upper: number };
    const loop = stability(`s - ${pole} + k*exp(0-s*L)`);
    const at = (k: number): number => verdict(loop, { k, L });
    expect([at(Number(lower) * 0.999), at(Number(lower) * 1.001)]).toEqual([NO, YES]);
    expect([at(upper * 0.9998), at(upper * 1.0002)]).toEqual([YES, NO]);
  });

  test('of s + k e^(−s T) ends at k T = π/2 (R. Bellman, K. L. Cooke, Differential-Difference Equations, 1963; from memory)', () => {
    const loop = stability('s + k*exp(0-s*T)');
    for (const T of [0.01, 1, 300]) {
      const limit = Math.PI / 2 / T;
      expect(verdict(loop, { k: 0.9999 * limit, T })).toBe(YES);
      expect(verdict(loop, { k: 1.0001 * limit, T })).toBe(NO);
      expect(verdict(loop, { k: -0.1 * limit, T })).toBe(NO);
    }
  });

  test('agrees with the roots of a high-order approximant on random loops', () => {
    const random = seededRandom(21);
    const seen = { yes: 0, no: 0 };
    for (let round = 0; round < 200; round++) {
      const [a, b, k] = [
        randomInteger(random, 0, 6),
        randomInteger(random, -2, 8),
        randomInteger(random, 1, 12),
      ];
      const T = 0.05 + 1.5 * random();
      const rightmost = Math.max(...withApproximant([1, a, b], [k / 2, k], T).map((r) => r.re));
      if (Math.abs(rightmost) < 1e-3) continue;
      const loop = stability(
        `s^2 + (0 + ${a})*s + (0 + ${b}) + (${k / 2}*s + ${k})*exp(0-s*T)`.replaceAll('+ -', '- '),
      );
      const found = verdict(loop, { T });
      expect(found, `${a} ${b} ${k} ${T}`).toBe(rightmost < 0 ? YES : NO);
      seen[found === YES ? 'yes' : 'no'] += 1;
    }
    expect(seen.yes).toBeGreaterThan(30);
    expect(seen.no).toBeGreaterThan(30);
  });

  test('at zero dead time is that of the polynomial', () => {
    expect(verdict(stability('s^2 + s + 1 + k*exp(0-s*T)'), { k: 2, T: 0 })).toBe(YES);
    expect(verdict(stability('s^2 + s - 3 + k*exp(0-s*T)'), { k: 2, T: 0 })).toBe(NO);
  });

  test('of a neutral equation is decided inside its limit only', () => {
    const loop = stability('s + 1 + (c*s + 1/2)*exp(0-s*T)');
    expect(verdict(loop, { c: 0.4, T: 1 })).toBe(YES);
    expect(verdict(loop, { c: 1.4, T: 1 })).toBe(UNDECIDED);
  });

  test('of an equation that needs the future is not given', () => {
    expect(verdict(stability('1 + s*exp(0-s*T)'), { T: 1 })).toBe(NO);
  });

  test('with several dead times counts each of them', () => {
    const loop = stability('s + k*exp(0-s*T) + k*exp(0-2*s*T)');
    expect(verdict(loop, { k: 0.1, T: 1 })).toBe(YES);
    expect(verdict(loop, { k: 2, T: 1 })).toBe(NO);
  });

  test('is the condition of a final value in a loop with dead time', () => {
    const polynomial = polynomialOf('s + 1 + K*exp(0-s*T)');
    const x = signal(
      [{ transform: read('1/(s*(s + 1 + K*exp(0-s*T)))') }],
      [{ signals: ['y'], polynomial }],
    );
    const value = finalValue(x, positive);
    expect(value).toMatchObject({ kind: 'formula', ratio: read('1/(1 + K)') });
    expect(verdict(value.when, { K: 2, T: 0.5 })).toBe(YES);
    expect(verdict(value.when, { K: 20, T: 0.5 })).toBe(NO);
  });
});

/** Roots of d + n e^(−s T) with the diagonal Padé approximant of order 8 in place of the dead time. */
function withApproximant(d: readonly number[], n: readonly number[], T: number) {
  const order = 8;
  const coefficients: number[] = [];
  let c = 1;
  for (let k = 0; k <= order; k++) {
    coefficients.push(c * T ** k);
    c *= (order - k) / ((2 * order - k) * (k + 1));
  }
  const below = [...coefficients].reverse();
  const above = coefficients.map((x, k) => (k % 2 === 0 ? x : -x)).reverse();
  const times = (a: readonly number[], b: readonly number[]): number[] => {
    const product = Array<number>(a.length + b.length - 1).fill(0);
    a.forEach((x, i) => b.forEach((y, k) => (product[i + k] += x * y)));
    return product;
  };
  const [left, right] = [times(d, below), times(n, above)];
  return polynomialRoots(left.map((x, i) => x + (right[i - (left.length - right.length)] ?? 0)));
}
