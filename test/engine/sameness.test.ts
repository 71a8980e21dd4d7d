import { describe, expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

function sameness(a: string, b: string) {
  const { result, problems } = evaluateCell(
    `m, k are positive\nx is real\nis_same = same(${a}, ${b})`,
  );
  expect(problems).toEqual([]);
  return result('is_same').value;
}

describe('same with square roots', () => {
  it.each([
    ['sqrt(k/m) m', 'sqrt(k m)'],
    ['1/sqrt(k m)', 'sqrt(1/(k m))'],
    ['sqrt(k/m)^2', 'k/m'],
  ])('knows that %s is %s for positive names', (a, b) => {
    expect(sameness(a, b)).toBe(true);
  });

  it('refutes where the values differ', () => {
    expect(sameness('sqrt(k)', 'sqrt(m)')).toBe(false);
    expect(sameness('sqrt(x^2)', 'x')).toBe(false);
  });

  it('knows products of roots of positive names', () => {
    expect(sameness('sqrt(k) sqrt(m)', 'sqrt(k m)')).toBe(true);
  });

  it('does not refute forms that differ but have the same values', () => {
    expect(sameness('pi/4', '4 atan(1/5) - atan(1/239)')).toBe(null);
  });
});
