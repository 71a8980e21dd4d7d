import { describe, expect, test } from 'vitest';
import { invariant, isRefusal } from '../../src/base/index.ts';
import { FOUND_NUMBERS } from '../../src/control/index.ts';
import { polynomialRoots, seededRandom, solveOde } from '../../src/numeric/index.ts';
import { transferAt, type NumericTransfer } from '../../src/control/frequency-polynomials.ts';

const SEED = 20261201;

function rational(num: readonly number[], den: readonly number[], delay = 0): NumericTransfer {
  return { num: [{ coefficients: num, delay }], den: [{ coefficients: den, delay: 0 }] };
}

const times = (a: readonly number[], b: readonly number[]): number[] => {
  const product = new Array<number>(a.length + b.length - 1).fill(0);
  a.forEach((x, i) => b.forEach((y, k) => (product[i + k] += x * y)));
  return product;
};

/** A stable loop gain of degree up to 5, perhaps with an integrator. */
function randomLoop(random: () => number): { num: number[]; den: number[] } {
  let [num, den] = [[10 ** (3 * random() - 1)], random() < 0.5 ? [1, 0] : [1, 1]];
  for (let k = 0; k < 1 + Math.floor(3 * random()); k++) {
    const w = 10 ** (2 * random() - 0.5);
    den = times(den, random() < 0.5 ? [1 / w, 1] : [1 / w ** 2, (0.1 + random()) / w, 1]);
    if (random() < 0.4) num = times(num, [1 / w / (0.2 + 3 * random()), 1]);
  }
  return { num, den };
}

const find = (name: string, ...args: readonly NumericTransfer[]) =>
  FOUND_NUMBERS.get(name)!.find(...args);

/** 4000 frequencies over nine decades. */
const GRID = Array.from({ length: 4000 }, (_, k) => 10 ** (-4 + (9 * k) / 3999));

describe('margins of seeded loops', () => {
  test('are those that a dense grid sees, and exist where the closed loop has its roots on the left', () => {
    const random = seededRandom(SEED);
    let compared = 0;
    for (let k = 0; k < 400; k++) {
      const { num, den } = randomLoop(random);
      if (num.length >= den.length) continue;
      const loop = rational(num, den);
      const closed = den.map((c, i) => c + (num[i - den.length + num.length] ?? 0));
      const isStable = polynomialRoots(closed).every(({ re }) => re < 0);
      const finding = find('phase_margin', loop);
      const words = `seed ${SEED}, loop ${k}: ${num} over ${den}`;
      if (!isStable) {
        expect(finding.reason, words).toContain('not stable');
        continue;
      }
      const values = GRID.map((w) => transferAt(loop, w)!);
      const angles: number[] = [];
      const factors: number[] = [];
      for (let i = 1; i < GRID.length; i++) {
        const [a, b] = [values[i - 1], values[i]];
        const [p, q] = [Math.hypot(a.re, a.im) - 1, Math.hypot(b.re, b.im) - 1];
        const mix = (f: number, g: number): number => f / (f - g);
        if (p * q < 0) {
          const u = mix(p, q);
          angles.push(Math.atan2(-a.im - u * (b.im - a.im), -a.re - u * (b.re - a.re)));
        }
        if (a.im * b.im < 0 && a.re < 0 && b.re < 0) {
          factors.push(-1 / (a.re + mix(a.im, b.im) * (b.re - a.re)));
        }
      }
      const nearest = (list: readonly number[], size: (x: number) => number): number =>
        list.reduce((a, b) => (size(b) < size(a) ? b : a), Infinity);
      const angle = nearest(angles, Math.abs);
      if (Number.isFinite(angle)) expect(finding.value, words).toBeCloseTo(angle, 3);
      else expect(finding.value, words).toBe(Infinity);
      const factor = nearest(factors, (x) => Math.abs(Math.log(x)));
      const margin = find('gain_margin', loop).value;
      if (Number.isFinite(factor)) expect(margin / factor, words).toBeCloseTo(1, 2);
      compared++;
    }
    expect(compared).toBeGreaterThan(100);
  });

  test('further dead time of the delay margin brings the loop to its limit', () => {
    const random = seededRandom(SEED + 1);
    for (let k = 0; k < 100; k++) {
      const { num, den } = randomLoop(random);
      if (num.length >= den.length) continue;
      const { value } = find('delay_margin', rational(num, den));
      if (!Number.isFinite(value)) continue;
      const [less, more] = [0.999, 1.001].map((f) =>
        find('phase_margin', rational(num, den, f * value)),
      );
      expect(Number.isFinite(less.value), `${num} over ${den}`).toBe(true);
      expect(more.reason, `${num} over ${den}`).toContain('not stable');
    }
  });

  test('the gain margin times the gain is the limit of stability with dead time too', () => {
    const random = seededRandom(SEED + 2);
    for (let k = 0; k < 60; k++) {
      const { num, den } = randomLoop(random);
      if (num.length >= den.length) continue;
      const delay = 0.02 + random();
      const { value } = find('gain_margin', rational(num, den, delay));
      if (!(value > 1) || !Number.isFinite(value)) continue;
      const [less, more] = [0.999, 1.001].map((f) =>
        find(
          'gain_margin',
          rational(
            num.map((c) => c * f * value),
            den,
            delay,
          ),
        ),
      );
      expect(Number.isFinite(less.value), `${num} over ${den}, ${delay} s`).toBe(true);
      expect(more.reason, `${num} over ${den}, ${delay} s`).toContain('not stable');
    }
  });
});

