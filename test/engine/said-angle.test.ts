import { describe, expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

describe('frequencies of a spring and a mass', () => {
  const { result, problems } = evaluateCell(`
k is 22 kN/m
m is 14 kg
omega = sqrt(k/m) in rad/s
f = omega/(2 pi) in Hz
T = 2 pi/omega in ms
direct = sqrt(k/m)/(2 pi) in Hz`);
  const omega = Math.sqrt(22000 / 14);

  it('is an angular frequency where it is shown in rad/s', () => {
    expect(problems).toEqual([]);
    expect(result('omega')).toMatchObject({ unit: 'rad/s', shown: '39.64 rad/s' });
  });

  it.each(['f', 'direct'])('%s, divided by 2 pi in the formula, is not divided again', (name) => {
    expect(result(name).value).toBeCloseTo(omega / (2 * Math.PI), 10);
    expect(result(name)).toMatchObject({ unit: 'Hz', shown: '6.309 Hz' });
    expect(result(name).notes).toEqual([]);
  });

  it('gives a period in seconds', () => {
    expect(result('T')).toMatchObject({ shown: '158.5 ms' });
  });
});

it('a stiffness computed from a rate carries the unit that it is shown in', () => {
  const { result } = evaluateCell('J is 0.85 kg m^2\nw is 14 rad/s\nKp = J w^2 in N m/rad');
  expect(result('Kp')).toMatchObject({ unit: 'N m/rad', shown: '166.6 N m/rad' });
});

it('only names in the equations of a loop are told to move with a tolerance', () => {
  const { result } = evaluateCell(`
J is 2 kg m^2 ± 10 %
w is 3 rad/s
Kp = J w^2
loop az driven by T
  J th'' + 2 J w th' + Kp th = T
case a of az
  T = step(1 [N m])
side = 2 J
x = final(a.th) side`);
  expect(result('x').notes.filter((note) => note.includes('moves with'))).toEqual([
    'Kp is computed from names with a tolerance and moves with them; a gain that is computed once is written with `nominal(…)`.',
  ]);
});

it.each([
  ['J w^2', 'N m', '166.6 N m'],
  ['d/(2 sqrt(k J))', null, '0.1'],
  ['sqrt(k/J)', '1/s', null],
  ['k phi', 'N m', null],
  ['w t1', 'rad', '28 rad'],
  ['phi/t1^2', 'rad/s²', null],
])('%s is shown without odd powers of rad', (formula, unit, shown) => {
  const { result } = evaluateCell(`
J is 0.85 kg m^2
w is 14 rad/s
k is 85 N m/rad
phi is 0.3 rad
t1 is 2 s
d is ${2 * 0.1 * Math.sqrt(85 * 0.85)} N m s/rad
x = ${formula}`);
  expect(result('x').unit).toBe(unit);
  if (shown !== null) expect(result('x').shown).toBe(shown);
});
