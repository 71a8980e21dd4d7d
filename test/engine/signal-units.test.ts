import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

describe('the units of signals', () => {
  test('nothing is checked in a loop in which nothing gives a unit', () => {
    const cell = evaluateCell(`
loop a driven by r
  y' = r - y
case c of a
  r = step(3)
final(c.y)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('final(c.y)')).toMatchObject({ value: 3, unit: null });
  });

  test('a bare coefficient fits wherever it stands in an equation', () => {
    const cell = evaluateCell(`
loop a driven by r
  y'' + 2 y' + 3 y = r
case c of a
  r = step(6)
final(c.y)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('final(c.y)').value).toBe(2);
  });

  test('a unit typed in one equation is carried by the signals to the others', () => {
    const { problems } = evaluateCell(`
J is 2 kg m^2
k is 3 N m/rad
c is 1 N m s/rad
loop a driven by w
  J theta'' = T + w
  T = -k theta - c x
  x = theta`);
    expect(problems).toEqual([
      'error at ‹x = theta›: The two sides do not fit: `x` is in [x], and `theta` is in [x] s.',
    ]);
  });

  test('a step without a unit leaves its input without one', () => {
    const cell = evaluateCell(`
K is 2 1/s
loop a driven by r
  y' = K (r - y)
case c of a
  r = step(1)
case d of a
  r = step(1 m)
final(c.y)
final(d.y)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('final(d.y)')).toMatchObject({ value: 1, unit: 'm' });
  });

  test('a step in a unit that does not fit the input is refused', () => {
    const { problems } = evaluateCell(`
K is 2 1/s
loop a driven by r
  y' = K (r - y)
case c of a
  r = step(1 rad)
case d of a
  r = step(2 m)`);
    expect(problems).toEqual([
      'error at ‹step(2 m)›: The input r is in rad, and `step(2 [m])` gives m.',
    ]);
  });
});
