import { expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

it.each([
  ['abs(a/b)', 'a/b'],
  ['abs(-a b)', 'a b'],
  ['abs(n)', '-n'],
  ['abs(z)', 'z'],
  ['abs(a - b)', 'abs(a - b)'],
  ['abs(a) with a = x', 'abs(x)'],
])('%s is %s under the signs', (formula, expected) => {
  const { result } = evaluateCell(
    `a, b are positive\nn is negative\nz is nonnegative\nx is real\ny = ${formula}`,
  );
  expect(result('y').formula).toBe(expected);
});
