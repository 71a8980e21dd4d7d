import { describe, expect, test } from 'vitest';
import { afterFix, evaluateCell } from './worksheet.ts';

/** A first-order loop with two inputs, and further statements. */
const loop = (statements: string) => `
K is 2 1/s
A is 3 m
K is positive
loop a driven by r, w
  y' = K (r - y) + w
  e = r - y
${statements}`;

const resultsOf = (statements: string, ...names: string[]) => {
  const cell = evaluateCell(loop(statements));
  expect(cell.problems).toEqual([]);
  return names.map((name) => cell.result(name).value);
};

describe('a load case', () => {
  test('adds and subtracts sources, with factors, and inputs that are not named are zero', () => {
    const values = resultsOf(
      `case c of a
  r = 2 step(A) + step(1 m) - 1/2 step(A)
case d of a
  w = -step(4 m/s)
p = final(c.y)
q = final(d.y)
u = final(d.r)`,
      'p',
      'q',
      'u',
    );
    expect(values).toEqual([5.5, -2, 0]);
  });

  test('starts a source later with `after`, which binds tighter than +', () => {
    const cell = evaluateCell(
      loop(`case c of a
  r = step(A) + step(1 m) after 2 s
p = response(c.r) with t = 1 [s]
q = response(c.r) with t = 3 [s]
u = final(c.y)
v = initial(c.e)`),
    );
    expect(cell.problems).toEqual([]);
    expect(['p', 'q', 'u', 'v'].map((name) => cell.result(name).value)).toEqual([3, 4, 4, 3]);
  });

  test('has an end where growing sources cancel from a later time on', () => {
    const values = resultsOf(
      `case c of a
  r = ramp(2 m/s) - ramp(2 m/s) after 3 s
case d of a
  r = ramp(2 m/s) - ramp(2 m/s) after 3 s + step(1 m) after 5 s
p = final(c.y)
q = final(d.y)
u = final(c.e)`,
      'p',
      'q',
      'u',
    );
    expect(values).toEqual([6, 7, 0]);
  });

  test('takes an input by its derivative', () => {
    const values = resultsOf(
      `case c of a
  r' = step(2 m/s)
case d of a
  r' = impulse(2 m)
case f of a
  r'' = step(4 m/s^2)
p = final(c.e)
q = final(d.y)
u = final(f.e)`,
      'p',
      'q',
      'u',
    );
    expect(values).toEqual([1, 2, null]);
  });

  test('gives its signals, and their parts by kind and by input', () => {
    const cell = evaluateCell(
      loop(`case c of a
  r = step(A) + ramp(1 m/s)
  w = step(1 m/s)
c.e
constant(c.e)
drifting(c.e)
due(c.e, w)
periodic(c.e)
random(c.e)
p = final(constant(c.e))
q = final(drifting(c.e))
u = final(due(c.e, w))
v = final(c.e)`),
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('due').formula).toBe('-1/(s (s + K))');
    expect(cell.result('drifting').formula).toBe('1/(s (s + K))');
    expect(cell.result('periodic').formula).toBe('0');
    expect(cell.result('random').formula).toBe('0');
    expect(['p', 'q', 'u', 'v'].map((name) => cell.result(name).value)).toEqual([
      -0.5, 0.5, -0.5, 0,
    ]);
  });

  test('adds its signals to others', () => {
    const values = resultsOf(
      `case c of a
  r = step(A)
p = final(c.y + c.e)
q = final(c.y - 2 c.e)
u = final(c.y')`,
      'p',
      'q',
      'u',
    );
    expect(values).toEqual([3, 3, 0]);
  });

  test('with replacements in front of a signal is derived anew', () => {
    const values = resultsOf(
      `case c of a
  r = ramp(A/(1 [s]))
p = final(c.e)
q = final((c with K is 4 1/s).e)
u = final(c.e) with K is 4 1/s
v = final((c with (K is 4 1/s, A is 1 m)).e)
x = final(c.e) with K is 0 1/s`,
      'p',
      'q',
      'u',
      'v',
      'x',
    );
    expect(values).toEqual([1.5, 0.75, 0.75, 0.25, null]);
  });

  test.each([
    ['case c of a\n  q = step(A)', 'error at ‹q›: q is not an input of a; its inputs are r, w.'],
    ['case c of a\n  y = step(A)', 'error at ‹y›: y is not an input of a; its inputs are r, w.'],
    ['case c of b\n  r = step(A)', 'error at ‹b›: b is not a loop of this worksheet.'],
    [
      'case c of a\n  r = 5',
      'error at ‹5›: `5` is not a source; for a constant load write `step(…)`.',
    ],
    [
      'case c of a\n  r = step(A)\n  r = ramp(1 m/s)',
      'error at ‹r = ramp(1 m/s)›: r is given twice in c; add its sources in one line.',
    ],
    [
      'case c of a\n  y starts at 1 m\n  y starts at 2 m',
      'error at ‹y starts at 2 m›: y starts twice in c; keep one of the two lines.',
    ],
    [
      'case c of a\n  r starts at 1 m',
      'error at ‹r starts at 1 m›: r is an input of a; its value from t = 0 on is that of its source.',
    ],
    [
      "case c of a\n  y' starts at 1 m/s",
      "error at ‹y' starts at 1 m/s›: y' cannot start at a value of its own: no equation of a differentiates it 2 times with `'`.",
    ],
    [
      'case c of a\n  r = step(A) after -2 s',
      'error at ‹-2 s›: A source begins at t = 0 at the earliest.',
    ],
  ])('%s is a problem, and what needs it waits', (statements, problem) => {
    const cell = evaluateCell(loop(`${statements}\np = final(c.y)\nq = a(r -> y)`));
    expect(cell.problems).toEqual([problem]);
    expect(cell.result('p')).toMatchObject({
      state: 'error',
      value: null,
      waitsFor: { name: 'c' },
    });
    expect(cell.result('q').formula).toBe('K/(s + K)');
  });
});

