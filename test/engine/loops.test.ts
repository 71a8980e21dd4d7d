import { describe, expect, test } from 'vitest';
import { afterFix, evaluateCell } from './worksheet.ts';

const formulasOf = (cell: string, ...statements: string[]) => {
  const { problems, result } = evaluateCell(`${cell}\n${statements.join('\n')}`);
  expect(problems).toEqual([]);
  return statements.map((statement) => result(statement).formula);
};

const DRIVE = `
J is 2 kg m^2
c is 1 N m s/rad
k is 3 N m/rad
loop stage driven by T, w
  J theta'' + c theta' = T + w`;

describe('a loop', () => {
  test('has as unknowns every name in its equations that nothing else defines', () => {
    const { report } = evaluateCell(`${DRIVE}
loop drive driven by r
  J theta'' + c theta' = T
  T = k e
  e = r - theta`);
    expect(report.loops.map(({ content }) => [content.inputs, content.unknowns])).toEqual([
      [['T', 'w'], ['theta']],
      [['r'], ['theta', 'T', 'e']],
    ]);
  });

  test('may have no input, and inputs that nothing depends on', () => {
    expect(
      formulasOf(
        "loop a\n  y' = -2 y\nloop b driven by r, w\n  y' = r - y",
        'characteristic(a)',
        'b(w -> y)',
        'b(r -> y)',
      ),
    ).toEqual(['s + 2', '0', '1/(s + 1)']);
  });

  test('is linear in derivatives of sums too', () => {
    expect(
      formulasOf(
        "c1 is 2 s\nloop a driven by u\n  (c1 (x - u))' = -x\n  z'' + z = (u - x)''",
        'a(u -> x)',
        'a(u -> z)',
      ),
    ).toEqual(['c1 s/(c1 s + 1)', 's^2/((s^2 + 1) (c1 s + 1))']);
  });

  test.each([
    [
      "x' = -x*y + u\n  y' = x",
      '-x*y',
      '`-x y` multiplies signals (x and y); a loop must be linear in its signals. Linearise it about the working point.',
    ],
    [
      "x' = -x^2 + u",
      'x^2',
      '`x^2` is a power of a signal; a loop must be linear in its signals. Linearise it about the working point.',
    ],
    [
      "x' = sin(x) + u",
      'sin(x)',
      '`sin(x)` is not linear in the signals; a loop takes sums of signals times formulas in s. Linearise it about the working point.',
    ],
    ["x' = 1/x + u", 'x', 'Dividing by `x`, which holds a signal, is not linear.'],
    [
      "x' = u x",
      'u x',
      '`u x` multiplies signals (u and x); a loop must be linear in its signals. Linearise it about the working point.',
    ],
  ])('refuses %s, and says which part is not linear', (equations, place, message) => {
    const cell = evaluateCell(`loop a driven by u\n  ${equations}\nstable(a)\np = 3`);
    expect(cell.problems).toEqual([`error at ‹${place}›: ${message}`]);
    expect(cell.result('stable(a)')).toMatchObject({ state: 'error', waitsFor: { name: 'a' } });
    expect(cell.result('p').value).toBe(3);
  });

  test('refuses a constant term', () => {
    expect(evaluateCell("loop a driven by u\n  x' = u + 3").problems).toEqual([
      "error at ‹x' = u + 3›: This equation has a term without a signal; make it an input of the loop and give it a value in a load case.",
    ]);
  });

  test.each([
    [
      "x' = y + z + u\n  y' = x",
      'a has 2 equations for 3 unknowns (x, y, z). Add an equation, name the missing inputs after `driven by`, or give a coefficient its value.',
    ],
    [
      "x' = u\n  y = 2 x\n  y = 3 u",
      'a has 3 equations for 2 unknowns (x, y). Take one equation away, or name what it is to determine.',
    ],
    [
      "theta' = torque + u\n  torque = -3 thta",
      'a has 2 equations for 3 unknowns (theta, torque, thta). Is thta a misspelt theta?',
    ],
    [
      'x + y = u\n  2 x + 2 y = u',
      'equations 1 and 2 do not determine x and y: their determinant is zero for every s.',
    ],
    [
      "x' = u\n  x = 2 u\n  y + x + z = u",
      'y and z need 2 equations, but only equation 3 holds them; equations 1 and 2 are too many for x alone.',
    ],
  ])('refuses %s, and names the unknowns', (equations, message) => {
    const cell = evaluateCell(`loop a driven by u\n  ${equations}\na(u -> x)`);
    expect(cell.problems).toEqual([`error at ‹a›: ${message}`]);
    expect(cell.result('a(u')).toMatchObject({ state: 'error', value: null, formula: null });
  });

  test('names both lines where an assumption turns a likely signal into a coefficient', () => {
    expect(
      evaluateCell(`T is 3 N m\nJ is 2 kg m^2
loop a driven by w
  J theta'' = T + w
  T = -5 theta`).problems,
    ).toEqual([
      'error at ‹T›: T is given in line 2, so it is a coefficient of a, but line 6 uses it as a signal (the left side of an equation); rename one of the two.',
    ]);
  });

  test('with a signal asked for that it has not offers the nearest, and the fix mends it', () => {
    const cell = `${DRIVE}\nstage(T -> thetta)`;
    expect(evaluateCell(cell).problems[0]).toContain('Is theta meant?');
    expect(evaluateCell(afterFix(cell, 'Write theta')).problems).toEqual([]);
    const input = `${DRIVE}\nstage(r -> theta)`;
    expect(evaluateCell(input).problems).toEqual([
      'error at ‹r›: r is not an input of stage; its inputs are T, w.',
    ]);
  });
});

