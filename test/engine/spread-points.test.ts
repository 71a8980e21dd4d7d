import { expect, test } from 'vitest';
import { spreadPoints } from '../../src/engine/tolerance.ts';

const sampleOf = (points: number) => ({ count: points + 1, columns: new Map() });

test('all points of a small sample are taken', () => {
  expect(spreadPoints(sampleOf(8), 32)).toEqual([1, 2, 3, 4, 5, 6, 7, 8]);
});

test.each([64, 128, 256, 1024, 4096, 96, 2129])(
  'of %i corners some are taken, each once, with both ends of every name among them',
  (corners) => {
    const taken = spreadPoints(sampleOf(corners), 32);
    expect(new Set(taken).size).toBe(32);
    expect(taken.every((i) => i >= 1 && i <= corners)).toBe(true);
    // Corner i holds the upper end of name k where bit k of i − 1 is set.
    for (let bit = 1; bit < corners; bit *= 2) {
      const ends = new Set(taken.map((i) => ((i - 1) & bit) !== 0));
      if (2 * bit <= corners) expect(ends.size).toBe(2);
    }
  },
);
