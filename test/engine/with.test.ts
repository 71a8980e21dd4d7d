import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const AXIS = `J is 480 kg m^2 ± 8 %
b is 35 N m s/rad
Tw is 260 N m
Kp is 9 kN m/rad
Kd is 4.1 kN m s/rad
Ki is 6 kN m/(rad s)
C = Kp + Ki/s + Kd s
C2 = Kp + Kd s
loop az driven by r, w
  J theta'' + b theta' = T + w
  T = C (r - theta)
  e = r - theta
case storm of az
  w = step(Tw)
e_ss = final(storm.e)
`;

function formulaOf(formula: string): string | null {
  const cell = evaluateCell(`${AXIS}x = ${formula}`);
  expect(cell.problems).toEqual([]);
  return cell.result('x').formula;
}

function problemsOf(statement: string): readonly string[] {
  return evaluateCell(AXIS + statement).problems;
}

describe('with', () => {
  test.each([
    ['a result', 'e_ss with Ki is 0', '-Tw/Kp'],
    ['a result, with a unit', 'e_ss with Ki is 0 kN m/(rad s)', '-Tw/Kp'],
    ['a formula', 'final(storm.e) with Ki is 0', '-Tw/Kp'],
    ['a case', 'final((storm with Ki is 0).e)', '-Tw/Kp'],
    ['a loop', 'characteristic(az with Ki is 0)', 'J s^2 + (b + Kd) s + Kp'],
    ['a transfer function', 'az(w -> e) with Ki is 0', '-1/(J s^2 + (b + Kd) s + Kp)'],
    ['a definition in place of another', 'e_ss with C = C2', '-Tw/Kp'],
    ['a formula in place of a definition', 'e_ss with C = Kp', '-Tw/Kp'],
    ['an assumption in place of a definition', 'e_ss with C is 2 kN m/rad', '-5e-4 Tw'],
    ['a formula in place of an assumption', 'e_ss with (Ki is 0, Kp = 2 [1/s] Kd)', '-Tw/(2 Kd)'],
    ['the numbers first, then the formulas', 'e_ss with (C = Kp + Ki/s, Ki is 0)', '-Tw/Kp'],
    ['several', 'e_ss with (Ki is 0, Kp is 2 kN m/rad)', '-5e-4 Tw'],
    ['one after the other', 'e_ss with Ki is 0 with Kp is 2 kN m/rad', '-5e-4 Tw'],
    [
      'the inner before the outer',
      '(e_ss with (Ki is 0, Kp is 3 kN m/rad)) with Kp is 2 kN m/rad',
      '-Tw/3000',
    ],
    ['a definition by itself changed', 'e_ss with (Ki is 0, C = C + Kp)', '-Tw/(2 Kp)'],
    ['an assumption by itself', 'e_ss with Tw = 2 Tw', '0'],
    ['a point of s', 'az(w -> e) with (s = 0, Ki is 0)', '-1/Kp'],
  ])('replaces in %s', (_, formula, derived) => {
    expect(formulaOf(formula)).toBe(derived);
  });

  test('derives anew: the steady error is the two-term controller’s, not that of Ki near 0', () => {
    const cell = evaluateCell(`${AXIS}x = e_ss with Ki is 0`);
    expect(cell.result('e_ss')).toMatchObject({ formula: '0', value: 0 });
    expect(cell.result('x').value).toBeCloseTo(-260 / 9000, 15);
  });

  test('derives anew where the value of an assumption is 0', () => {
    const cell = evaluateCell(AXIS.replace('Ki is 6', 'Ki is 0'));
    expect(cell.result('e_ss').value).toBeCloseTo(-260 / 9000, 15);
  });

  test('leaves everything outside as it is', () => {
    const cell = evaluateCell(`${AXIS}x = (e_ss with Ki is 0) + e_ss`);
    expect(cell.result('x').value).toBeCloseTo(-260 / 9000, 15);
  });

  test('decides stability anew', () => {
    const cell = evaluateCell(
      `${AXIS}x = stable(az) with Kd is 0\ny = stable(az with Kd is 0)\nz = stable(az)`,
    );
    expect(['x', 'y', 'z'].map((name) => cell.result(name).value)).toEqual([false, false, true]);
  });

  test('drops the sign assumption of what it replaces', () => {
    const cell = evaluateCell(
      'k is positive\nq is positive\nx = (k > 0 with k = q - 3)\ny = stable(s + k) with k = q - 3\nz = stable(s + k)',
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('y').formula).toBe('q > 3');
    expect(cell.result('z').value).toBe(true);
  });

  test('drops the tolerance of what it replaces', () => {
    const cell = evaluateCell('J is 2 kg m^2 ± 10 %\nx = 3 J\ny = x with J is 4 kg m^2');
    expect(cell.result('x').span).not.toBeNull();
    expect(cell.result('y')).toMatchObject({ value: 12, span: null });
  });

  test('reaches into derived parameters and nominal values', () => {
    const cell = evaluateCell(
      'J is 2 kg m^2 ± 10 %\nw0 is 3 rad/s\nKp = nominal(J w0^2)\nx = 2 Kp\ny = x with J is 4 kg m^2\nz = x with Kp is 5 N m',
    );
    expect(cell.problems).toEqual([]);
    expect(['x', 'y', 'z'].map((name) => cell.result(name).value)).toEqual([36, 72, 10]);
  });

  test('may stand in requirements, around the whole and around a part', () => {
    const cell = evaluateCell(
      `${AXIS}require abs(e_ss) <= 30 mrad with Ki is 0 # R-1\nrequire (abs(e_ss) with Ki is 0) <= 20 mrad # R-2\nrequire abs(e_ss with Ki is 0) <= 30 mrad # R-3\nrequire stable(az) with Kd is 0 # R-4`,
    );
    expect(cell.problems).toEqual([]);
    expect(['R-1', 'R-2', 'R-3', 'R-4'].map((label) => cell.requirement(label).verdict)).toEqual([
      'met',
      'not met',
      'met',
      'not met',
    ]);
    expect(cell.requirement('R-1')).toMatchObject({ limit: 30, unit: 'mrad' });
    expect(cell.requirement('R-1').nominal).toBeCloseTo(28.89, 2);
  });

  test.each([
    ['x = e_ss with Kpp is 3', 'Kpp', 'Nothing introduces Kpp. Is Kp meant?'],
    ['x = e_ss with az = 3', 'az', 'az is a loop; `with` replaces assumptions and definitions.'],
    [
      'x = e_ss with storm is 3',
      'storm',
      'storm is a case; `with` replaces assumptions and definitions.',
    ],
    ['x = e_ss with', 'with', '`with` needs the name that is replaced, but the line ends.'],
    [
      'x = e_ss with Ki',
      'Ki',
      'A replacement, `Kp is 2` or `C = C2`, needs `=` here, but the line ends.',
    ],
    ['x = e_ss with Ki is', 'is', '`is` needs a number, but the line ends.'],
    ['x = e_ss with Kp is 3 m', 'Kp is 3 m', 'Kp is in N m/rad, and its replacement is in m.'],
    ['x = e_ss with Tw = 2 Kd', 'Tw = 2 Kd', 'Tw is in N m, and its replacement is in N m s/rad.'],
    ['x = e_ss with (Ki is 0, Ki is 1)', 'Ki', 'Ki is replaced twice here; keep one.'],
  ])('%s', (statement, at, message) => {
    expect(problemsOf(statement)).toEqual([`error at ‹${at}›: ${message}`]);
  });
});

