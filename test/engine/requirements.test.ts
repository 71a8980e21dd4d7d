import { describe, expect, test } from 'vitest';
import { FUNCTIONS } from '../../src/functions/index.ts';
import { evaluateCell } from './worksheet.ts';

const LENGTHS = `
a is 2 m ± 10 %
b is 3 m ± 0.5 m
k is 5 N/m
F is 20 N
x1 = a + b
x2 = F/k
`;

const verdictOf = (requirement: string) => {
  const cell = evaluateCell(`${LENGTHS}require ${requirement}`);
  expect(cell.problems).toEqual([]);
  return cell.report.requirements[0].content;
};

describe('a requirement', () => {
  test('is quoted as typed, with its comment as its label', () => {
    const { report } = evaluateCell(`${LENGTHS}require   x1   <= 6 m   # R-1 long enough
require x1 <= 6 m`);
    expect(
      report.requirements.map(({ line, content }) => [line, content.label, content.text]),
    ).toEqual([
      [9, 'R-1 long enough', 'x1   <= 6 m'],
      [10, null, 'x1 <= 6 m'],
    ]);
  });

  test('is met where it holds over all tolerances', () => {
    expect(verdictOf('x1 <= 6000 mm')).toMatchObject({
      verdict: 'met',
      limit: 6000,
      unit: 'mm',
      operator: '<=',
      how: 'corners',
      n: null,
      at: { a: 2.2, b: 3.5 },
    });
    expect(verdictOf('x1 <= 6000 mm').nominal).toBeCloseTo(5000, 9);
    expect(verdictOf('x1 <= 6000 mm').worst).toBeCloseTo(5700, 9);
  });

  test('without tolerances behind it is proved by its one point', () => {
    expect(verdictOf('x2 <= 4 m')).toMatchObject({
      verdict: 'met',
      nominal: 4,
      worst: 4,
      limit: 4,
      how: 'proved',
      n: null,
      at: null,
    });
    expect(verdictOf('x2 < 4 m').verdict).toBe('not met');
    expect(verdictOf('x2 >= 4 m').verdict).toBe('met');
    expect(verdictOf('x2 = 4 m').verdict).toBe('met');
  });

  test.each([
    ['x1 <= 5 m', 'met at nominal only', 5.7],
    ['x1 >= 4.5 m', 'met at nominal only', 4.3],
    ['x1 <= 4.9 m', 'not met', 5.7],
    ['x1 >= 4.3 m', 'met', 4.3],
  ])('%s is %s, by its worst point', (requirement, verdict, worst) => {
    const content = verdictOf(requirement);
    expect(content.verdict).toBe(verdict);
    expect(content.worst).toBeCloseTo(worst, 9);
  });

  test.each([
    ['x1 <= 6 m and x2 <= 4 m', 'met'],
    ['x1 <= 5.5 m and x2 <= 4 m', 'met at nominal only'],
    ['x1 <= 5.5 m or x2 <= 4 m', 'met'],
    ['not (x1 > 6 m)', 'met'],
    ['not (x1 > 4.9 m)', 'not met'],
    ['0 < x1 < 6 m', 'met'],
    ['a < b < 3.6 m', 'met'],
  ])('%s is %s, without numbers of its own', (requirement, verdict) => {
    expect(verdictOf(requirement)).toMatchObject({
      verdict,
      nominal: null,
      worst: null,
      limit: null,
    });
  });

  test('on what is not monotone is sampled, and says so', () => {
    const content = verdictOf('(a - 2 [m])^2 <= 0.1 m^2');
    expect(content).toMatchObject({ verdict: 'met', how: 'sampled', n: 2002 });
    expect(content.notes).toEqual(['met (sampled, n = 2002): looked at, not proved.']);
  });

  test('at its limit but for rounding is met, and strictly it is not', () => {
    // 2 · 1.1 + 3.5 is 5.7 on paper, and 5.7000000000000002 in doubles.
    expect(verdictOf('x1 <= 5.7 m').verdict).toBe('met');
    expect(verdictOf('x1 < 5.7 m').verdict).toBe('met at nominal only');
    const tenths = evaluateCell(
      'p is 0.1\nq is 0.2\nrequire p + q <= 0.3 # R-1\nrequire p + q > 0.3 # R-2',
    );
    expect(tenths.requirement('R-1').verdict).toBe('met');
    expect(tenths.requirement('R-2').verdict).toBe('not met');
  });

  test('with 0 as its limit needs no unit, with another bare limit it is an error with the fix', () => {
    expect(verdictOf('x1 > 0').verdict).toBe('met');
    const cell = evaluateCell(`${LENGTHS}require x1 < 6`);
    expect(cell.problems).toHaveLength(1);
    expect(cell.problems[0]).toContain('write `6 m`');
    expect(cell.report.requirements[0].content).toMatchObject({
      verdict: 'undecided',
      nominal: null,
    });
  });

  test('on a symbol without a value is undecided, shown reduced', () => {
    const cell = evaluateCell(`${LENGTHS}c is positive\nrequire -2 c <= 0 # R-1`);
    expect(cell.requirement('R-1').verdict).toBe('met');
    const open = evaluateCell('c has unit m\nrequire 2 c <= 4 m # R-1');
    expect(open.requirement('R-1')).toMatchObject({ verdict: 'undecided', nominal: null });
    expect(open.requirement('R-1').notes).toEqual(['c has no value; it holds if c <= 2.']);
  });

  test('that is no condition is an error', () => {
    const cell = evaluateCell(`${LENGTHS}require x1`);
    expect(cell.problems).toEqual([
      'error at ‹x1›: A requirement is a condition, such as `x <= 2 mrad` or `stable(az)`.',
    ]);
    expect(cell.report.requirements[0].content.verdict).toBe('undecided');
  });

  test('that waits for something in error says for what', () => {
    const cell = evaluateCell('x = 2 +\nrequire x <= 3 m # R-1');
    expect(cell.problems).toHaveLength(1);
    expect(cell.requirement('R-1')).toMatchObject({
      verdict: 'undecided',
      waitsFor: { name: 'x', line: 2 },
    });
  });

  test('on a function that is not built yet is undecided and says so', () => {
    const argument = { formula: 'opened(a, u)', signal: 'c.y' } as const;
    for (const { name, parameters, availability } of FUNCTIONS.values()) {
      const [{ takes }] = parameters;
      if (availability === 'now' || parameters.length > 1) continue;
      if (takes !== 'formula' && takes !== 'signal') continue;
      const call = `${name}(${argument[takes]})`;
      const cell = evaluateCell(`
K is 2 1/s
loop a driven by r
  u = K (r - y)
  y' = u
case c of a
  r = step(1)
require ${call} >= 0 # R-1`);
      expect(cell.problems).toEqual([`error at ‹${call}›: ${name} is not available yet.`]);
      expect(cell.requirement('R-1').verdict).toBe('undecided');
    }
  });

  test('whose gains follow the plant names them', () => {
    const lines = (Kp: string) => `
J is 2 kg m^2 ± 20 %
wc is 5 rad/s
Kp = ${Kp}
Kd is 14 N m s/rad
J, wc, Kd are positive
loop n driven by w
  J x'' = w - Kp x - Kd x'
case q of n
  w = step(3 N m)
x_ss = final(q.x)
require abs(x_ss) <= 0.07 rad # R-1`;
    const followed = evaluateCell(lines('J wc^2'));
    expect(followed.result('x_ss').notes).toContain(
      'Kp is computed from names with a tolerance and moves with them; a gain that is computed once is written with `nominal(…)`.',
    );
    expect(followed.requirement('R-1').verdict).toBe('met at nominal only');
    const held = evaluateCell(lines('nominal(J wc^2)'));
    expect(held.result('x_ss').notes.join(' ')).not.toContain('is computed from names');
    expect(held.requirement('R-1')).toMatchObject({ verdict: 'met' });
  });
});
