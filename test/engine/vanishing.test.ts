import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

/** A rigid body under three-term control and a steady torque, with the integral gain as given. */
const body = (Ki: string, statements: string) => `
J is 480 kg m^2
Tw is 260 N m ± 10 %
Kp is 9 kN m/rad
Kd is 4 kN m s/rad
Ki is ${Ki}
J, Kp, Kd are positive
loop az driven by w
  J theta'' = w - (Kp + Ki/s + Kd s) theta
case c of az
  w = step(Tw)
e_ss = final(c.theta) in mrad
${statements}`;

const twoTerm = 260 / 9000;

describe('a gain that is exactly 0', () => {
  test('by assumption gives the steady error without the integral term, and says so', () => {
    const cell = evaluateCell(body('0 N m/(rad s)', 'stable(az)\nrouth(az)'));
    const result = cell.result('e_ss');
    expect(result.formula).toBe('0');
    expect(result.value).toBeCloseTo(twoTerm, 12);
    expect(result.notes).toContain('With Ki = 0 derived anew: Tw/Kp.');
    expect(result.span).toMatchObject({ how: 'corners' });
    expect(result.span!.low).toBeCloseTo(0.9 * twoTerm, 12);
    expect(result.span!.high).toBeCloseTo(1.1 * twoTerm, 12);
    expect(cell.result('stable(az)').value).toBe(true);
    expect(cell.result('stable(az)').notes).toContain('With Ki = 0 derived anew: it always holds.');
    expect(cell.result('routh(az)').notes).toContain(
      'With Ki = 0 derived anew: rows(J, Kp | Kd, 0 | Kp, 0).',
    );
  });

  test('by `with` gives the steady error of two-term control', () => {
    const cell = evaluateCell(body('6 N m/(rad s)', 'e_2 = e_ss with Ki is 0 N m/(rad s)'));
    expect(cell.result('e_ss')).toMatchObject({ formula: '0', value: 0 });
    expect(cell.result('e_2').formula).toBe('Tw/Kp');
    expect(cell.result('e_2').value).toBeCloseTo(twoTerm, 12);
  });

  test('at an end of a range is judged as two-term control there', () => {
    const cell = evaluateCell(
      body(
        '1 N m/(rad s) from 0 to 2 N m/(rad s)',
        'require abs(e_ss) <= 30 mrad # R-1\nrequire abs(e_ss) <= 20 mrad # R-2\nrequire stable(az) # R-3',
      ),
    );
    expect(cell.result('e_ss').value).toBe(0);
    expect(cell.result('e_ss').span!.high).toBeCloseTo(1.1 * twoTerm, 12);
    expect(cell.requirement('R-1')).toMatchObject({ verdict: 'met at nominal only', nominal: 0 });
    expect(cell.requirement('R-1').worst).toBeCloseTo(1100 * twoTerm, 9);
    expect(cell.requirement('R-2')).toMatchObject({
      verdict: 'met at nominal only',
      at: { Tw: 286, Ki: 0 },
    });
    expect(cell.requirement('R-3').verdict).toBe('met');
  });
});

describe('a characteristic polynomial whose degree drops', () => {
  const mass = (m: string, statements: string) => `
m is ${m}
c is 2 N s/m
k is 3 N/m
F is 6 N
c, k are positive
loop a driven by w
  m x'' + c x' + k x = w
case q of a
  w = step(F)
${statements}`;

  test('is judged by its lower degree, and the condition that does not apply is taken back', () => {
    const cell = evaluateCell(
      mass('0 kg', 'stable(a)\nfinal(q.x)\nrequire stable(a) # R-1\nresponse(q.x)'),
    );
    const stable = cell.result('stable(a)');
    expect(stable).toMatchObject({ formula: 'm > 0', value: true });
    expect(stable.notes).toContain('With m = 0 derived anew: it always holds.');
    expect(cell.requirement('R-1').verdict).toBe('met');
    expect(cell.result('final(q.x)').value).toBe(2);
    expect(cell.result('final(q.x)').notes).toContain('With m = 0 derived anew: F/k.');
    expect(cell.result('response').notes).toContain(
      'With m = 0 derived anew: F/k - F exp(-k t/c)/k.',
    );
  });

  test('at an end of a range is judged there too', () => {
    const cell = evaluateCell(
      mass('1 kg from 0 to 2 kg', 'require stable(a) # R-1\nrequire final(q.x) <= 2.1 [m] # R-2'),
    );
    expect(cell.requirement('R-1')).toMatchObject({ verdict: 'met', how: 'corners' });
    expect(cell.requirement('R-2')).toMatchObject({ verdict: 'met', worst: 2 });
  });
});

describe('a condition of existence', () => {
  test('travels through functions of the value', () => {
    const cell = evaluateCell(`
m0 is 1 kg
c is 2 N s/m
k is 5 N/m ± 10 %
q is 4 N/m from 3 to 6 N/m
F is 1 N
loop a driven by w
  m0 x'' + c x' + (k - q) x = w
case d of a
  w = step(F)
x_ss = final(d.x)
require abs(x_ss) <= 20 mm
require abs(x_ss) >= 1 mm # R-2
require sqrt(x_ss^2) >= 1 mm # R-3
require max(x_ss, 2 [mm]) >= 1 mm # R-4
x_size = abs(x_ss)`);
    expect(cell.problems).toEqual([]);
    for (const label of ['R-2', 'R-3', 'R-4'])
      expect(cell.requirement(label)).toMatchObject({ verdict: 'met at nominal only' });
    expect(cell.result('x_size').span).toBeNull();
    expect(cell.result('x_size').notes.at(-1)).toContain('No span: the value does not exist at ');
  });
});