describe('a value at a point', () => {
  const given = 'L = 1/(s + 3)\nw is 2 rad/s\n';
  const evaluated = (statements: string, name = 'x') => {
    const cell = evaluateCell(given + statements);
    expect(cell.problems).toEqual([]);
    return cell.result(name);
  };

  test.each([
    ['L with s = 3 [rad/s]', 1 / 6],
    ['L with s = 3', 1 / 6],
    ['L with s is 3 rad/s', 1 / 6],
    ['L with s = j w', [3 / 13, -2 / 13]],
    ['L(j w) with w is 5 rad/s', [3 / 34, -5 / 34]],
    ['L with (s = j w, w is 5 rad/s)', [3 / 34, -5 / 34]],
    ['(L with s = j w) with w is 5 rad/s', [3 / 34, -5 / 34]],
    ['response(L) with t = 2 [s]', Math.exp(-6)],
    ['response(L) with t = 2', Math.exp(-6)],
    ['response(L) with t is 2 s', Math.exp(-6)],
    ['response(L/s) with t = 2', (1 - Math.exp(-6)) / 3],
    ['response(1/(s^2 + 4)) with t = 2', Math.sin(4) / 2],
    ['response(1/s^3) with t = 2', 2],
  ])('%s', (formula, value) => {
    const found = evaluated(`x = ${formula}`).value;
    const [numbers, expected] = [[found].flat() as number[], [value].flat()];
    expect(numbers).toHaveLength(expected.length);
    expected.forEach((part, index) => expect(numbers[index]).toBeCloseTo(part, 12));
  });

  test('of a signal in time, begun later', () => {
    const loop =
      "K is 2 1/s\nloop a driven by w1\n  x1' = K (w1 - x1)\ncase c of a\n  w1 = step(4 m) after 1 s\n";
    const later = evaluated(`${loop}x = c.x1 with t = 3 [s] in mm`);
    expect(later.value).toBeCloseTo(4 * (1 - Math.exp(-4)), 12);
    expect(later.shown).toBe('3927 mm');
    expect(evaluated(`${loop}x = c.x1 with t = 0.5 [s]`).value).toBe(0);
    expect(evaluated(`${loop}x = response(c.x1) with (t = 3 [s], K is 3 1/s)`).value).toBeCloseTo(
      4 * (1 - Math.exp(-6)),
      12,
    );
  });

  test('at a symbol needs to know its sign', () => {
    expect(evaluateCell(`${given}T1 is 2 s\nx = response(L) with t = T1`).problems).toEqual([
      'error at ‹response(L)›: it is not known whether T1 is negative; a sign statement settles it.',
    ]);
    expect(evaluated('T1 is 2 s\nT1 is positive\nx = response(L) with t = T1').value).toBeCloseTo(
      Math.exp(-6),
      15,
    );
  });

  test('at a pole is no number, and no problem', () => {
    expect(evaluated('x = L with s = -3')).toMatchObject({ value: null, state: 'ready' });
  });

  test.each([
    [
      'x = L with t = 2 [s]',
      'L',
      '`L` is a formula, not a function of t; write `response(L) with t = …`.',
    ],
    [
      'x = routh(s^2 + s + 1) with s = 3',
      'routh(s^2 + s + 1)',
      '`routh(s^2 + s + 1)` is a Routh array, which has no value at a point of s.',
    ],
    ['x = L with s = 3 [m]', 's = 3 [m]', 's is in 1/s, and its replacement is in m.'],
    ['x = response(L) with t = 2 [m]', 't = 2 [m]', 't is in s, and its replacement is in m.'],
  ])('%s', (statement, at, message) => {
    expect(evaluateCell(given + statement).problems).toEqual([`error at ‹${at}›: ${message}`]);
  });

  test('in Hz is a warning with the factor 2 pi', () => {
    expect(evaluateCell(`${given}x = L with s = 3 [Hz]`).problems).toEqual([
      'warning at ‹3 [Hz]›: `3 [Hz]` is a frequency in Hz, and the other side is an angular frequency; formulas do not convert: write `2 pi 3 [Hz]`.',
    ]);
  });
});
