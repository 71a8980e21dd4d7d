import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const SERVO = `
J is 2 kg m^2
b is 1 N m s/rad
Kp is 6 N m/rad
Kd is 3 N m s/rad
J, b, Kp, Kd are positive
C = Kp + Kd s
loop az driven by r, w, n
  J theta'' + b theta' = T + w
  T = C (r - theta - n)
  e = r - theta
`;

const formulas = (...statements: string[]) => {
  const { problems, result } = evaluateCell(`${SERVO}${statements.join('\n')}`);
  expect(problems).toEqual([]);
  return statements.map((statement) => result(statement).formula);
};

describe('a transfer function', () => {
  test('is derived from the equations, in lowest terms', () => {
    expect(
      formulas(
        'az(w -> theta)',
        'az(w -> e)',
        'az(r -> theta)',
        'az(n -> T)',
        'az(r -> r)',
        'az(w -> r)',
      ),
    ).toEqual([
      '1/(J s^2 + (b + Kd) s + Kp)',
      '-1/(J s^2 + (b + Kd) s + Kp)',
      '(Kd s + Kp)/(J s^2 + (b + Kd) s + Kp)',
      '-s (J s + b) (Kd s + Kp)/(J s^2 + (b + Kd) s + Kp)',
      '1',
      '0',
    ]);
  });

  test('may be to a derivative or from one, and to several signals as a column', () => {
    const { problems, result } = evaluateCell(`${SERVO}az(w -> theta')
az(w' -> theta)
az(w -> theta, e)`);
    expect(problems).toEqual([]);
    expect(result("az(w -> theta')").formula).toBe('s/(J s^2 + (b + Kd) s + Kp)');
    expect(result("az(w' -> theta)").formula).toBe('1/(s (J s^2 + (b + Kd) s + Kp))');
    expect(result('az(w -> theta, e)').parts).toEqual({
      rows: [['1/(J s^2 + (b + Kd) s + Kp)'], ['-1/(J s^2 + (b + Kd) s + Kp)']],
    });
  });

  test('has a unit, and no number of its own', () => {
    const { result } = evaluateCell(`${SERVO}az(w -> theta)`);
    expect(result('az(w')).toMatchObject({ kind: 'transfer', value: null, shown: null });
  });

  test('with replacements is derived anew', () => {
    expect(formulas('az(w -> theta) with Kd is 0 N m s/rad', 'az(w -> theta) with C = Kp')).toEqual(
      ['1/(J s^2 + b s + Kp)', '1/(J s^2 + b s + Kp)'],
    );
  });
});

describe('the loop gain', () => {
  test('is that of the loop broken at a signal, so that 1 + L has the characteristic polynomial', () => {
    const { problems, result } = evaluateCell(`${SERVO}opened(az, T)
x = same(numerator(1 + opened(az, T)), characteristic(az))`);
    expect(problems).toEqual([]);
    expect(result('opened').formula).toBe('(Kd s + Kp)/(s (J s + b))');
    expect(result('x').value).toBe(true);
  });

  test('is refused at what is not the whole left side of an equation', () => {
    const { problems } = evaluateCell(`${SERVO}opened(az, theta)\nopened(az, r)`);
    expect(problems).toEqual([
      'error at ‹opened(az, theta)›: az can be broken at a signal that is the whole left side of one equation (T, e), and theta is not.',
      'error at ‹opened(az, r)›: az can be broken at a signal that is the whole left side of one equation (T, e), and r is not.',
    ]);
  });

  test('at a signal outside the feedback is 0, which has no type', () => {
    const { problems, result } = evaluateCell(`${SERVO}opened(az, e)\nsystem_type(opened(az, e))`);
    expect(result('opened').formula).toBe('0');
    expect(problems).toEqual([
      'error at ‹system_type(opened(az, e))›: the loop gain is zero: it has no type.',
    ]);
  });
});

describe('the parts of a transfer function', () => {
  test('are its poles and zeros as numbers, and its polynomials', () => {
    const { problems, result } = evaluateCell(`${SERVO}H = az(r -> theta)
poles(H)
zeros(H)
dc_gain(H)
numerator(H)
denominator(H)
coefficient(denominator(H), s, 1)
coefficient(denominator(H), s, 5)`);
    expect(problems).toEqual([]);
    const [[re, im], other] = result('poles').parts as number[][];
    expect([re, Math.abs(im)]).toEqual([-1, Math.sqrt(2)]);
    expect(other).toEqual([re, -im]);
    expect(result('zeros').parts).toEqual([[-2, 0]]);
    expect(result('dc_gain').value).toBe(1);
    expect(result('numerator').formula).toBe('Kd s + Kp');
    expect(result('denominator').formula).toBe('J s^2 + (b + Kd) s + Kp');
    expect(result('coefficient(denominator(H), s, 1)').formula).toBe('b + Kd');
    expect(result('coefficient(denominator(H), s, 5)').value).toBe(0);
  });

  test('do not exist where they are infinite or need a polynomial', () => {
    const { problems, result } = evaluateCell(`${SERVO}dc_gain(1/s)
coefficient(az(r -> theta), s, 1)
poles(az)`);
    expect(result('dc_gain').notes).toEqual(['No value: infinite: a pole at s = 0']);
    expect(problems).toHaveLength(2);
    expect(problems[0]).toContain('coefficient takes a polynomial in s');
    expect(problems[1]).toContain('az is a loop');
  });
});

describe('algebra on formulas', () => {
  test.each([
    ['limit(s az(r -> theta)/s as s to 0)', '1'],
    ['limit(az(r -> theta) as s to infinity)', '0'],
    ['limit((Kp^2 - Kd^2)/(Kp - Kd) as Kp to Kd)', '2 Kd'],
    ['expand((s + 2 [1/s])^2)', 's^2 + 4 s + 4'],
    ['factor(s^3 + 4 s^2 + 4 s)', 's (s + 2)^2'],
    ['collect(Kp s + Kd s + Kp, Kp)', 'Kp (s + 1) + Kd s'],
    ['derivative(Kp^2/Kd, Kp)', '2 Kp/Kd'],
    ['derivative(Kp, s)', '0'],
  ])('%s is %s', (statement, formula) => {
    const { result } = evaluateCell(
      `Kp is 3\nKd is 2\nKp, Kd are positive\nJ is 2\nb is 1\nloop az driven by r\n  J theta'' + b theta' = (Kp + Kd s) (r - theta)\nx = ${statement}`,
    );
    expect(result('x').formula).toBe(formula);
  });

  test('a derivative is that of the differences', () => {
    const { result } = evaluateCell(`${SERVO}
d = derivative(dc_gain(az(w -> theta)), Kp)
q = dc_gain(az(w -> theta)) with Kp is 6.001 N m/rad
p = dc_gain(az(w -> theta)) with Kp is 5.999 N m/rad`);
    const [d, q, p] = ['d', 'q', 'p'].map((name) => result(name).value as number);
    expect(d).toBeCloseTo((q - p) / 0.002, 7);
  });
});
