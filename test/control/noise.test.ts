import { describe, expect, test } from 'vitest';
import {
  divRatios,
  mulRatios,
  ratio,
  type Polynomial,
  type Ratio,
} from '../../src/algebra/index.ts';
import { isRefusal } from '../../src/base/index.ts';
import {
  amplitudeOf,
  densityOf,
  noiseBandwidth,
  rmsOf,
  varianceOf,
  type FormulaValue,
  type Knowledge,
  type NoValue,
  type SignalTerm,
} from '../../src/control/index.ts';
import {
  integrate,
  matrixOf,
  noiseBandwidthOf,
  randomInteger,
  seededRandom,
  solveLinear,
  type RandomSource,
} from '../../src/numeric/index.ts';
import {
  found,
  numberAt,
  numbersOf,
  polynomial,
  positive,
  quotient,
  read,
  signal,
  unknown,
} from './formulas.ts';
import { published, type PublishedCase } from './published-cases.ts';

/** What the caller takes to be a formula. */
function formula(value: FormulaValue | NoValue): Ratio {
  if (value.kind === 'none') throw new Error(value.reason);
  return value.ratio;
}

function reasonOf(value: unknown): string {
  return (value as NoValue).reason;
}

/** A noise of density S at input w on its way through a transfer function. */
function noisy(transfer: Ratio | string, density = 'S', id = 'w', input = 'w'): SignalTerm {
  return {
    input,
    source: 'random',
    transform: typeof transfer === 'string' ? read(transfer) : transfer,
    after: read(0),
    noise: { id, density: read(density) },
  };
}

/** A sine of amplitude A and angular frequency ω at input w on its way through a transfer function. */
function line(transfer: string, amplitude = 'A', frequency = 'w0', after = '0'): SignalTerm {
  return {
    input: 'w',
    source: 'periodic',
    transform: read(`(${transfer}) * (${amplitude}) * (${frequency}) / (s**2 + (${frequency})**2)`),
    after: read(after),
    frequency: read(frequency),
  };
}

const open = (r: Ratio): Ratio => r;
const allPositive: Knowledge = { signOf: positive, open };
const write = (): string => '…';

/** The polynomial of these coefficients, highest power first. */
function inPowersOfS(list: readonly (string | number)[]): Ratio {
  return read(list.map((x, k) => `(${x})*s**${list.length - 1 - k}`).join('+'));
}

/** (1/2πj) ∫ H(s) H(−s) ds, twice the noise bandwidth. */
function integral(num: Polynomial, den: Polynomial): Ratio {
  return mulRatios(read(2), noiseBandwidth(ratio(num, den)));
}

const symbols = (letter: string, from: number, to: number): string[] =>
  Array.from(
    { length: Math.abs(from - to) + 1 },
    (_, k) => `${letter}${from > to ? from - k : from + k}`,
  );

describe('published integrals', () => {
  test.each(published((c) => c.kind === 'In_symbolic'))('%s', (_, c) => {
    const { n } = c.given as unknown as { n: number };
    const value = integral(polynomial(symbols('c', n - 1, 0)), polynomial(symbols('d', n, 0)));
    const { I } = c.expect as unknown as { I: string };
    expect(value).toEqual(read(I));
  });

  test.each(published((c) => c.kind === 'In_jnp3'))('%s', (_, c) => {
    // The table's g = b0 s⁴ + b1 s² + b2 is c(s) c(−s): the three squares of c are taken one at a time.
    const { I } = c.expect as unknown as { I: string };
    const den = polynomial(symbols('a', 0, 3));
    const parts = [
      { c: 's**2', b: { b0: 1, b1: 0, b2: 0 } },
      { c: 's', b: { b0: 0, b1: -1, b2: 0 } },
      { c: '1', b: { b0: 0, b1: 0, b2: 1 } },
    ];
    for (const part of parts) {
      const a = { a0: 2, a1: 3, a2: 5, a3: 4 };
      const found = numberAt(integral(read(part.c).num, den), a);
      expect(found).toBeCloseTo(numberAt(read(I), { ...a, ...part.b }), 14);
    }
  });

  test.each(published((c) => c.kind === 'In'))('%s', (_, c) => {
    const given = c.given as unknown as Record<'c' | 'd', (string | number)[]> & { scale?: string };
    const { I } = c.expect as unknown as { I: string };
    const expected = numberAt(read(I), {}) / 2 / numberAt(read(given.scale ?? '1'), {});
    const [num, den] = [given.c, given.d].map((list) => list.map((x) => numberAt(read(x), {})));
    expect(noiseBandwidthOf(num, den) / expected).toBeCloseTo(1, 12);
    // With roots in the denominator the exact form is in lowest terms over the rationals alone.
    if (given.d.some((x) => String(x).includes('sqrt'))) return;
    const [top, bottom] = [given.c, given.d].map(inPowersOfS);
    expect(numberAt(noiseBandwidth(divRatios(top, bottom)), {}) / expected).toBeCloseTo(1, 12);
  });

  test.each(published((c) => c.kind === 'ise_minimum'))('%s', (_, c) => {
    // The error of a unit step is (s + 2ζωₙ)/(s² + 2ζωₙ s + ωₙ²); its squared integral is I.
    const wn = 2;
    const ise = integral(read('s + 2*z*wn').num, read('s**2 + 2*z*wn*s + wn**2').num);
    const expected = c.expect as unknown as Record<string, string>;
    expect(ise).toEqual(read('(z + 1/(4*z))/wn'));
    expect(numberAt(ise, { z: 0.5, wn })).toBeCloseTo(numberAt(read(expected.ISE_min), {}), 14);
    expect(numberAt(ise, { z: 0.7, wn })).toBeCloseTo(
      numberAt(read(expected['ISE_at_zeta_0.7']), {}),
      14,
    );
  });
});

