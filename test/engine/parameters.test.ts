import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const PLANT = `J is 2 kg m^2 ± 10 %
wc is 3 rad/s
Kp = J wc^2
Kn = nominal(J wc^2)
`;
const LOOP = `loop az driven by d
  J theta'' + 5 [N m s/rad] theta' + Kp theta = d
loop bz driven by d
  J theta'' + 5 [N m s/rad] theta' + Kn theta = d
case c of az
  d = step(1 N m)
case e of bz
  d = step(1 N m)
`;

function resultOf(statements: string, name = 'x') {
  const cell = evaluateCell(PLANT + LOOP + statements);
  expect(cell.problems).toEqual([]);
  return cell.result(name);
}

describe('a derived parameter', () => {
  test.each([
    ['in a formula', 'x = 2 Kp', '2 Kp'],
    ['in a transfer function', 'x = az(d -> theta)', '1/(J s^2 + 5 s + Kp)'],
    ['in a final value', 'x = final(c.theta)', '1/Kp'],
    ['in a condition', 'x = Kp > 3 [N m]', 'Kp > 3'],
  ])('stays a symbol %s', (_, statement, formula) => {
    expect(resultOf(statement).formula).toBe(formula);
  });

  test.each([
    ['x = in_full(2 Kp)', '2 J wc^2'],
    ['x = in_full(az(d -> theta))', '1/(J s^2 + 5 s + J wc^2)'],
    ['x = in_full(Kn/Kp)', 'nominal(J wc^2)/(J wc^2)'],
  ])('is opened in full: %s', (statement, formula) => {
    expect(resultOf(statement).formula).toBe(formula);
  });

  test('has its value, its span and its sign in what is made of it', () => {
    const x = resultOf('x = 2 Kp');
    expect(x.value).toBe(36);
    expect(x.span!.low).toBeCloseTo(32.4, 12);
    expect(x.span!.high).toBeCloseTo(39.6, 12);
    const { result } = evaluateCell('a, b are positive\nk = a b\nx = stable(s + k)');
    expect(result('x').value).toBe(true);
  });

  test('is opened by `same`', () => {
    expect(resultOf('x = same(Kp, J wc^2)').value).toBe(true);
    expect(resultOf('x = same(Kp, 2 J wc^2)').value).toBe(false);
    expect(resultOf('x = same(Kn, J wc^2)').value).toBe(false);
  });

  test.each([
    ['x = derivative(3 Kp, J)', '3 wc^2'],
    ['x = derivative(3 Kp, Kp)', '3'],
    ['x = solve(Kp = 18 [N m], J)', '18/wc^2'],
    ['x = limit(Kp/J as J to 0)', 'wc^2'],
    ['x = coefficient(Kp s^2, J, 1)', 'wc^2 s^2'],
  ])('is opened for a symbol behind it: %s', (statement, formula) => {
    expect(resultOf(statement).formula).toBe(formula);
  });

  test('with s in it is none', () => {
    const { result } = evaluateCell('a is 2\nC = a/s\nx = 2 C');
    expect(result('x').formula).toBe('2 a/s');
  });

  test('may stand on another', () => {
    const { result } = evaluateCell('a is 2\nb = 3 a\nc = b + 1\nx = 2 c\ny = in_full(x)');
    expect(result('x')).toMatchObject({ formula: '2 c', value: 14 });
    expect(result('y').formula).toBe('6 a + 2');
  });
});

describe('nominal', () => {
  test('is a symbol of its own that tolerances do not move', () => {
    expect(resultOf('x = 2 Kn')).toMatchObject({ formula: '2 Kn', value: 36, span: null });
    expect(resultOf('x = Kn/Kp').span!.high).toBeCloseTo(1 / 0.9, 12);
  });

  test('keeps a verdict from following the true plant', () => {
    const cell = evaluateCell(
      `${PLANT}${LOOP}require final(c.theta) <= 60 mrad # moves\nrequire final(e.theta) <= 60 mrad # held`,
    );
    expect(cell.problems).toEqual([]);
    expect(cell.requirement('moves').verdict).toBe('met at nominal only');
    expect(cell.requirement('held').verdict).toBe('met');
  });

  test('is asked for where a definition moves with a tolerance', () => {
    const note =
      'Kp is computed from names with a tolerance and moves with them; a gain that is computed once is written with `nominal(…)`.';
    expect(resultOf('x = final(c.theta)').notes).toContain(note);
    expect(resultOf('x = final(e.theta)').notes).not.toContain(note);
  });

  test('of a formula without tolerances is that formula in value', () => {
    expect(resultOf('x = nominal(2 wc)').value).toBe(6);
    expect(resultOf('x = nominal(3)')).toMatchObject({ formula: '3', value: 3 });
  });
});
