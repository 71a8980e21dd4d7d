import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  compareRational,
  countRealRoots,
  isolateRealRoots,
  rational,
  refineRoot,
  rootsToNumbers,
  subRational,
} from '../../src/algebra/index.ts';
import { readPolynomial } from './text.ts';

function multiply(a: readonly bigint[], b: readonly bigint[]): bigint[] {
  const product = new Array<bigint>(a.length + b.length - 1).fill(0n);
  a.forEach((x, i) => b.forEach((y, k) => (product[i + k] += x * y)));
  return product;
}

const RUNS = { seed: 20_250, numRuns: 60 };

describe('real roots', () => {
  it('are the rational roots that a polynomial was made of, with their multiplicity', () => {
    const root = fc.record({
      n: fc.integer({ min: -40, max: 40 }),
      d: fc.integer({ min: 1, max: 7 }),
      times: fc.integer({ min: 1, max: 3 }),
    });
    fc.assert(
      fc.property(fc.array(root, { minLength: 1, maxLength: 4 }), fc.nat(2), (roots, pairs) => {
        let p: bigint[] = [-3n];
        const expected = new Map<number, number>();
        for (const { n, d, times } of roots) {
          for (let k = 0; k < times; k += 1) p = multiply(p, [BigInt(-n), BigInt(d)]);
          expected.set(n / d + 0, (expected.get(n / d + 0) ?? 0) + times);
        }
        for (let k = 0; k < pairs; k += 1) p = multiply(p, [BigInt(k + 2), 1n, 1n]);
        const sorted = [...expected.entries()].sort((x, y) => x[0] - y[0]);
        expect(rootsToNumbers(p)).toEqual(sorted.map(([x]) => x));
        expect(isolateRealRoots(p).map(({ multiplicity }) => multiplicity)).toEqual(
          sorted.map(([, times]) => times),
        );
        expect(countRealRoots(p)).toBe(sorted.length);
      }),
      RUNS,
    );
  });

  it('are counted in half-open intervals (from, to]', () => {
    const p = [6n, -5n, 1n]; // roots 2 and 3
    expect(countRealRoots(p, rational(2), rational(3))).toBe(1);
    expect(countRealRoots(p, rational(1), rational(2))).toBe(1);
    expect(countRealRoots(p, rational(3), rational(9))).toBe(0);
    expect(countRealRoots(p, undefined, rational(5, 2))).toBe(1);
    expect(countRealRoots(p, rational(5, 2))).toBe(1);
  });

  it('of Wilkinson’s polynomial of degree 20 are 1 … 20 (J. H. Wilkinson, Rounding Errors in Algebraic Processes, 1963)', () => {
    let p: bigint[] = [1n];
    for (let k = 1n; k <= 20n; k += 1n) p = multiply(p, [-k, 1n]);
    expect(rootsToNumbers(p)).toEqual(Array.from({ length: 20 }, (_, k) => k + 1));
  });

  it('of the Legendre polynomial P5 are the tabulated abscissas (Abramowitz and Stegun 1964, table 25.4; from memory)', () => {
    const roots = rootsToNumbers(readPolynomial('63*s^5 - 70*s^3 + 15*s'));
    const tabulated = [
      -0.906179845938664, -0.538469310105683, 0, 0.538469310105683, 0.906179845938664,
    ];
    roots.forEach((root, k) => expect(root).toBeCloseTo(tabulated[k], 14));
    expect(roots.length).toBe(5);
  });

  it('of Chebyshev polynomials are cosines, to the last bits', () => {
    let [before, p]: bigint[][] = [[1n], [0n, 1n]];
    for (let n = 2; n <= 12; n += 1) {
      const next = multiply([0n, 2n], p);
      before.forEach((c, k) => (next[k] -= c));
      [before, p] = [p, next];
    }
    rootsToNumbers(p).forEach((root, k) => {
      expect(root).toBeCloseTo(-Math.cos(((2 * k + 1) * Math.PI) / 24), 15);
    });
  });

  it('are told apart when close together (M. Mignotte’s polynomial x^9 − 2 (1000 x − 1)²)', () => {
    const p = multiply([-1n, 1000n], [-2n, 2000n]).map((c) => -c);
    const mignotte = Array.from({ length: 10 }, (_, k) => (k === 9 ? 1n : (p[k] ?? 0n)));
    const intervals = isolateRealRoots(mignotte);
    expect(intervals.length).toBe(3);
    expect(compareRational(intervals[0].high, intervals[1].low)).toBeLessThanOrEqual(0);
    expect(rootsToNumbers(mignotte)[1]).toBeCloseTo(1e-3, 12);
  });

  it('are refined to any width', () => {
    const [, root] = isolateRealRoots([-2n, 0n, 1n]);
    const narrow = refineRoot([-2n, 0n, 1n], root, rational(1n, 10n ** 40n));
    const width = subRational(narrow.high, narrow.low);
    expect(compareRational(width, rational(1n, 10n ** 40n))).toBeLessThanOrEqual(0);
    expect(narrow.low.n ** 2n < 2n * narrow.low.d ** 2n).toBe(true);
    expect(narrow.high.n ** 2n > 2n * narrow.high.d ** 2n).toBe(true);
  });

  it('scale by 10^±9 and beyond', () => {
    expect(rootsToNumbers([-1n, 10n ** 9n])).toEqual([1e-9]);
    expect(rootsToNumbers([-(10n ** 30n), 0n, 1n])).toEqual([-1e15, 1e15]);
    expect(rootsToNumbers([-1n, 10n ** 200n])).toEqual([1e-200]);
  });

  it('do not exist for numbers and for definite polynomials', () => {
    expect(rootsToNumbers([7n])).toEqual([]);
    expect(rootsToNumbers([1n, 0n, 1n])).toEqual([]);
    expect(countRealRoots([1n, 0n, 1n, 0n, 0n])).toBe(0);
  });
});
