import { expect, test } from 'vitest';
import { rangeAround } from '../../src/engine/gain-range.ts';

test.each([
  [9, [0, 20]],
  [10, [0, 20]],
  [10.1, [0, 50]],
  [0.4, [0, 1]],
  [-3e-5, [-1e-4, 0]],
  [2.5e6, [0, 5e6]],
  [0, null],
  [NaN, null],
])('the range around %s is %j', (value, range) => {
  expect(rangeAround(value)).toEqual(range);
});