describe('figures over frequency', () => {
  test('no frequency of a dense grid has a larger gain than the peak, and some come close', () => {
    const random = seededRandom(SEED + 3);
    for (let k = 0; k < 200; k++) {
      const { num, den } = randomLoop(random);
      if (num.length >= den.length || den.at(-1) === 0) continue;
      const loop = rational(num, den);
      const { value } = find('peak_gain', loop);
      const seen = Math.max(...GRID.map((w) => find('gain', loop, rational([w], [1])).value));
      expect(seen).toBeLessThanOrEqual(value * (1 + 1e-9));
      expect(seen / value).toBeGreaterThan(0.999);
    }
  });

  test('a phase is unwrapped: that of 1/(s + 1)^5 tends to −450 degrees', () => {
    const den = [1, 5, 10, 10, 5, 1];
    const { value } = find('phase', rational([1], den), rational([1e4], [1]));
    expect(value).toBeCloseTo(-5 * Math.atan(1e4), 3);
  });

  test('a pole on the imaginary axis makes the peak infinite, and says where', () => {
    const { value, reason } = find('peak_gain', rational([1], [1, 0, 4]));
    expect(value).toBe(Infinity);
    expect(reason).toContain('2 rad/s');
  });
});

describe('figures of a response', () => {
  test('are those of a simulation of seeded stable systems', () => {
    const random = seededRandom(SEED + 4);
    for (let k = 0; k < 25; k++) {
      const { num, den } = randomLoop(random);
      if (num.length >= den.length || den.at(-1) === 0) continue;
      const words = `seed ${SEED + 4}, system ${k}: ${num} over ${den}`;
      const order = den.length - 1;
      const monic = den.map((c) => c / den[0]);
      const end = 30 / Math.min(...polynomialRoots(den).map(({ re }) => -re));
      const output = (x: Float64Array | readonly number[]): number =>
        num.reduce((sum, c, i) => sum + (c / den[0]) * x[num.length - 1 - i], 0);
      const points = Array.from({ length: 4001 }, (_, i) => (end * i) / 4000);
      const states = solveOde(
        (_, x, slope) => {
          for (let i = 0; i + 1 < order; i++) slope[i] = x[i + 1];
          slope[order - 1] = 1;
          for (let i = 0; i < order; i++) slope[order - 1] -= monic[order - i] * x[i];
        },
        new Float64Array(order),
        points,
        { relative: 1e-9, absolute: 1e-12 },
      );
      invariant(!isRefusal(states), words);
      const values = states.map(output);
      const final = num.at(-1)! / den.at(-1)!;
      const step = rational(num, [...den, 0]);
      expect(find('peak', step).value / Math.max(...values.map(Math.abs)), words).toBeCloseTo(1, 3);
      const outside = values.findLastIndex((y) => Math.abs(y - final) > 0.02 * Math.abs(final));
      const settled = find('settling_time', step, rational([0.02], [1])).value;
      expect(settled, words).toBeGreaterThanOrEqual(points[outside] - 1e-6 * end);
      expect(settled, words).toBeLessThanOrEqual(points[outside + 1] + 1e-6 * end);
    }
  });
});
