import { describe, expect, test } from 'vitest';
import { isRefusal } from '../../src/base/index.ts';
import { integrate } from '../../src/numeric/index.ts';
import { evaluateCell } from './worksheet.ts';

const MAST = `m is 12 kg
c is 90 N s/m
k is 7 kN/m
F1 is 4 N
f1 is 8 Hz
m, c, k, F1, f1 are positive
loop mast driven by F, G
  m x'' + c x' + k x = F + G`;

const mast = (lines: string): ReturnType<typeof evaluateCell> => evaluateCell(`${MAST}\n${lines}`);

function numberOf(cell: ReturnType<typeof evaluateCell>, name: string): number {
  const { value } = cell.result(name);
  if (typeof value !== 'number') throw new Error(`${name}: ${cell.result(name).notes.join(' ')}`);
  return value;
}

/** The amplitude of x for 4 N at the mast, in m. */
function atSpring(f: number): number {
  const w = 2 * Math.PI * f;
  return 4 / Math.hypot(7000 - 12 * w * w, 90 * w);
}

describe('a sine', () => {
  test('has an amplitude at its frequency in Hz', () => {
    const cell = mast('case run of mast\n  F = sine(F1, f1)\na = amplitude(run.x, f1)');
    expect(cell.problems).toEqual([]);
    expect(numberOf(cell, 'a')).toBeCloseTo(atSpring(8), 12);
    expect(cell.result('a').unit).toBe('m');
  });

  test('takes an angular frequency as one', () => {
    const cell = mast(
      'w1 is 50 rad/s\ncase run of mast\n  F = sine(F1, w1)\na = amplitude(run.x, w1)\nb = amplitude(run.x, 50 rad/s)',
    );
    expect(numberOf(cell, 'a')).toBeCloseTo(atSpring(50 / 2 / Math.PI), 12);
    expect(cell.problems).toEqual([
      'error at ‹amplitude(run.x, 50 rad/s)›: run.x has lines at w1 rad/s; write the frequency as the source does, so that it is certain which one is meant.',
    ]);
  });

  test('is the same whether its frequency is given in Hz or as 2 pi f', () => {
    const cell = mast(
      'case run of mast\n  F = sine(F1, 2 pi f1)\na = amplitude(run.x, f1)\nb = amplitude(run.x, 2 pi f1)',
    );
    expect(numberOf(cell, 'a')).toBeCloseTo(atSpring(8), 12);
    expect(numberOf(cell, 'b')).toBeCloseTo(atSpring(8), 12);
  });

  test('leaves no error behind a controller with the poles of its line', () => {
    const cell = evaluateCell(`J is 3 kg m^2
f1 is 2 Hz
Kd is 40 N m s/rad
Kp is 900 N m/rad
Kr is 20 N m/(rad s)
J, f1, Kd, Kp, Kr are positive
w1 = 2 pi f1
C = Kp + Kd s + Kr s/(s^2 + w1^2)
loop az driven by w
  J q'' = w - C q
case hum of az
  w = sine(5 N m, f1)
a = amplitude(hum.q, f1)`);
    expect(cell.problems).toEqual([]);
    expect(cell.result('a').formula).toBe('0');
    expect(numberOf(cell, 'a')).toBe(0);
  });

  test('beside another one has an amplitude where their frequencies differ, which is said', () => {
    const cell = mast(
      'case run of mast\n  F = sine(F1, f1) + sine(1 N, 3 Hz)\na = amplitude(run.x, f1)\nr = rms(run.x)',
    );
    expect(cell.result('a').notes).toEqual(['Provided that not (3 = f1).']);
    expect(cell.result('r').notes).toEqual(['Provided that not (f1 = 3).']);
    const square = atSpring(8) ** 2 + (atSpring(3) / 4) ** 2;
    expect(numberOf(cell, 'r')).toBeCloseTo(Math.sqrt(square / 2), 12);
  });

  test('does not settle, and is left out of the constant part', () => {
    const cell = mast(
      'case run of mast\n  F = step(14 N) + sine(F1, f1)\na = final(run.x)\nb = final(constant(run.x))',
    );
    expect(cell.result('a').notes).toContainEqual(
      expect.stringContaining('the sine in F keeps it moving'),
    );
    expect(numberOf(cell, 'b')).toBeCloseTo(14 / 7000, 12);
  });

  test.each([
    [
      'sine(4 N)',
      'sine takes two arguments: a line of amplitude A at the frequency f, with phase zero at t = 0.',
    ],
    ['sine(F1, 0 Hz)', 'The frequency of a sine is above 0.'],
    ['sine(F1, 3 s)', '`3 [s]` is in s, and a frequency is needed here.'],
    ['step(1 N) + sine(3 kg, f1)', 'The input F is in N, and `sine(3 [kg], f1)` gives kg.'],
  ])('%s is refused in words', (source, message) => {
    const cell = mast(`case run of mast\n  F = ${source}\nx1 = amplitude(run.x, f1)`);
    expect(cell.problems.join('\n')).toContain(message);
  });
});

