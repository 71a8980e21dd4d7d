import { describe, expect, test } from 'vitest';
import { afterFix, evaluateCell } from './worksheet.ts';

const GIVEN = `T is 3 N m
theta is 2 mrad
m1 is 3 kg
k is 4
q is positive
J is 2 kg m^2
`;

function problemsOf(statements: string): readonly string[] {
  return evaluateCell(GIVEN + statements).problems;
}

describe('dimensions', () => {
  test.each([
    ['x = T + theta', 'T + theta', '`T + theta` adds N m to rad.'],
    ['x = theta + T', 'theta + T', '`theta + T` adds rad to N m.'],
    ['x = T - theta', 'T - theta', '`T - theta` subtracts rad from N m.'],
    ['x = 2 T + m1 + 3', '2 T + m1 + 3', '`2 T + m1` adds N m to kg.'],
    ['x = T/(m1 + T)', '(m1 + T)', '`m1 + T` adds kg to N m.'],
    [
      'x = max(T, m1)',
      'max(T, m1)',
      '`T` is in N m and cannot be compared with `m1`, which is in kg.',
    ],
    ['x = T < m1', 'T < m1', '`T` is in N m and cannot be compared with `m1`, which is in kg.'],
    ['x = exp(T)', 'T', 'exp takes a pure number or an angle, and `T` is in N m.'],
    ['x = T in kg', 'kg', '`T` is in N m, so it cannot be shown in kg.'],
    ['x = T + 3 [m]', 'T + 3 [m]', '`T + 3 [m]` adds N m to m.'],
    [
      'require T <= 3 kg',
      'T <= 3 kg',
      '`T` is in N m and cannot be compared with `3 [kg]`, which is in kg.',
    ],
    ['x = T^2 + T', 'T^2 + T', '`T^2 + T` adds N² m² to N m.'],
  ])('%s is refused', (statement, at, message) => {
    const cell = evaluateCell(`${GIVEN}${statement}\ny = 2 k`);
    expect(cell.problems).toEqual([`error at ‹${at}›: ${message}`]);
    expect(cell.result('y').value).toBe(8);
  });

  test('a definition whose dimensions disagree has no value, nor has what depends on it', () => {
    const cell = evaluateCell(`${GIVEN}x = T + theta\ny = 2 x`);
    expect(cell.problems).toHaveLength(1);
    expect(cell.result('x')).toMatchObject({ value: null, state: 'error' });
    expect(cell.result('y')).toMatchObject({ state: 'error', waitsFor: { name: 'x', line: 8 } });
  });

  test.each([
    ['a bare number fits', 'T + 2', 5],
    ['a name without a unit fits', 'T + k', 7],
    ['a product with a name without a unit fits', 'T + k m1', 15],
    ['an angle counts as 1', 'theta + 2', 2.002],
    ['an angle counts as 1 in a sine', 'sin(theta)', Math.sin(0.002)],
    ['0 fits', 'T + 0', 3],
    ['a power has the power of the unit', 'sqrt(T^2)', 3],
    ['percent is a number', 'T (1 + 8 [%])', 3.24],
  ])('%s: %s', (_, formula, value) => {
    const cell = evaluateCell(`${GIVEN}x = ${formula}`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').value).toBeCloseTo(value, 12);
  });

  test.each(['s^2 + 2 s + k', '1/(s^2 + s + 1)', 's^2 + s', 'J s^2 + 2 s + k', '1/(1 + s)'])(
    'polynomials in s with bare coefficients are fine: %s',
    (formula) => {
      expect(problemsOf(`x = ${formula}`)).toEqual([]);
    },
  );

  test('s is 1/s where units stand beside it', () => {
    expect(problemsOf('x = J s^2 + T s')).toEqual([
      'error at ‹J s^2 + T s›: `J s^2 + T s` adds N m to W.',
    ]);
  });

  test.each([
    ['w0^2/(s^2 + 2 w0 s + w0^2)', null],
    ['1/(1 + s/w0)', null],
    ['1/(1 + s/(2 pi f0))', null],
    ['w0/(s + w0)', null],
    ['1/(J s^2 + b s + k0)', 'rad/(N m)'],
    ['k0 + b s', 'N m/rad'],
    ['theta + 2', 'rad'],
  ])('an angle in a transfer function is kept where it belongs: %s', (formula, unit) => {
    const cell = evaluateCell(
      `w0 is 3 rad/s\nf0 is 2 Hz\nJ is 2 kg m^2\nb is 3 N m s/rad\nk0 is 4 N m/rad\ntheta is 2 mrad\nx = ${formula}`,
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').unit).toBe(unit);
  });

  test('of the span of a figure is a time', () => {
    const loop = "loop a driven by w\n  x' = w - 2 x\ncase c of a\n  w = step(2)\n";
    expect(evaluateCell(`${loop}draw response of c.x over 20 m`).problems).toEqual([
      'error at ‹20 m›: `20 [m]` is in m, and a time is needed here.',
    ]);
    expect(evaluateCell(`${loop}draw response of c.x over 20 s`).problems).toEqual([]);
  });

  test('the unit of a result is derived', () => {
    const cell = evaluateCell(`${GIVEN}x = T/J\ny = sqrt(T/J)\nz = T theta/J in mrad/s^2`);
    expect(cell.result('x')).toMatchObject({ unit: '1/s²' });
    expect(cell.result('y')).toMatchObject({ unit: '1/s' });
    expect(cell.result('z')).toMatchObject({ unit: 'rad/s²', shown: '3 mrad/s²' });
  });
});

describe('the dimensions of a loop', () => {
  test('of a signal follow from its equations', () => {
    const cell = evaluateCell(
      "J is 2 kg m^2\nk is 3 N m/rad\nloop a driven by w\n  J theta'' = w - k theta - 2 [N m s/rad] theta'\ncase c of a\n  w = step(3 N m)\nx = final(c.theta)\ny = a(w -> theta')",
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('x')).toMatchObject({ value: 1, unit: 'rad' });
    expect(cell.result('y').unit).toBe('rad/(N m s)');
  });

  test('of a symbol without a value follow from the equations it stands in', () => {
    const cell = evaluateCell(
      "J is 2 kg m^2\nb is positive\nloop a driven by w\n  J omega' = w - b omega\ncase c of a\n  w = step(3 N m)\nx = b + 1 [kg]",
    );
    expect(cell.problems).toEqual(['error at ‹b + 1 [kg]›: `b + 1 [kg]` adds N m s to kg.']);
  });

  test('are refused where a term of an equation does not fit the others', () => {
    const { problems } = evaluateCell(`J is 2 kg m^2
k is 3 N m/rad
loop a driven by r, w
  J theta'' = T + theta + w
  T = k (r - theta)
case c of a
  w = step(3 N m)
  r = step(2 mrad)`);
    expect(problems).toEqual([
      "error at ‹J theta'' = T + theta + w›: `T + theta` adds N m to rad.",
    ]);
  });

  test('are refused where one equation contradicts the others', () => {
    const { problems } = evaluateCell(`J is 2 kg m^2
k is 3 N m s/rad
loop a driven by r, w
  T = k (r - theta)
  J theta'' = T + w
  e = r - theta
case c of a
  w = step(3 N m)
  r = step(2 mrad)
case d of a
  w = ramp(1 N m/s)`);
    expect(problems).toEqual(["error at ‹J theta'' = T + w›: `T + w` adds N m s to N m."]);
  });

  test('are refused where a load case contradicts the equations', () => {
    const { problems } = evaluateCell(`J is 2 kg m^2
k is 3 N m/rad
loop a driven by w
  J theta'' = w - k theta
case c of a
  w = step(3 N m)
case d of a
  w = step(3 kg)`);
    expect(problems).toEqual([
      'error at ‹step(3 kg)›: The input w is in N m, and `step(3 [kg])` gives kg.',
    ]);
  });

  test('are those of the source, by its kind', () => {
    const cell = (line: string) =>
      evaluateCell(
        `J is 2 kg m^2\nloop a driven by w\n  J omega' = w - 2 [N m s/rad] omega\ncase c of a\n  ${line}`,
      ).problems;
    for (const source of [
      'step(3 N m)',
      'ramp(3 N m/s)',
      'parabola(3 N m/s^2)',
      'impulse(3 N m s)',
    ]) {
      expect(cell(`w = ${source}`)).toEqual([]);
    }
    expect(cell("w' = step(3 N m/s)")).toEqual([]);
    expect(cell('w = step(1 N m) + ramp(3 N m)')).toEqual([
      'error at ‹ramp(3 N m)›: The input w is in N m, and `ramp(3 [N m])` gives N m s.',
    ]);
    expect(cell('w = step(3 N m) after 2 m')).toEqual([
      'error at ‹2 m›: `2 [m]` is in m, and a time is needed here.',
    ]);
    expect(cell('w = step(3 N m)\n  omega starts at 3 rad')).toEqual([
      'error at ‹omega starts at 3 rad›: `omega` is in rad/s, and `3 [rad]` is in rad.',
    ]);
  });
});

describe('limits of requirements', () => {
  test.each([
    ['require J <= 5', '5', 'Write 5 kg m^2', 'require J <= 5 kg m^2'],
    ['require J >= -5', '-5', 'Write -5 kg m^2', 'require J >= -5 kg m^2'],
    ['require 5 >= J', '5', 'Write 5 [kg m^2]', 'require 5 [kg m^2] >= J'],
    ['require abs(theta) <= 0.2', '0.2', 'Write 0.2 rad', 'require abs(theta) <= 0.2 rad'],
    [
      'require J <= 5 with J is 3 kg m^2',
      '5',
      'Write 5 kg m^2',
      'require J <= 5 kg m^2 with J is 3 kg m^2',
    ],
  ])('that are bare are errors with the fix: %s', (statement, limit, title, fixed) => {
    const cell = GIVEN + statement;
    const [problem, ...others] = evaluateCell(cell).problems;
    expect(problem).toMatch(
      new RegExp(
        `^error at ‹${limit}›: .* has no unit; write \`${title.slice(6).replace(/[[\]^]/g, '\\$&')}\`\\.$`,
      ),
    );
    expect(others).toEqual([]);
    const after = afterFix(cell, title);
    expect(after).toBe(GIVEN + fixed);
    expect(evaluateCell(after).problems).toEqual([]);
  });

  test('say the unit and the limit in whole', () => {
    expect(problemsOf('require J <= 5')).toEqual([
      'error at ‹5›: `J` is in kg m², and the limit 5 has no unit; write `5 kg m^2`.',
    ]);
  });

  test.each([
    'require T > 0',
    'require T >= -0',
    'require k <= 5',
    'require 2 <= k <= 5',
    'require T/T <= 2',
  ])('may be bare for a pure number, and 0 for any: %s', (statement) => {
    expect(problemsOf(statement)).toEqual([]);
  });
});
