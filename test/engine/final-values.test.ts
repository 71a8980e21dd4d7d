import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const SERVO = `
K is 2 1/s
R is 3 mm/s
P is 2 mm/s^2
K is positive
loop a driven by r
  y' = K (r - y)
  e = r - y
  sum' = e
case c of a
  r = ramp(R)
case d of a
  r = parabola(P)
case k of a
  r = impulse(3 m s)
`;

describe('a final value', () => {
  test('is given in symbols, as a number with its unit', () => {
    const { result } = evaluateCell(`${SERVO}x = final(c.e) in mm`);
    expect(result('x')).toMatchObject({ formula: 'R/K', unit: 'm', shown: '1.5 mm' });
    expect(result('x').value).toBeCloseTo(1.5e-3, 15);
  });

  test('carries the conditions under which it stands', () => {
    const { result } = evaluateCell(`
m is 2 kg
b, k are real
F is 3 N
loop a driven by w
  m x'' + b x' + k x = w
case c of a
  w = step(F)
x_ss = final(c.x)`);
    expect(result('x_ss')).toMatchObject({ formula: 'F/k', value: null });
    expect(result('x_ss').notes).toEqual([
      'Provided that m k > 0 and m b > 0.',
      'No number: k, b have no value.',
    ]);
  });

  test.each([
    ['c.y', 'R', 1, 'No value: grows without bound, as t (rate R)', 'the rate is 3 mm/s.'],
    ['c.sum', 'R/K', 1, 'No value: grows without bound, as t (rate R/K)', 'the rate is 1.5 mm.'],
    ['d.e', 'P/K', 1, 'No value: grows without bound, as t (rate P/K)', 'the rate is 1 mm/s.'],
    [
      'd.y',
      'P',
      2,
      'No value: grows without bound, as t^2 (its derivative of order 2 goes to P)',
      'that derivative is 2 mm/s².',
    ],
  ])('of %s does not exist, and how it grows is said', (signal, rate, power, note, number) => {
    const { problems, result } = evaluateCell(`${SERVO}x = final(${signal})\nu = 2 x\nv = abs(x)`);
    expect(problems).toEqual([]);
    expect(result('x')).toMatchObject({
      value: null,
      span: null,
      parts: { growth: { rate, power } },
    });
    expect(result('x').notes).toEqual([note, `At the nominal values ${number}`]);
    expect(result('u').value).toBeNull();
    expect(result('v').value).toBeNull();
  });

  test('that does not exist leaves its requirement not met, whatever the direction', () => {
    const { requirement } = evaluateCell(`${SERVO}z = final(d.e)
require z <= 3 mm # R-1
require z >= 3 mm # R-2
require not (z >= 3 mm) # R-3
require z >= 3 mm or K > 0 1/s # R-4`);
    for (const label of ['R-1', 'R-2', 'R-3', 'R-4']) {
      expect(requirement(label)).toMatchObject({
        verdict: 'not met',
        nominal: null,
        notes: ['No value: grows without bound, as t (rate P/K)'],
      });
    }
  });

  test('of a transform is found with its own poles, and the reading is said', () => {
    const { problems, result } = evaluateCell(`
K is 2 1/s
K is positive
p = final((K - 5 [1/s])/(s (s + K)))
q = final(1/s^2)
u = final(1/(s^2 + 4))
v = final(1/(s - 1))
w = final(delay(2 s)/s)
x = final(1/(s (s^2 + K s - 1)))`);
    expect(problems).toEqual([]);
    expect(result('p')).toMatchObject({ formula: '(K - 5)/K', value: -1.5 });
    expect(result('p').notes).toEqual([
      '`(K - 5 [1/s])/(s (s + K))` is taken as the transform of a signal.',
    ]);
    expect(result('q').notes.at(-2)).toBe('No value: grows without bound, as t (rate 1)');
    expect(result('u').notes.at(-1)).toBe(
      'No value: the transform has poles at s = ± 2 j on the imaginary axis',
    );
    expect(result('v').notes.at(-1)).toBe(
      'No value: the transform has a pole at s = 1 in the right half plane',
    );
    expect(result('w').value).toBe(1);
    expect(result('x').value).toBeNull();
  });

  test('of a transfer function is refused with the ways out', () => {
    const { problems, result } = evaluateCell(`${SERVO}H = a(r -> e)
final(a(r -> e))
final(H)
initial(H)
response(H)
p = dc_gain(H)
q = final(H/s)`);
    expect(problems).toHaveLength(4);
    expect(problems[1]).toBe(
      'error at ‹H›: final takes a signal, and `H` is a transfer function. For its gain at rest write `dc_gain(H)`, for its response to a unit step `final(H/s)`, or name a signal of a load case.',
    );
    expect(result('p').value).toBe(0);
    expect(result('q').value).toBe(0);
  });

  test('where the nominal is unstable has the block at fault and its place', () => {
    const { result } =
      evaluateCell(`${SERVO.replace('K is positive\n', '').replace('2 1/s', '-2 1/s')}
x = final(c.e)
u = final(d.e)`);
    for (const name of ['x', 'u']) {
      expect(result(name).value).toBeNull();
      expect(result(name).notes.join(' ')).toContain(
        'the block of y has a root outside the open left half plane, s = 2',
      );
    }
  });
});

describe('an initial value', () => {
  test('is that just after t = 0, with an impulse there said', () => {
    const { problems, result } = evaluateCell(`${SERVO}p = initial(k.y)
q = initial(k.e)
u = final(k.y)
v = initial(c.y')
w = initial(K/(s + K))
x = initial((s + 1)/(s + 2))
z = initial(1/s^2)`);
    expect(problems).toEqual([]);
    expect(result('p')).toMatchObject({ formula: '3 K', value: 6 });
    expect(result('q').notes).toEqual(['No value: an impulse at t = 0, from r']);
    expect(result('u').value).toBe(0);
    expect(result('v').value).toBe(0);
    expect(result('w').value).toBe(2);
    expect(result('x').notes.at(-1)).toBe('No value: an impulse at t = 0, from the transform');
    expect(result('z').value).toBe(0);
  });
});

describe('system type and error constants', () => {
  test('are those of the loop gain in lowest terms, with what does not exist said', () => {
    const { problems, result } = evaluateCell(`
K is 8
T is 0.5 s
a is 3 1/s
K, T, a are positive
loop v driven by r
  m = r - y
  y = (K a/(s (T s + 1))) m
L = opened(v, m)
p = system_type(L)
q = error_constants(L)
u = q.velocity
w = q.position`);
    expect(result('p').value).toBe(1);
    expect(result('q').parts).toMatchObject({
      items: [
        { name: 'position', value: null, reason: 'infinite: a pole at s = 0' },
        { name: 'velocity', formula: 'K a', value: 24 },
        { name: 'acceleration', value: 0 },
      ],
    });
    expect(result('u').value).toBe(24);
    expect(result('w').notes).toContain('No value: infinite: a pole at s = 0');
    expect(problems).toEqual([]);
  });
});
