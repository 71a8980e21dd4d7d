import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

interface StepCase {
  readonly id: string;
  readonly num: readonly number[];
  readonly den: readonly number[];
  readonly expect: Readonly<Record<string, { readonly value: number; readonly within: number }>>;
  readonly source: string;
  readonly how: string;
}

const CASES: readonly StepCase[] = JSON.parse(
  readFileSync(new URL('../data/step-figures.json', import.meta.url), 'utf8'),
);

const polynomial = (descending: readonly number[]): string =>
  descending.map((c, k) => `(${c}) * s^${descending.length - 1 - k}`).join(' + ');

describe('figures of a unit step agree with published ones', () => {
  test.each(CASES.map((c) => [`${c.id} (${c.source}; ${c.how})`, c] as const))('%s', (_, c) => {
    const cell = evaluateCell(`H = (${polynomial(c.num)})/(${polynomial(c.den)})
step_peak_time = peak_time(H/s)
step_peak = peak(H/s)
step_overshoot = overshoot(H/s)
step_rise_time = rise_time(H/s)
step_settling_2 = settling_time(H/s, 2 %)
step_settling_5 = settling_time(H/s, 5 %)
step_peak_gain = peak_gain(H)
step_bandwidth = bandwidth(H)`);
    for (const [name, { value, within }] of Object.entries(c.expect)) {
      const own = cell.result(`step_${name}`).value as number;
      expect(Math.abs(own - value), `${name} is ${own}`).toBeLessThanOrEqual(within);
    }
  });
});

const DRIVE = `J is 480 kg m^2
Kp is 9 kN m/rad
Kd is 4.1 kN m s/rad
J, Kp, Kd are positive
loop az driven by r, w
  J theta'' = T + w
  T = Kp (r - theta) - Kd theta'
`;

describe('a figure of a signal in a load case', () => {
  test('sees sources that begin later', () => {
    const cell = evaluateCell(`${DRIVE}case gust of az
  w = step(100 N m) after 5 s - step(100 N m) after 6 s
settling_time(gust.theta, 0.1 mrad)
peak_time(gust.theta)`);
    expect(cell.result('peak_time').value).toBeGreaterThan(6);
    expect(cell.result('settling_time').value).toBeGreaterThan(6);
  });

  test('sees initial values', () => {
    const cell = evaluateCell(`${DRIVE}case kick of az
  theta starts at 3 mrad
peak(kick.theta)
peak_time(kick.theta)`);
    expect(cell.result('peak(').value).toBeCloseTo(3e-3, 12);
    expect(cell.result('peak_time').value).toBe(0);
  });

  test('whose final value is 0 needs a band with a unit, and says so', () => {
    const cell = evaluateCell(`${DRIVE}case kick of az
  w = impulse(20 N m s)
settling_time(kick.theta, 2 %)
overshoot(kick.theta)`);
    expect(cell.result('settling_time').notes).toContain(
      'No value at the nominal: its final value is 0; give the band as a quantity, such as 0.1 mrad.',
    );
    expect(cell.result('overshoot').value).toBeNull();
    expect(cell.problems).toEqual([]);
  });

  test('with a band in a unit is written so that it is read again', () => {
    const kick = `${DRIVE}case kick of az\n  w = impulse(20 N m s)\n`;
    const first = evaluateCell(`${kick}x = settling_time(kick.theta, 0.1 mrad)`).result('x');
    const again = evaluateCell(`${kick}x = ${first.formula}`);
    expect(again.problems).toEqual([]);
    expect(again.result('x').value).toBe(first.value);
    expect(first.value).toBeGreaterThan(0.5);
  });

  test('that grows or keeps moving is refused with the reason', () => {
    const cell = evaluateCell(`${DRIVE}case run of az
  w = ramp(3 N m/s)
case shake of az
  w = sine(3 N m, 2 Hz)
peak(run.theta)
rise_time(shake.theta)`);
    expect(cell.result('peak').notes[0]).toContain('grows without bound');
    expect(cell.result('rise_time').notes.join(' ')).toContain('the sine in w keeps it moving');
  });
});
