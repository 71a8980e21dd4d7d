import { expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

it('a transfer function is written in time-constant form and in pole-zero form', () => {
  const { result, problems } = evaluateCell(
    'J is 2\nb is 3\nK is 5\nG = K/(s (J s + b))\nx = time_constant_form(G)\ny = pole_zero_form(G)',
  );
  expect(problems).toEqual([]);
  expect(result('x').formula).toBe('K/(b s (1 + J s/b))');
  expect(result('y').formula).toBe('K/(J s (s + b/J))');
});
