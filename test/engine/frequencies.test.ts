import { describe, expect, test } from 'vitest';
import { afterFix, evaluateCell } from './worksheet.ts';

const GIVEN = `f1 is 2 Hz
f2 is 1 Hz
wc is 3 rad/s
p is 5 1/s
n is 100 rpm
J is 2 kg m^2
k is 8 N m/rad
`;

function warning(at: string, shown: string, fixed: string): string {
  return (
    `warning at ‹${at}›: \`${shown}\` is a frequency in Hz, and the other side is an angular frequency; ` +
    `formulas do not convert: write \`${fixed}\`.`
  );
}

describe('a frequency beside an angular frequency', () => {
  test.each([
    ['x = f1 + wc', 'x = 2 pi f1 + wc'],
    ['x = wc - f1', 'x = wc - 2 pi f1'],
    ['x = f1 + s', 'x = 2 pi f1 + s'],
    ['x = s + f1', 'x = s + 2 pi f1'],
    ['x = f1 + n', 'x = 2 pi f1 + n'],
    ['x = f1 + sqrt(k/J)', 'x = 2 pi f1 + sqrt(k/J)'],
    ['x = 1/(s + f1)', 'x = 1/(s + 2 pi f1)'],
    ['x = max(f1, wc)', 'x = max(2 pi f1, wc)'],
    ['x = f1 < wc', 'x = 2 pi f1 < wc'],
    ['require f1 <= wc', 'require 2 pi f1 <= wc'],
    ['require f1 <= 3 rad/s', 'require 2 pi f1 <= 3 rad/s'],
    ['x = (1/s with s = f1)', 'x = (1/s with s = 2 pi f1)'],
  ])('is a warning with the factor: %s', (statement, fixed) => {
    const cell = GIVEN + statement;
    expect(evaluateCell(cell).problems).toEqual([warning('f1', 'f1', '2 pi f1')]);
    expect(afterFix(cell, 'Write 2 pi f1')).toBe(GIVEN + fixed);
    expect(evaluateCell(GIVEN + fixed).problems).toEqual([]);
  });

  test('is bracketed where it is a sum', () => {
    const cell = `${GIVEN}x = (f1 + f2) + wc`;
    expect(evaluateCell(cell).problems).toEqual([
      warning('(f1 + f2)', 'f1 + f2', '2 pi (f1 + f2)'),
    ]);
    expect(evaluateCell(afterFix(cell, 'Write 2 pi (f1 + f2)')).problems).toEqual([]);
  });

  test('may be a quantity', () => {
    const cell = `${GIVEN}require wc <= 2 Hz`;
    expect(evaluateCell(cell).problems).toEqual([warning('2 Hz', '2 [Hz]', '2 pi 2 [Hz]')]);
    const fixed = evaluateCell(afterFix(cell, 'Write 2 pi 2 [Hz]'));
    expect(fixed.problems).toEqual([]);
    expect(fixed.requirement('wc').verdict).toBe('met');
  });

  test('after `is` of s becomes a formula', () => {
    const cell = `${GIVEN}x = (1/s with s is 2 Hz)`;
    expect(evaluateCell(cell).problems).toEqual([warning('2 Hz', '2 [Hz]', 's = 2 pi 2 [Hz]')]);
    const fixed = evaluateCell(afterFix(cell, 'Write s = 2 pi 2 [Hz]'));
    expect(fixed.problems).toEqual([]);
    expect(fixed.result('x').value).toBeCloseTo(1 / (4 * Math.PI), 12);
  });

  test('in an equation of a loop', () => {
    const cell = 'f1 is 2 Hz\nloop a driven by r\n  y = 1/(s + f1) r';
    expect(evaluateCell(cell).problems).toHaveLength(1);
  });

  test.each([
    'x = 2 pi f1 + wc',
    'x = wc/(2 pi) + f1',
    'x = f1 + f2',
    'x = wc + n + s',
    'x = f1 + p',
    'x = wc + p',
    'x = f1 + 3',
    'x = s/(2 pi f1) + 1',
    'require f1 <= 3 Hz',
    'require wc <= 100 rpm',
    'require f1 > 0',
  ])('is no matter where the rule is kept: %s', (statement) => {
    expect(evaluateCell(GIVEN + statement).problems).toEqual([]);
  });
});

describe('the unit that `in` names', () => {
  test.each([
    ['wc in Hz', '0.4775 Hz', 'An angular frequency is divided by 2π to be shown in Hz.'],
    ['n in Hz', '1.667 Hz', 'An angular frequency is divided by 2π to be shown in Hz.'],
    ['sqrt(k/J) in Hz', '0.3183 Hz', 'An angular frequency is divided by 2π to be shown in Hz.'],
    [
      'f1 in rad/s',
      '12.57 rad/s',
      'A frequency in Hz is multiplied by 2π to be shown as an angular frequency.',
    ],
    [
      'f1 in rpm',
      '120 rpm',
      'A frequency in Hz is multiplied by 2π to be shown as an angular frequency.',
    ],
  ])('%s converts and says so', (formula, shown, note) => {
    const { result, problems } = evaluateCell(`${GIVEN}x = ${formula}`);
    expect(problems).toEqual([]);
    expect(result('x')).toMatchObject({ shown, notes: [note] });
  });

  test.each([
    ['f1 in Hz', '2 Hz'],
    ['f1 in mHz', '2000 mHz'],
    ['wc in rpm', '28.65 rpm'],
    ['2 pi f1 in Hz', '2 Hz'],
  ])('%s is shown so', (formula, shown) => {
    expect(evaluateCell(`${GIVEN}x = ${formula}`).result('x').shown).toBe(shown);
  });

  test('changes nothing but what is shown', () => {
    const { result } = evaluateCell(`${GIVEN}x = wc in Hz\ny = 2 x`);
    expect(result('x')).toMatchObject({ value: 3, unit: 'rad/s' });
    expect(result('y').value).toBe(6);
  });
});

test('a ratio of a frequency and an angular frequency is a pure number', () => {
  const { result } = evaluateCell(`${GIVEN}x = f1/wc`);
  expect(result('x')).toMatchObject({ unit: null, shown: '0.6667' });
});
