import { expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

/** s³ + 3 s² + 2 s + K closes K/(s (s + 1) (s + 2)): stable for 0 < K < 6 (Routh). */
it('the ends of an interval of stable gains are exact where they are rational', () => {
  const { result } = evaluateCell('K is 3\nx = solve(stable(s^3 + 3 s^2 + 2 s + K), K)');
  expect(result('x')).toMatchObject({ formula: 'K > 0 and K < 6', notes: [] });
});

/** s³ + K s² + K² s + 2 is stable for K³ > 2 (Routh), whose end is irrational. */
it('an irrational end is given as a decimal, and that is said', () => {
  const { result } = evaluateCell('K is 3\nx = solve(stable(s^3 + K s^2 + K^2 s + 2), K)');
  expect(result('x')).toMatchObject({
    formula: 'K > 1.25992',
    notes: ['Ends are roots of polynomials, given to 6 digits.'],
  });
});
