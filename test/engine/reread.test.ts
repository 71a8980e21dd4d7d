import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

/** A worksheet whose results are all derived forms. */
const SHEET = `
J is 480 kg m^2 ± 8 %
b is 35 N m s/rad
Tw is 260 N m from 0 to 400 N m
Kp is 9 kN m/rad
Kd is 4.1 kN m s/rad
Ki is 6 kN m/(rad s)
Td is 50 ms
wc is 3 rad/s
z1 is 0.7
Rr is 2 mrad/s
T1 is 3 s
J, b, Kp, Kd, Ki, Td, wc, T1 are positive
C = Kp + Ki/s + Kd s
K2 = nominal(J wc^2)
loop az driven by r, w
  J theta'' + b theta' = T + w
  T = C (r - theta)
  e = r - theta
loop late driven by r
  u = K2 (r - x)
  J x'' + b x' = delay(Td) u
case storm of az
  w = step(Tw)
  r = ramp(Rr) after T1
case push of az
  w = impulse(3 N m s)`;

const FORMULAS = [
  'az(w -> e)',
  "az(r -> theta')",
  'late(r -> x)',
  'opened(az, T)',
  'opened(late, u)',
  'characteristic(az)',
  'characteristic(late)',
  'final(storm.e) with Ki is 0 N m/(rad s)',
  "initial(push.theta')",
  'expand(numerator(az(r -> e)))',
  'derivative(az(w -> e), Kp)',
  'coefficient(characteristic(az), s, 2)',
  'dc_gain(az(r -> theta))',
  'limit(s az(w -> e) as s to infinity)',
  'rational_delay(Td, 3)',
  'sqrt(K2/J) Td^2 + (abs(b - Kd)/Kd) Td',
  'exp(-wc Td) + sin(wc Td)^2',
  'solve(Kp b = Ki J, Kp)',
  'K2',
  'in_full(K2/Kp)',
];

const CONDITIONS = [
  'stable(az)',
  'stable(az, e)',
  'stable(late)',
  'solve(stable(az), Ki)',
  'Kp > 8 [kN m/rad] and not (Kd > Kp Td)',
  'J < 3 [kg m^2] or b > 0',
];

describe('the formula of a result is read back by the worksheet language', () => {
  const first = evaluateCell(`${SHEET}\n${[...FORMULAS, ...CONDITIONS].join('\n')}`);

  test('without a problem to begin with', () => {
    expect(first.problems).toEqual([]);
  });

  test.each(FORMULAS)('as an equal one: %s', (statement) => {
    const { formula, value } = first.result(statement);
    expect(formula).not.toBeNull();
    const again = evaluateCell(`${SHEET}\nq1 = same(${formula}, ${statement})\nq2 = ${formula}`);
    expect(again.problems.filter((problem) => problem.startsWith('error'))).toEqual([]);
    expect(again.result('q1').value, formula!).toBe(true);
    expect(again.result('q2').formula).toBe(formula);
    if (typeof value === 'number') {
      const margin = 1e-12 * Math.abs(value);
      expect(Math.abs(Number(again.result('q2').value) - value)).toBeLessThanOrEqual(margin);
    }
  });

  test.each(CONDITIONS)('as one that holds alike: %s', (statement) => {
    const { formula, value } = first.result(statement);
    const again = evaluateCell(`${SHEET}\nq2 = ${formula}`);
    expect(again.problems).toEqual([]);
    expect(again.result('q2').value).toBe(value);
    expect(again.result('q2').formula).toBe(formula);
  });

  test('as a matrix where it is a Routh array', () => {
    const { formula, parts } = evaluateCell(`${SHEET}\nrouth(az)`).result('routh');
    const again = evaluateCell(`${SHEET}\nq2 = ${formula}`);
    expect(again.problems).toEqual([]);
    const { rows } = again.result('q2').parts as { rows: string[][] };
    expect(rows.map(([head]) => head)).toEqual(
      (parts as { rows: string[][] }).rows.map(([head]) => head),
    );
  });
});
