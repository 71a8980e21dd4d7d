import { describe, expect, it } from 'vitest';
import {
  latinHypercube,
  randomInteger,
  randomNormal,
  seededRandom,
} from '../../src/numeric/index.ts';
import type { RandomSource } from '../../src/numeric/index.ts';

function draws(random: RandomSource, count: number): number[] {
  return Array.from({ length: count }, random);
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

describe('a seeded source', () => {
  it('repeats itself with the same seed and differs with another', () => {
    expect(draws(seededRandom(5), 20)).toEqual(draws(seededRandom(5), 20));
    expect(draws(seededRandom(5), 20)).not.toEqual(draws(seededRandom(6), 20));
  });

  it('fills [0, 1) evenly: χ² of 100 cells stays below its 99.9 % point, 148.2 (common tables; from memory)', () => {
    for (const seed of [0, 1, 2]) {
      const cells = new Array<number>(100).fill(0);
      for (const value of draws(seededRandom(seed), 100_000)) cells[Math.floor(value * 100)]! += 1;
      const deviation = cells.reduce((sum, n) => sum + (n - 1000) ** 2 / 1000, 0);
      expect(deviation).toBeLessThan(148.2);
      expect(deviation).toBeGreaterThan(60);
    }
  });

  it('has no correlation between neighbours', () => {
    const values = draws(seededRandom(7), 100_000).map((value) => value - 0.5);
    const products = values.slice(1).map((value, i) => value * values[i]!);
    expect(Math.abs(mean(products)) * 12).toBeLessThan(4 / Math.sqrt(100_000));
  });

  it('gives integers in their range and normal numbers with mean 0, variance 1 and fourth moment 3', () => {
    const random = seededRandom(8);
    const integers = draws(() => randomInteger(random, -2, 2), 2000);
    expect([...new Set(integers)].sort((a, b) => a - b)).toEqual([-2, -1, 0, 1, 2]);
    const normal = draws(() => randomNormal(random), 100_000);
    expect(Math.abs(mean(normal))).toBeLessThan(0.015);
    expect(Math.abs(mean(normal.map((x) => x ** 2)) - 1)).toBeLessThan(0.02);
    expect(Math.abs(mean(normal.map((x) => x ** 4)) - 3)).toBeLessThan(0.15);
  });
});

describe('a latin hypercube', () => {
  it('has one point in each interval of each dimension', () => {
    for (const column of latinHypercube(seededRandom(9), 4, 50)) {
      const intervals = Array.from(column, (x) => Math.floor(x * 50)).sort((x, y) => x - y);
      expect(intervals).toEqual(Array.from({ length: 50 }, (_, i) => i));
    }
  });
});