/** A stable strictly proper system: numerator and denominator, highest power first. */
function randomSystem(random: RandomSource, degree: number): { num: number[]; den: number[] } {
  let den = [1];
  const times = (p: number[], q: number[]): number[] => {
    const product = new Array<number>(p.length + q.length - 1).fill(0);
    p.forEach((x, i) => q.forEach((y, k) => (product[i + k] += x * y)));
    return product;
  };
  while (den.length <= degree) {
    const a = randomInteger(random, 1, 9);
    const isPair = degree - den.length >= 1 && random() < 0.5;
    den = times(den, isPair ? [1, a, randomInteger(random, 1, 30)] : [1, a]);
  }
  const num = Array.from({ length: degree }, () => randomInteger(random, -9, 9));
  num[0] ||= 1;
  return { num, den };
}

/** c P cᵀ/2 for A P + P Aᵀ + b bᵀ = 0 in the controllable form, as one linear system for all entries of P. */
function bandwidthByLyapunov(num: readonly number[], den: readonly number[]): number {
  const n = den.length - 1;
  const a = (i: number, k: number): number =>
    i < n - 1 ? (k === i + 1 ? 1 : 0) : -den[n - k] / den[0];
  const rows: number[][] = [];
  const right: number[][] = [];
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const row = new Array<number>(n * n).fill(0);
      for (let m = 0; m < n; m++) {
        row[m * n + k] += a(i, m);
        row[i * n + m] += a(k, m);
      }
      rows.push(row);
      right.push([i === n - 1 && k === n - 1 ? -1 / den[0] ** 2 : 0]);
    }
  }
  const p = found(solveLinear(matrixOf(rows), matrixOf(right))).data;
  const c = (k: number): number => num[n - 1 - k];
  let sum = 0;
  for (let i = 0; i < n; i++) for (let k = 0; k < n; k++) sum += c(i) * p[i * n + k] * c(k);
  return sum / 2;
}

function squaredGainAt(num: readonly number[], den: readonly number[], w: number): number {
  const size = (p: readonly number[]): number => {
    let [re, im] = [0, 0];
    for (const c of p) [re, im] = [-w * im + c, w * re];
    return re * re + im * im;
  };
  return size(num) / size(den);
}

function bandwidthByQuadrature(num: readonly number[], den: readonly number[]): number {
  const integrand = (w: number): number => squaredGainAt(num, den, w) / (2 * Math.PI);
  return found(integrate(integrand, 0, Infinity, { relative: 1e-10 })).value;
}