describe('`uses`', () => {
  test('takes in the equations of a loop, its inputs becoming unknowns unless they are driven', () => {
    expect(
      formulasOf(
        `${DRIVE}
loop one driven by r, w
  uses stage
  T = k (r - theta)`,
        'one(r -> theta)',
        'one(w -> theta)',
        'opened(one, T)',
      ),
    ).toEqual(['k/(J s^2 + c s + k)', '1/(J s^2 + c s + k)', 'k/(s (J s + c))']);
  });

  test('takes in two of a kind under names of their own, and loops that use loops', () => {
    const cell = `${DRIVE}
loop two driven by r, w
  uses stage as x
  uses stage as y
  x.T = k (r - x.theta)
  y.T = k (x.theta - y.theta)
  x.w = w
  y.w = 0
loop three driven by r
  uses two as p
  p.r = r
  p.w = 0
  q = p.y.theta
case one of two
  r = step(1 rad)
p = final(one.y.theta)
u = final(one.x.T)`;
    expect(
      formulasOf(
        cell,
        'two(r -> y.theta)',
        'two(w -> x.theta)',
        'three(r -> q)',
        'opened(two, x.T)',
      ),
    ).toEqual([
      'k^2/(J s^2 + c s + k)^2',
      '1/(J s^2 + c s + k)',
      'k^2/(J s^2 + c s + k)^2',
      'k/(s (J s + c))',
    ]);
    expect(evaluateCell(cell).result('p').value).toBe(1);
    expect(evaluateCell(cell).result('u').value).toBe(0);
  });

  test('waits for a loop that is in error, and refuses one that is not there or is itself', () => {
    const broken = evaluateCell(`
loop stage driven by T
  theta'' = T T
loop one driven by r
  uses stage
  T = r - theta
one(r -> theta)`);
    expect(broken.problems).toHaveLength(1);
    expect(broken.result('one(r').waitsFor).toMatchObject({ name: 'one' });
    const misspelt = `${DRIVE}\nloop one driven by r\n  uses stge\n  T = r - theta`;
    expect(evaluateCell(misspelt).problems).toEqual([
      'error at ‹stge›: stge is not a loop of this worksheet. Is stage meant?',
    ]);
    expect(evaluateCell("loop self driven by T\n  uses self\n  x' = T").problems).toEqual([
      'error at ‹self›: self is defined by itself.',
    ]);
  });

  test('leaves an input without an equation among the unknowns', () => {
    expect(evaluateCell(`${DRIVE}\nloop one driven by r\n  uses stage`).problems).toEqual([
      'error at ‹one›: one has 1 equation for 3 unknowns (theta, T, w). Add an equation, name the missing inputs after `driven by`, or give a coefficient its value.',
    ]);
  });
});
