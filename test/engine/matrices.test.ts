import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const GIVEN = 'M = rows(1, 2 | 3, 4)\nv = rows(5 | 6)\nk is 3 kg\na is positive\n';

describe('matrices', () => {
  test.each([
    ['M', 'rows(1, 2 | 3, 4)'],
    ['transpose(M)', 'rows(1, 3 | 2, 4)'],
    ['M*M', 'rows(7, 10 | 15, 22)'],
    ['M M', 'rows(7, 10 | 15, 22)'],
    ['M^2', 'rows(7, 10 | 15, 22)'],
    ['M*v', 'rows(17 | 39)'],
    ['inverse(M)', 'rows(-2, 1 | 3/2, -1/2)'],
    ['M^-1', 'rows(-2, 1 | 3/2, -1/2)'],
    ['M*inverse(M)', 'rows(1, 0 | 0, 1)'],
    ['identity(2)', 'rows(1, 0 | 0, 1)'],
    ['diagonal(1, a)', 'rows(1, 0 | 0, a)'],
    ['M + identity(2)', 'rows(2, 2 | 3, 5)'],
    ['M - M', 'rows(0, 0 | 0, 0)'],
    ['2 M', 'rows(2, 4 | 6, 8)'],
    ['M/2', 'rows(1/2, 1 | 3/2, 2)'],
    ['-M', 'rows(-1, -2 | -3, -4)'],
    ['rows(k, 2 k | s, k s)', 'rows(k, 2 k | s, k s)'],
    ['inverse(rows(a, 1 | 0, 2))', 'rows(1/a, -1/(2 a) | 0, 1/2)'],
    ['rows(a, s) with s = 2', 'rows(a, 2)'],
    ['rows(a, 1) with a is 2', 'rows(2, 1)'],
  ])('%s is %s', (formula, derived) => {
    const cell = evaluateCell(`${GIVEN}x = ${formula}`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').formula).toBe(derived);
  });

  test('of more than one entry have rows in their parts, and no value', () => {
    const { result } = evaluateCell(`${GIVEN}x = 2 M`);
    expect(result('x')).toMatchObject({
      kind: 'value',
      value: null,
      parts: {
        rows: [
          ['2', '4'],
          ['6', '8'],
        ],
      },
    });
  });

  test.each([
    ['entry(M, 1, 2)', 2],
    ['determinant(M)', -2],
    ['transpose(v)*v', 61],
    ['determinant(diagonal(2, 3, 4))', 24],
  ])('%s is the number %s', (formula, value) => {
    expect(evaluateCell(`${GIVEN}x = ${formula}`).result('x').value).toBe(value);
  });

  test('of numbers and s have characteristic polynomials', () => {
    const { result } = evaluateCell(`${GIVEN}p = determinant(s identity(2) - M)`);
    expect(result('p').formula).toBe('s^2 - 5 s - 2');
  });

  test('that a formula returns may be a column of transfer functions', () => {
    const { result, problems } = evaluateCell(
      "loop az driven by w\n  x' = w - 2 x\n  y = 3 x\nG = az(w -> x, y)\nH = entry(G, 2, 1)",
    );
    expect(problems).toEqual([]);
    expect(result('G').formula).toBe('rows(1/(s + 2) | 3/(s + 2))');
    expect(result('H').formula).toBe('3/(s + 2)');
  });

  test.each([
    ['rows(1, 2 | 3)', '1, 2 | 3', 'The rows have 2 and 1 entries; all rows need the same number.'],
    [
      'M*rows(1, 2, 3)',
      'M*rows(1, 2, 3)',
      'a 2×2 matrix cannot be multiplied by a 1×3 matrix: a row of the first needs as many entries as a column of the second.',
    ],
    ['M + 1', 'M + 1', 'a 2×2 matrix and a formula cannot be added.'],
    ['1/M', '1/M', 'Nothing can be divided by a 2×2 matrix.'],
    ['entry(M, 3, 1)', 'entry(M, 3, 1)', 'the matrix is 2×2; it has no entry 3, 1.'],
    [
      'inverse(rows(1, 2 | 2, 4))',
      'inverse(rows(1, 2 | 2, 4))',
      'the equations are not independent: their determinant is zero.',
    ],
    ['determinant(v)', 'determinant(v)', 'determinant takes a square matrix, and this one is 2×1.'],
    ['M^a', 'M^a', 'An exponent is a number; write other powers with exp and log.'],
    ['M < 2', 'M < 2', 'a 2×2 matrix cannot be compared; compare a number that is read from it.'],
  ])('%s is refused', (formula, at, message) => {
    expect(evaluateCell(`${GIVEN}x = ${formula}`).problems).toEqual([
      `error at ‹${at}›: ${message}`,
    ]);
  });
});