describe('a source', () => {
  test('that does not exist is a problem that offers the nearest one', () => {
    const cell = loop('case c of a\n  r = stp(A)');
    expect(evaluateCell(cell).problems[0]).toContain('There is no source stp. Is step meant?');
    expect(evaluateCell(afterFix(cell, 'Write step')).problems).toEqual([]);
  });
});

describe('an initial condition', () => {
  const oscillator = (statements: string) => `
m1 is 2 kg
b is 4 N s/m
k is 10 N/m
m1, b, k are positive
loop a driven by w
  m1 x'' + b x' + k x = w
${statements}`;

  test('sets a signal and its derivative at t = 0', () => {
    const cell = evaluateCell(
      oscillator(`case c of a
  x starts at 3 mm
  x' starts at 8 mm/s
p = initial(c.x)
q = initial(c.x')
u = initial(c.x'')
v = final(c.x)
response(c.x)`),
    );
    expect(cell.problems).toEqual([]);
    const [p, q, u, v] = ['p', 'q', 'u', 'v'].map((name) => cell.result(name).value as number);
    expect(p).toBeCloseTo(3e-3, 15);
    expect(q).toBeCloseTo(8e-3, 15);
    // m x'' = -b x' - k x
    expect(u).toBeCloseTo((-4 * 8e-3 - 10 * 3e-3) / 2, 15);
    expect(v).toBe(0);
  });

  test('gives the free motion in closed form', () => {
    // x = e^(-t) (x0 cos 2t + (v0 + x0)/2 sin 2t) for m = 2, b = 4, k = 10.
    const cell = evaluateCell(
      oscillator(`case c of a
  x starts at 3 m
  x' starts at 8 m/s
y = response(c.x) with t = 0.7 [s]`),
    );
    const t = 0.7;
    expect(cell.result('y').value).toBeCloseTo(
      Math.exp(-t) * (3 * Math.cos(2 * t) + 5.5 * Math.sin(2 * t)),
      12,
    );
  });
});