describe('noise', () => {
  test('has the variance S/(4 c k) behind a damped spring', () => {
    // S. H. Crandall, W. D. Mark, Random Vibration in Mechanical Systems, 1963, with W = S/2 (from memory).
    const cell = mast(
      'S is 0.5 N^2/Hz\nS is positive\ncase gale of mast\n  F = noise(S)\nv = variance(gale.x)',
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('v').formula).toBe('S/(4 c k)');
    expect(numberOf(cell, 'v')).toBeCloseTo(0.5 / 4 / 90 / 7000, 15);
    expect(cell.result('v').unit).toBe('m²');
    expect(cell.result('v').notes).toContain('Power spectral densities are one-sided, per Hz.');
  });

  test('may be given by an amplitude density, which is squared', () => {
    const cell = mast(
      'case gale of mast\n  F = noise(0.3 N/√Hz)\ncase storm of mast\n  F = noise(0.09 N^2/Hz)\na = variance(gale.x)\nb = variance(storm.x)\nc1 = rms(gale.x)',
    );
    expect(cell.problems).toEqual([]);
    expect(numberOf(cell, 'a') / numberOf(cell, 'b')).toBeCloseTo(1, 12);
    expect(cell.result('c1').unit).toBe('m');
  });

  test('of two sources is independent, also on one line', () => {
    const cell = mast(
      'case one of mast\n  F = noise(2 N^2/Hz)\ncase two of mast\n  F = noise(2 N^2/Hz) + noise(2 N^2/Hz)\ncase apart of mast\n  F = noise(2 N^2/Hz)\n  G = -noise(2 N^2/Hz)\ncase scaled of mast\n  F = 2 noise(2 N^2/Hz)\na = variance(two.x)/variance(one.x)\nb = variance(apart.x)/variance(one.x)\nd = variance(scaled.x)/variance(one.x)',
    );
    expect(cell.problems).toEqual([]);
    expect(numberOf(cell, 'a')).toBeCloseTo(2, 12);
    expect(numberOf(cell, 'b')).toBeCloseTo(2, 12);
    expect(numberOf(cell, 'd')).toBeCloseTo(4, 12);
  });

  test('on two paths to one signal is added before it is squared', () => {
    const cell = mast(
      'case one of mast\n  F = noise(2 N^2/Hz)\na = variance(one.x + one.x)/variance(one.x)\nb = variance(one.x - one.x)',
    );
    expect(numberOf(cell, 'a')).toBeCloseTo(4, 12);
    expect(numberOf(cell, 'b')).toBe(0);
  });

  test('through a shaping filter has the variance of the filtered noise', () => {
    // J. H. Laning, R. H. Battin, Random Processes in Automatic Control, 1956: σ²/(1 + β T) (from memory).
    const cell = evaluateCell(`T is 0.5 s
B is 3 1/s
S is 2.5 N^2/Hz
T, B, S are positive
loop lag driven by w
  T y' + y = w
case wind of lag
  w = shaped(B/(s + B), S)
v = variance(wind.y)`);
    expect(cell.problems).toEqual([]);
    expect(numberOf(cell, 'v')).toBeCloseTo((2.5 * 3) / 4 / (1 + 3 * 0.5), 12);
    expect(cell.result('v').unit).toBe('N²');
  });

  test('is infinite where it does not roll off, and no problem', () => {
    const cell = mast("case gale of mast\n  F = noise(1 N^2/Hz)\nv = variance(gale.x'')");
    expect(cell.problems).toEqual([]);
    expect(cell.result('v').value).toBeNull();
    expect(cell.result('v').notes).toContainEqual(
      "No value: the variance is infinite: white noise at F reaches gale.x'' without rolling off at high frequencies",
    );
  });

  test('has a density that integrates over a requirement and a unit per Hz', () => {
    const cell = mast(
      'case gale of mast\n  F = noise(1 N^2/Hz)\nd = density(gale.x, 0 Hz)\nrequire density(gale.x, 8 Hz) <= 1e-6 m^2/Hz',
    );
    expect(cell.problems).toEqual([]);
    expect(numberOf(cell, 'd')).toBeCloseTo(1 / 7000 ** 2, 15);
    expect(cell.requirement('density').verdict).toBe('met');
  });

  test('counts in an rms together with sines, by a requirement too', () => {
    const cell = mast(
      'S is 0.5 N^2/Hz\nS is positive\ncase gale of mast\n  F = noise(S) + sine(F1, f1) + step(9 N)\nq = rms(gale.x)\nr = rms(random(gale.x))\na = amplitude(gale.x, f1)\nrequire 3 rms(gale.x) <= 2 mm',
    );
    expect(cell.problems).toEqual([]);
    const square = numberOf(cell, 'r') ** 2 + numberOf(cell, 'a') ** 2 / 2;
    expect(numberOf(cell, 'q')).toBeCloseTo(Math.sqrt(square), 12);
    expect(cell.result('q').notes).toContain('The constant part is not counted.');
    expect(cell.requirement('3 rms').verdict).toBe('met');
  });

  test('has no rms in a signal that drifts', () => {
    const cell = mast(
      'case gale of mast\n  F = noise(1 N^2/Hz) + ramp(2 N/s)\nq = rms(gale.x)\nr = rms(random(gale.x))',
    );
    expect(cell.result('q').notes).toContainEqual(expect.stringContaining('gale.x drifts'));
    expect(typeof cell.result('r').value).toBe('number');
  });

  test('has variance = density times noise bandwidth', () => {
    const cell = mast(
      'S is 0.5 N^2/Hz\ncase gale of mast\n  F = noise(S)\nq = variance(gale.x) - S noise_bandwidth(mast(F -> x))\nh = noise_bandwidth(1/((0.1 [s]) s + 1))',
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('q').formula).toBe('0');
    expect(numberOf(cell, 'h')).toBeCloseTo(2.5, 12);
    expect(cell.result('h').unit).toBe('Hz');
  });

  test.each([
    ['noise(-1 N^2/Hz)', 'A power spectral density is not negative.'],
    ['step(1 N) + noise(1 N/Hz)', 'The input F is in N, and `noise(1 [N/Hz])` gives'],
    ['measured("wind.csv")', 'The source measured is not available yet.'],
    ['noice(k)', 'There is no source noice. Is noise meant?'],
  ])('%s is refused in words', (source, message) => {
    const cell = mast(`case run of mast\n  F = ${source}\nv = variance(run.x)`);
    expect(cell.problems.join('\n')).toContain(message);
  });

  test('is left out of transforms and of curves over time, which is said', () => {
    const cell = mast(
      'case gale of mast\n  F = noise(1 N^2/Hz) + step(7 N)\ngale.x\ndraw response of gale.x over 2 s',
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('gale.x').formula).toBe('7/(s (m s^2 + c s + k))');
    expect(cell.result('gale.x').notes).toContain(
      'The noise in it has no transform and is left out.',
    );
    expect(cell.result('draw').notes).toContain('The noise in gale.x is left out.');
  });

  test('in a band has an rms that agrees with the integral of its density', () => {
    const cell = mast(
      'S is 0.5 N^2/Hz\ncase gale of mast\n  F = noise(S) + step(3 N)\na = rms(gale.x, 1 Hz, 5 Hz)\nb = rms(gale.x, 1 Hz, 10 pi (1 [rad/s]))',
    );
    expect(cell.problems).toEqual([]);
    const density = (f: number): number => (0.5 * atSpring(f) ** 2) / 16;
    const integral = integrate(density, 1, 5);
    if (isRefusal(integral)) throw new Error(integral.reason);
    expect(numberOf(cell, 'a')).toBeCloseTo(Math.sqrt(integral.value), 12);
    expect(numberOf(cell, 'b')).toBeCloseTo(numberOf(cell, 'a'), 12);
    expect(cell.result('a').unit).toBe('m');
  });

  test('in bands adds up to the whole, a sine counting in the one that holds it', () => {
    const cell = mast(
      'S is 0.5 N^2/Hz\ncase gale of mast\n  F = noise(S) + sine(F1, f1)\na = rms(gale.x)\nb = rms(gale.x, 0 Hz, 6 Hz)\nd = rms(gale.x, 6 Hz, 2 kHz)\ng = rms(gale.x, 6 Hz, f1)',
    );
    expect(cell.problems).toEqual([]);
    const [a, b, d, g] = ['a', 'b', 'd', 'g'].map((name) => numberOf(cell, name));
    expect(Math.hypot(b, d)).toBeCloseTo(a, 8);
    expect(g).toBeGreaterThan(atSpring(8) / Math.SQRT2);
  });

  test('behind many poles is found from the numbers, as the closed form would be', () => {
    const cell = evaluateCell(`T is 0.1 s
T is positive
Td is 20 ms
a = noise_bandwidth(1/(T s + 1)^7)
b = noise_bandwidth(delay(Td)/(T s + 1))
require noise_bandwidth(1/(T s + 1)^7) <= 1 Hz # R-1`);
    expect(cell.problems).toEqual([]);
    // I. S. Gradshteyn, I. M. Ryzhik, 7th ed., 3.249.1: binomial(2n−2, n−1)/2^(2n−1), halved (from memory).
    expect(numberOf(cell, 'a')).toBeCloseTo(924 / 2 ** 13 / 2 / 0.1, 12);
    expect(numberOf(cell, 'b')).toBeCloseTo(2.5, 12);
    expect(cell.requirement('R-1').verdict).toBe('met');
  });

  test('in a band with one end or from high to low is refused in words', () => {
    const cell = mast(
      'case gale of mast\n  F = noise(1 N^2/Hz)\na = rms(gale.x, 1 Hz)\nb = rms(gale.x, 5 Hz, 1 Hz)',
    );
    expect(cell.problems).toEqual([
      'error at ‹rms(gale.x, 1 Hz)›: a band has two ends, f1 and f2.',
    ]);
    expect(cell.result('b').value).toBeNull();
    expect(cell.result('b').notes.join(' ')).toContain('a band runs from a frequency, 0 or above');
  });

  test('of a formula in s is refused with the way out', () => {
    const cell = mast('v = variance(1/(s + 2))');
    expect(cell.problems.join('\n')).toContain('of a transfer function take `noise_bandwidth(…)`');
  });

  test('has no variance where the loop is unstable', () => {
    const cell = evaluateCell(
      "a is -2 1/s\nloop l driven by w\n  y' + a y = w\ncase c of l\n  w = noise(1 1/(s^2 Hz))\nv = variance(c.y)",
    );
    expect(cell.result('v').value).toBeNull();
  });
});
