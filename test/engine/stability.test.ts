import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const RATES = 'a is 1 1/s\nk is 3 1/s\na, k are positive\n';

describe('an unstable mode that cancels', () => {
  test.each([
    ['in one equation', 'loop u driven by r\n  y = ((s - a)/(s + a)) (1/(s - a)) k r', 'k/(s + a)'],
    [
      'in two equations',
      'loop u driven by r\n  z = ((s - a)/(s + a)) r\n  y = (k/(s - a)) z',
      'k/(s + a)',
    ],
    [
      'between a controller and a plant inside a loop',
      'G = 1/(s - a)\nC = k (s - a)/(s + a)\nloop u driven by r\n  y = G C (r - y)',
      'k/(s + a + k)',
    ],
    [
      'in a definition of its own',
      'G = 1/(s - a)\nC = k (s - a)/(s + a)\nL = G C\nloop u driven by r\n  y = L (r - y)',
      'k/(s + a + k)',
    ],
  ])('%s is hidden in the transfer function and not in the verdicts', (_, loop, formula) => {
    const cell = evaluateCell(`${RATES}${loop}
case c of u
  r = step(1)
u(r -> y)
characteristic(u)
routh(u)
stable(u)
final(c.y)
require stable(u) # R-1`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('u(r').formula).toBe(formula);
    expect(cell.result('u(r').notes).toEqual(['It hides a mode at s = a.']);
    expect(cell.result('stable(u)')).toMatchObject({ value: false, formula: '1 < 0' });
    expect(cell.result('routh').parts).toMatchObject({ conditions: ['1 < 0'] });
    expect(cell.result('final').value).toBeNull();
    expect(cell.result('final').notes.at(-1)).toContain('a pole in the right half plane');
    expect(cell.requirement('R-1')).toMatchObject({
      verdict: 'not met',
      notes: [
        'At the nominal or at the worst point the block of y has a root outside the open left half plane, s = 1.',
      ],
    });
  });

  test('is a hidden integrator where it lies at s = 0', () => {
    const cell = evaluateCell(`${RATES}loop u driven by r
  z = (s/(s + k)) r
  y = (k/s) z
case c of u
  r = step(1)
u(r -> y)
stable(u)
stable(u, z)
final(c.y)
final(c.z)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('u(r').notes).toEqual(['It hides a mode at s = 0.']);
    expect(cell.result('stable(u)').value).toBe(false);
    expect(cell.result('stable(u, z)').value).toBe(true);
    expect(cell.result('final(c.y)').value).toBeNull();
    expect(cell.result('final(c.y)').notes).toEqual([
      'No value: the part of the loop with y hides a mode at s = 0, which does not decay',
    ]);
    expect(cell.result('final(c.z)').value).toBe(0);
  });

  test('is harmless where it is stable, and is said all the same', () => {
    const cell = evaluateCell(`${RATES}loop u driven by r, d
  v = (k/(s + a)) (r - y)
  y = ((s + a)/(s - 2 a)) (v + d)
case c of u
  r = step(2)
u(r -> y)
stable(u)
final(c.y)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('u(r').notes).toEqual(['It hides a mode at s = -a.']);
    expect(cell.result('stable(u)')).toMatchObject({ value: true, formula: 'k > 2 a' });
    expect(cell.result('final').value).toBe(6);
  });
});

