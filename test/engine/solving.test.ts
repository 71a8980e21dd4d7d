import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const SIGNS = 'a, b, c are positive\nk is real\nn is negative\ny is positive\n';

const solved = (statement: string) => {
  const { problems, result } = evaluateCell(`${SIGNS}${statement}`);
  expect(problems).toEqual([]);
  return result('solve');
};

describe('solve', () => {
  test.each([
    ['solve(a x + b = 0, x)', '-b/a'],
    ['solve(a/(x + b) = c, x)', '(a - b c)/c'],
    ['solve(x^2 - (a + b) x + a b = 0, x)', 'x = a, x = b'],
    ['solve(x^2 = 4, x)', 'x = 2, x = -2'],
    ['solve(y^2 = 4, y)', '2'],
    ['solve(y^2 = a/b, y)', 'sqrt(a b)/b'],
  ])('%s gives %s', (statement, formula) => {
    const found = solved(statement).formula;
    if (!formula.startsWith('sqrt')) expect(found).toBe(formula);
    else {
      const { result } = evaluateCell(`${SIGNS}x = same(${found}, ${formula})`);
      expect(result('x').value).toBe(true);
    }
  });

  test.each([
    ['solve(a x + b > 0, x)', 'x > -b/a'],
    ['solve(b - a x > 0, x)', 'x < b/a'],
    ['solve(n x > b, x)', 'x < b/n'],
    ['solve(a < x <= b, x)', 'a < x <= b'],
  ])('%s turns the inequality as the signs ask: %s', (statement, formula) => {
    expect(solved(statement).formula).toBe(formula);
  });

  test.each([
    ['solve(y^2 = -4, y)', 'no y of the sign assumed solves this'],
    ['solve(x^2 = -4, x)', 'no real x solves this'],
    ['solve(y + a = 0, y)', 'no y of the sign assumed solves this'],
  ])('%s has no value, and says why', (statement, reason) => {
    expect(solved(statement)).toMatchObject({ value: null, formula: null });
    expect(solved(statement).notes).toEqual([`No value: ${reason}`]);
  });

  test.each([
    ['solve(k x > b, x)', 'the sign of what multiplies x is not known; it depends on k.'],
    ['solve(1/x < a, x)', 'the inequality is not linear in x.'],
    ['solve(x = x, x)', 'the equation holds for every x.'],
    ['solve(a = b, x)', 'the equation does not contain x.'],
    ['solve(3, x)', 'solve takes an equation, an inequality or stable(…).'],
    ['solve(sin(x) = 1/2, x)', 'x stands inside a function, where it is not solved for.'],
    ['solve(x^2 = a, x)', 'x^2 is given, which leaves its sign open; say whether x is positive.'],
  ])('%s is refused: %s', (statement, message) => {
    const { problems } = evaluateCell(`${SIGNS}${statement}`);
    expect(problems).toEqual([`error at ‹${statement}›: ${message}`]);
  });

  test('introduces its unknown only inside its own brackets', () => {
    const { problems } = evaluateCell(`${SIGNS}v = solve(a x = b, x)\nx + 1`);
    expect(problems).toEqual([
      'error at ‹x›: Nothing introduces x. Give it a value (`x is …`), a definition or a sign.',
    ]);
  });

  test('of stability gives the intervals of a gain, whatever the signs', () => {
    expect(solved('solve(stable(s^3 + 2 s^2 + 3 s + k), k)').formula).toBe('0 < k < 6');
    expect(solved('solve(stable(s^2 + s - 1 - k^2), k)').formula).toBe('1 < 0');
    expect(solved('solve(stable((s + 1) (s + a)), k)').formula).toBe('1 > 0');
  });

  test('of stability in symbols gives the conditions, solved for the gain', () => {
    expect(solved('solve(stable(s^3 + a s^2 + b s + k), k)').formula).toMatch(
      /^0 < k < a b$|^k > 0 and k < a b$/,
    );
  });

  test('has units', () => {
    const { problems, result } = evaluateCell(`
J is 2 kg m^2
wc is 3 rad/s
J is positive
Kp has unit N m/rad
p = solve(Kp/J = wc^2, Kp) in N m/rad
q = solve(Kp/J >= wc^2, Kp)`);
    expect(problems).toEqual([]);
    expect(result('p')).toMatchObject({ formula: 'J wc^2', value: 18, shown: '18 N m/rad' });
    expect(result('q').formula).toBe('Kp >= J wc^2');
  });
});

describe('match', () => {
  const DRIVE = `
J is 2 kg m^2
b is 3 N m s/rad
wn is 4 rad/s
zeta is 0.7
`;

  test('gives the gains that place the poles of a loop, and they do', () => {
    const lines = `${DRIVE}
Kp, Kd are real
loop a driven by r
  J theta'' + b theta' = T
  T = Kp (r - theta) - Kd theta'
g = match(characteristic(a), s^2 + 2 zeta wn s + wn^2, Kp, Kd)
placed = (characteristic(a) with (Kp = g.Kp, Kd = g.Kd))/J
x = same(placed, s^2 + 2 zeta wn s + wn^2)
y = g.Kp in N m/rad`;
    const { problems, result } = evaluateCell(lines);
    expect(problems).toEqual([]);
    expect(result('g').formula).toBe('Kp = J wn^2, Kd = 2 J wn zeta - b');
    expect(result('g').parts).toMatchObject({
      items: [
        { name: 'Kp', value: 32 },
        { name: 'Kd', value: 8.2 },
      ],
    });
    expect(result('x').value).toBe(true);
    expect(result('y')).toMatchObject({ value: 32, shown: '32 N m/rad' });
  });

  test('may list unknowns that nothing introduces', () => {
    const { problems, result } = evaluateCell(
      `${DRIVE}match(J s^2 + (b + Kd) s + Kp, s^2 + 2 zeta wn s + wn^2, Kp, Kd)`,
    );
    expect(problems).toEqual([]);
    expect(result('match').formula).toBe('Kp = J wn^2, Kd = 2 J wn zeta - b');
  });

  test('is refused where too little is left to choose', () => {
    const { problems } = evaluateCell(
      `${DRIVE}match(J s^2 + b s + Kp, s^2 + 2 zeta wn s + wn^2, Kp)`,
    );
    expect(problems).toEqual([
      'error at ‹match(J s^2 + b s + Kp, s^2 + 2 zeta wn s + wn^2, Kp)›: the coefficients of s^1 cannot be matched: what is left holds none of the unknowns.',
    ]);
  });
});