describe('noise bandwidth', () => {
  test('agrees with a Lyapunov equation, a recursion and the integral of the spectrum', () => {
    for (let seed = 1; seed <= 120; seed++) {
      const random = seededRandom(seed);
      const { num, den } = randomSystem(random, randomInteger(random, 1, 7));
      const exact = numberAt(noiseBandwidth(quotient({ num, den })), {});
      const routes = {
        lyapunov: bandwidthByLyapunov(num, den),
        recursion: noiseBandwidthOf(num, den),
        spectrum: bandwidthByQuadrature(num, den),
      };
      for (const [route, value] of Object.entries(routes))
        expect(Math.abs(value / exact - 1), `seed ${seed}, ${route}`).toBeLessThan(1e-7);
    }
  });

  test('with symbols is the same formula as with numbers in their places', () => {
    for (let n = 1; n <= 5; n++) {
      const random = seededRandom(n);
      const { num, den } = randomSystem(random, n);
      const formula = noiseBandwidth(
        ratio(polynomial(symbols('c', n - 1, 0)), polynomial(symbols('d', n, 0))),
      );
      const values = Object.fromEntries([
        ...num.map((c, k) => [`c${n - 1 - k}`, c]),
        ...den.map((d, k) => [`d${n - k}`, d]),
      ]);
      expect(numberAt(formula, values) / noiseBandwidthOf(num, den)).toBeCloseTo(1, 10);
    }
  });

  test('holds over eighteen decades of time', () => {
    for (const T of [1e-9, 1, 1e9]) {
      expect(noiseBandwidthOf([1], [T, 1]) * T).toBeCloseTo(0.25, 14);
    }
  });

  test('has no number where a pole does not decay or the gain does not roll off', () => {
    expect(noiseBandwidthOf([1], [1, 0])).toBeNaN();
    expect(noiseBandwidthOf([1], [1, -1])).toBeNaN();
    expect(noiseBandwidthOf([1], [1, 0, 1])).toBeNaN();
    expect(noiseBandwidthOf([1, 2], [1, 1])).toBeNaN();
    expect(noiseBandwidthOf([0, 0], [1, 1])).toBe(0);
  });
});

describe('variance', () => {
  test('of a first-order lag under white noise is S/(4 T)', () => {
    expect(formula(varianceOf(signal([noisy('1/(T*s + 1)')]), allPositive))).toEqual(
      read('S/(4*T)'),
    );
  });

  test('adds independent noises, and the paths of one noise before squaring', () => {
    const lag = '1/(s + 1)';
    const independent = signal([noisy(lag, 'S', 'a'), noisy(lag, 'S', 'b')]);
    const same = signal([noisy(lag, 'S', 'a'), noisy(lag, 'S', 'a')]);
    const cancelled = signal([noisy(lag, 'S', 'a'), noisy(`0 - ${lag}`, 'S', 'a')]);
    expect(formula(varianceOf(independent, allPositive))).toEqual(read('S/2'));
    expect(formula(varianceOf(same, allPositive))).toEqual(read('S'));
    expect(formula(varianceOf(cancelled, allPositive))).toEqual(read(0));
  });

  test('is infinite where white noise does not roll off, and names the path', () => {
    const value = varianceOf(signal([noisy('s/(s + 1)')]), allPositive);
    expect(reasonOf(value)).toBe(
      'the variance is infinite: white noise at w reaches x without rolling off at high frequencies',
    );
  });

  test('grows without bound behind an integration, and names the path', () => {
    const value = varianceOf(signal([noisy('1/(s*(s + 1))')]), allPositive);
    expect(reasonOf(value)).toBe(
      'the noise in w is integrated on its way to x (a pole at s = 0): its variance grows without bound',
    );
  });

  test('has no value where a mode does not decay, visible or not', () => {
    const undamped = varianceOf(signal([noisy('1/(s**2 + 4)')]), allPositive);
    expect(undamped.kind).toBe('none');
    const blocks = [{ signals: ['x'], polynomial: read('(s - 1)*(s + 2)').num }];
    const hidden = varianceOf(signal([noisy('1/(s + 2)')], blocks), allPositive);
    expect(hidden.kind).toBe('none');
  });

  test('stands under the condition that the loop is stable', () => {
    const blocks = [{ signals: ['x'], polynomial: read('s + a').num }];
    const value = varianceOf(signal([noisy('1/(s + a)')], blocks), { signOf: unknown, open });
    expect(formula(value)).toEqual(read('S/(4*a)'));
    expect(JSON.stringify(value.when, (_, v) => (typeof v === 'bigint' ? String(v) : v))).toContain(
      'stable',
    );
  });
});

describe('density', () => {
  test('is the density of the noise times the squared gain', () => {
    const x = signal([noisy('1/(T*s + 1)'), noisy('k/(s + 1)', 'R', 'v')]);
    const value = densityOf(x, read('w'), allPositive);
    expect(formula(found(value))).toEqual(read('S/(1 + T**2*w**2) + R*k**2/(1 + w**2)'));
  });

  test('keeps its size through a dead time', () => {
    const delayed = signal([noisy('exp(0 - s*Td)/(s + 1)')]);
    const value = formula(found(densityOf(delayed, read('w'), allPositive)));
    expect(numberAt(value, { S: 3, w: 2, Td: 0.7 })).toBeCloseTo(3 / 5, 14);
  });
});

