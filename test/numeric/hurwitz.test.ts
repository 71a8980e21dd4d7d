import { describe, expect, it } from 'vitest';
import {
  hurwitzVerdicts,
  isHurwitz,
  polynomialRoots,
  randomInteger,
  randomNormal,
  seededRandom,
} from '../../src/numeric/index.ts';
import counts from '../data/root-counts.json' with { type: 'json' };
import { integerPolynomial, withRoots } from './polynomials.ts';

function isStable(coefficients: readonly number[]): boolean {
  return isHurwitz(Float64Array.from(coefficients), 0, coefficients.length - 1);
}

describe('the Routh test on numbers', () => {
  it.each(counts)('agrees with the published count for $poly ($source; $how)', (published) => {
    expect(isStable(published.poly)).toBe(published.rhp === 0 && published.jw === 0);
  });

  it.each([
    [[3], true],
    [[0], false],
    [[], false],
    [[0, 0, 2, 6], true],
    [[-1, -6, -11, -6], true],
    [[1, -6, 11, -6], false],
    [[1, 0, 4], false],
    [[1, 3, 30, 30, 200], false],
    [[1, 0.4, 0.3, 0.12], false],
    [[1, 2, 3, 0], false],
    [[1, NaN, 1], false],
    [[NaN], false],
    [[1e300, 3e300, 2e300], true],
    [[1e-300, 3e-300, 2e-300], true],
  ])('of %j says stable: %s', (coefficients, expected) => {
    expect(isStable(coefficients)).toBe(expected);
  });

  it('agrees with the roots on thousands of random polynomials', () => {
    const random = seededRandom(21);
    for (let trial = 0; trial < 4000; trial++) {
      const coefficients = integerPolynomial(random, randomInteger(random, 1, 6)).map(Math.abs);
      const rightmost = Math.max(...polynomialRoots(coefficients).map((root) => root.re));
      if (Math.abs(rightmost) < 1e-7) continue;
      expect(isStable(coefficients), `seed 21, trial ${trial}: ${coefficients}`).toBe(
        rightmost < 0,
      );
    }
  });

  it('agrees with roots chosen at random on both sides of the axis', () => {
    const random = seededRandom(22);
    for (let trial = 0; trial < 2000; trial++) {
      const shift = random() < 0.5 ? 0 : 1;
      const roots = Array.from({ length: randomInteger(random, 1, 4) }, () => ({
        re: -Math.abs(randomNormal(random)) - 0.01,
        im: random() < 0.5 ? 0 : 3 * randomNormal(random),
      }));
      roots[0] = { ...roots[0]!, re: (1 - 2 * shift) * roots[0]!.re };
      expect(isStable(withRoots(roots)), `seed 22, trial ${trial}`).toBe(shift === 0);
    }
  });

  it('gives the same verdicts over a batch, with shared coefficients as numbers', () => {
    const random = seededRandom(23);
    const count = 500;
    const columns = Array.from({ length: 4 }, () => Float64Array.from({ length: count }, random));
    const verdicts = hurwitzVerdicts([1, ...columns], count);
    for (let i = 0; i < count; i++) {
      expect(verdicts[i]).toBe(isStable([1, ...columns.map((column) => column[i]!)]) ? 1 : 0);
    }
    expect(new Set(verdicts)).toEqual(new Set([0, 1]));
  });

  it('reads its polynomial from an offset', () => {
    expect(isHurwitz(Float64Array.of(9, 9, 1, 3, 2, -9), 2, 2)).toBe(true);
  });
});