describe('stability', () => {
  test('is judged block by block, and the block at fault is named', () => {
    const cell = evaluateCell(`${RATES}loop b driven by r, w
  y' = k (r - y)
  e = r - y
  z' = e + w
case c of b
  r = step(1)
case d of b
  w = step(2)
stable(b)
stable(b, e)
stable(b, z)
final(c.e)
final(c.z)
final(d.e)
final(d.z)
require stable(b) # R-1
require stable(b, e) # R-2`);
    expect(cell.problems).toEqual([]);
    const values = ['stable(b)', 'stable(b, e)', 'stable(b, z)'].map((s) => cell.result(s).value);
    expect(values).toEqual([false, true, false]);
    expect(cell.result('final(c.e)').value).toBe(0);
    expect(cell.result('final(d.e)').value).toBe(0);
    expect(cell.result('final(c.z)').value).toBeNull();
    expect(cell.result('final(d.z)').parts).toEqual({ growth: { rate: '2', power: 1 } });
    expect(cell.requirement('R-1').notes).toEqual([
      'At the nominal or at the worst point the block of z has a root outside the open left half plane, s = 0.',
    ]);
    expect(cell.requirement('R-2').verdict).toBe('met');
  });

  test('names the place of a pole pair on the axis', () => {
    const cell = evaluateCell(`
loop o driven by w
  x'' = w - 4 x
case c of o
  w = step(1)
final(c.x)
stable(o)
require stable(o) # R-1`);
    expect(cell.result('final').notes).toEqual([
      'No value: the part of the loop with x has poles at s = ± 2 j on the imaginary axis',
    ]);
    expect(cell.result('stable').value).toBe(false);
    expect(cell.requirement('R-1').notes[0]).toContain('s = 2 j, -2 j');
  });

  test('of a polynomial that is negative throughout is that of its opposite', () => {
    const cell = evaluateCell(`
a, b, c are positive
loop n driven by w
  -a x'' - b x' - c x = w
stable(n)
routh(n)
stable(-s^2 - 3 s - 1)
stable(-s^2 + 3 s - 1)
stable(c - a s - b s^2)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('stable(n)').formula).toBe('1 > 0');
    expect(cell.result('routh').parts).toMatchObject({ conditions: [] });
    expect(cell.result('stable(-s^2 - 3').value).toBe(true);
    expect(cell.result('stable(-s^2 + 3').value).toBe(false);
    expect(cell.result('stable(c').formula).toBe('1 < 0');
  });

  test('with a leading coefficient of unknown sign asks for one sign throughout', () => {
    const cell = evaluateCell(`
a is -2
loop n driven by w
  a x'' - 3 x' - x = w
stable(n)
routh(n)`);
    expect(cell.result('stable')).toMatchObject({ formula: 'a < 0', value: true });
    expect(cell.result('routh').notes[0]).toContain(
      'the sign of the coefficient of s^2 is not known',
    );
  });

  test('of numbers, of zero and of what is no polynomial', () => {
    const cell = evaluateCell(`
k is 3 1/s
stable(7)
stable(s)
stable(0)
stable(1/(s + k))`);
    expect(cell.result('stable(7)').value).toBe(true);
    expect(cell.result('stable(s)').value).toBe(false);
    expect(cell.problems).toEqual([
      'error at ‹stable(0)›: the polynomial is zero: every s is a root.',
      'error at ‹stable(1/(s + k))›: stable takes a polynomial in s, and this has s in its denominator; take `denominator(…)` of a transfer function.',
    ]);
  });

  test('of a worksheet without values is undecided, shown reduced', () => {
    const cell = evaluateCell(`
J, Kd are positive
Kp, Ki are real
loop p driven by r
  J x'' = (Kp + Ki/s + Kd s) (r - x)
stable(p)
require stable(p) # R-1`);
    expect(cell.result('stable')).toMatchObject({
      formula: 'Ki > 0 and Kd Kp > J Ki',
      value: null,
    });
    expect(cell.requirement('R-1')).toMatchObject({
      verdict: 'undecided',
      nominal: null,
      at: null,
    });
    expect(cell.requirement('R-1').notes[0]).toContain('it holds if Ki > 0 and Kd Kp > J Ki.');
  });

  test('conditions shared by several blocks stand once', () => {
    const cell = evaluateCell(`
J is 2 kg m^2
c is 1 N m s/rad
k is 3 N m/rad
J is positive
loop two driven by r
  J x'' + c x' + k x = r
  J y'' + c y' + k y = k x
stable(two)`);
    expect(cell.result('stable').formula).toBe('k > 0 and c > 0');
  });
});

describe('`routh` in a worksheet', () => {
  test('says its special cases in the words of the contract', () => {
    const notesOf = (p: string) => evaluateCell(`routh(${p})`).result('routh').notes.join(' ');
    expect(notesOf('s^4 + s^3 + 2 s^2 + 2 s + 5')).toContain('zero first element');
    expect(notesOf('s^4 + 3 s^3 + 30 s^2 + 30 s + 200')).toContain('zero row');
    expect(notesOf('s^3 + 2 s^2 + 3 s')).toContain('a root at the origin');
  });

  test('drops factors of known sign, and solves for the gain that is tuned', () => {
    const lines = `
J is 2 kg m^2
b is 1 N m s/rad
Kp is 3 N m/rad
Ki is 1 N m/(rad s)
Kd is 2 N m s/rad
J, b, Kp, Ki, Kd are positive
loop p driven by r
  J x'' + b x' = (Kp + Ki/s + Kd s) (r - x)
routh(p)`;
    const conditions = (tuned: string) =>
      (evaluateCell(`${lines}\n${tuned}`).result('routh').parts as { conditions: string[] })
        .conditions;
    expect(conditions('tune Ki from 0 to 9 N m/(rad s)')).toEqual(['Ki < Kp (b + Kd)/J']);
    expect(conditions('tune Kp from 0 to 9 N m/rad')).toEqual(['Kp > J Ki/(b + Kd)']);
  });
});

describe('signs', () => {
  const lines = `
J is 2 kg m^2
Kd is 4 N m s/rad
Ki is 1 N m/(rad s)
Kp is 3 N m/rad
tune Kp from 1 to 10 N m/rad
loop body driven by r
  J theta'' = (Kp + Ki/s + Kd s) (r - theta)
routh(body)
stable(body)`;

  test('that simplified a condition are said beside it', () => {
    const { result } = evaluateCell(`J, Kd, Ki are positive${lines}`);
    for (const statement of ['routh(body)', 'stable(body)'])
      expect(result(statement).notes).toEqual(['It uses that J, Kd and Ki are positive.']);
  });

  test('that nobody stated are not used, even where the numbers have them', () => {
    const { result } = evaluateCell(lines);
    expect(result('stable(body)').formula).toBe('J Kd > 0 and J Ki > 0 and Kd Kp > J Ki');
    expect(result('stable(body)').notes).toEqual([]);
    expect(result('stable(body)').value).toBe(true);
  });
});
