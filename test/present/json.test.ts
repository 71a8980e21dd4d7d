import { expect, it } from 'vitest';
import { jsonComplex, jsonNumber, jsonRoots } from '../../src/present/index.ts';

it('Numbers that do not exist are null in JSON, all others are exact.', () => {
  expect([1 / 3, Infinity, Number.NaN].map(jsonNumber)).toEqual([1 / 3, null, null]);
});

it('A complex number is a pair, a real one a number.', () => {
  expect(jsonComplex({ re: 1, im: -2 })).toEqual([1, -2]);
  expect(jsonComplex({ re: 1, im: 0 })).toBe(1);
  expect(jsonComplex({ re: Number.NaN, im: 0 })).toBeNull();
  expect(jsonRoots([{ re: -1, im: 0 }])).toEqual([[-1, 0]]);
});