describe('amplitude', () => {
  test.each(published((c) => c.kind === 'sin_dist'))('%s', (_, c: PublishedCase) => {
    const { w, amp } = c.given as unknown as { w: number[]; amp: number };
    const x = signal([line('1/(J*s**2 + kd*s + kp)')]);
    const value = formula(found(amplitudeOf(x, read('w0'), allPositive, write)));
    const { amplitude } = c.expect as unknown as { amplitude: string[] };
    const numbers = { J: 10, kp: 40, kd: 30, A: amp, w0: w[0] };
    expect(numberAt(value, numbers)).toBeCloseTo(numberAt(read(amplitude[0]), {}), 14);
  });

  test('is exactly 0 where a controller holds the poles of the line', () => {
    const x = signal([line('s*(s**2 + w0**2)/(s**3 + a*s**2 + b*s + c)')]);
    expect(formula(found(amplitudeOf(x, read('w0'), allPositive, write)))).toEqual(read(0));
  });

  test('adds the sines of one frequency by their phases', () => {
    const turned = signal([line('1/(s + 1)', '3', '2'), line('1/(s + 1)', '3', '2', '1/2')]);
    const value = numberAt(formula(found(amplitudeOf(turned, read(2), allPositive, write))), {});
    expect(value).toBeCloseTo((6 * Math.cos(0.5)) / Math.sqrt(5), 12);
  });

  test('of two lines stands where their frequencies differ', () => {
    const x = signal([line('1/(s + 1)', 'A', 'w1'), line('1/(s + 1)', 'B', 'w2')]);
    const value = found(amplitudeOf(x, read('w1'), allPositive, write));
    expect(value.when).toMatchObject({ kind: 'compare', operator: '!=' });
  });

  test('is refused where it is not certain which line is meant', () => {
    const x = signal([line('1/(s + 1)', 'A', 'w1')]);
    expect(amplitudeOf(x, read(3), allPositive, write)).toMatchObject({ code: 'which-line' });
  });

  test('is 0 at a frequency that no sine has, which is said', () => {
    const value = found(
      amplitudeOf(signal([line('1/(s + 1)', 'A', '2*pi')]), read(3), allPositive, write),
    );
    expect(formula(value)).toEqual(read(0));
    expect(value.notes).toEqual(['No sine at this frequency acts on x; its lines are at … Hz.']);
  });

  test('grows without bound on an undamped mode of the same frequency', () => {
    const x = signal([line('1/(s**2 + w0**2)')]);
    expect(found(amplitudeOf(x, read('w0'), allPositive, write)).kind).toBe('none');
  });

  test('of a formula is read from its poles', () => {
    const x = signal([{ input: '', transform: read('6/((s**2 + 9)*(s + 3))') }]);
    const value = formula(found(amplitudeOf(x, read(3), allPositive, write)));
    expect(numberAt(value, {})).toBeCloseTo(2 / Math.sqrt(18), 14);
  });
});

describe('rms', () => {
  test('counts noise and sines, not constants, and says so', () => {
    const step: Partial<SignalTerm> = { input: 'r', transform: read('1/(s*(s + 1))') };
    const x = signal([step, noisy('1/(s + 1)', '8'), line('1/(s + 1)', '2', '1')]);
    const value = found(rmsOf(x, allPositive));
    expect(numberAt(formula(value), {})).toBeCloseTo(Math.sqrt(2 + 1), 14);
    expect(value.notes).toContain('The constant part is not counted.');
  });

  test('has no value where the signal drifts', () => {
    const ramp: Partial<SignalTerm> = { input: 'r', source: 'drifting', transform: read('1/s**2') };
    const value = rmsOf(signal([ramp, noisy('1/(s + 1)')]), allPositive);
    expect(reasonOf(value)).toMatch(/^x drifts: grows without bound/);
  });

  test('of noise alone agrees with the spectrum', () => {
    const { num, den } = numbersOf(read('(3*s + 1)/(s**3 + 2*s**2 + 5*s + 1)'));
    const value = rmsOf(signal([noisy(quotient({ num, den }), '2')]), allPositive);
    if (isRefusal(value)) throw new Error(value.reason);
    expect(numberAt(formula(value), {}) ** 2).toBeCloseTo(2 * bandwidthByQuadrature(num, den), 9);
  });
});
