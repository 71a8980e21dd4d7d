import { describe, expect, test } from 'vitest';
import {
  conditionKey,
  compileResponse,
  responseOf,
  type Response,
} from '../../src/control/index.ts';
import { randomInteger, seededRandom, timeResponse } from '../../src/numeric/index.ts';
import { found, numberAt, numbersOf, positive, read, signal, unknown } from './formulas.ts';
import { published } from './published-cases.ts';
import type { Ratio, SignOf } from '../../src/algebra/index.ts';

function responseTo(transform: string, signOf: SignOf = positive): Response {
  return found(responseOf(signal([{ transform: read(transform) }]), signOf));
}

function sampled(
  response: Response,
  values: Readonly<Record<string, number>>,
  times: readonly number[],
): number[] {
  const { inputs, sample } = compileResponse(response, () => 'input');
  return [
    ...sample(
      inputs.map((name) => values[name]),
      times,
    ),
  ];
}

const TIMES = [0.05, 0.4, 1, 2.5, 4];

describe('published Laplace pairs', () => {
  test.each(published((c) => c.kind === 'laplace'))('%s', (_, { given, expect: wanted }) => {
    const values = { a: 1.3, b: 0.7 };
    const { F } = given as unknown as { F: string };
    const { f } = wanted as unknown as { f: string };
    const response = responseTo(F);
    expect(response.exact).toBe(true);
    const original = read(f.replace(/\bt\b/g, 'time'));
    sampled(response, values, TIMES).forEach((x, i) => {
      expect(x).toBeCloseTo(numberAt(original, { ...values, time: TIMES[i] }), 9);
    });
  });

  test.each(published((c) => c.kind === 'step_lti'))('%s', (_, { given, expect: wanted }) => {
    const { num, den } = given as unknown as { num: number[]; den: number[] };
    const response = responseTo(
      `(${num[0]}*s + ${num[1]})/(s*(${den[0]}*s^2 + ${den[1]}*s + ${den[2]}))`,
    );
    const { tp, peak, final } = wanted as unknown as Record<string, string>;
    const [atPeak, before, after, late] = sampled(response, {}, [
      numberAt(read(tp), {}),
      numberAt(read(tp), {}) - 0.05,
      numberAt(read(tp), {}) + 0.05,
      60,
    ]);
    expect(atPeak).toBeCloseTo(numberAt(read(peak), {}), 10);
    expect(before).toBeLessThan(atPeak);
    expect(after).toBeLessThan(atPeak);
    expect(late).toBeCloseTo(numberAt(read(final), {}), 8);
  });
});

describe('the form of a response', () => {
  test('a simple lag decays with its rate', () => {
    expect(responseTo('A/(T*s + 1)').terms).toEqual([
      {
        coefficient: read('A/T'),
        power: 0,
        rate: read('0-1/T'),
        frequency: read('0'),
        wave: 'none',
        after: read('0'),
      },
    ]);
  });

  test('sin and cos take the frequency without a root where it is a square', () => {
    const { terms } = responseTo('s/(s^2 + a^2)');
    expect(terms).toMatchObject([{ coefficient: read('1'), frequency: read('a'), wave: 'cos' }]);
  });

  test('a quadratic of unknown discriminant is taken as oscillating, under a condition', () => {
    const response = responseTo('1/(m*s^2 + c*s + k)');
    expect(conditionKey(response.when)).toContain('>');
    expect(response.terms.map((t) => t.wave)).toEqual(['sin']);
    const [x] = sampled(response, { m: 2, c: 1, k: 3 }, [1]);
    const w = Math.sqrt(3 / 2 - 1 / 16);
    expect(x).toBeCloseTo((Math.exp(-0.25) * Math.sin(w)) / (2 * w), 12);
  });

  test('irrational real poles make two exponentials', () => {
    const response = responseTo('1/(s^2 + 4*s + 2)');
    expect(response.terms.map((t) => t.wave)).toEqual(['none', 'none']);
    const r = Math.SQRT2;
    expect(sampled(response, {}, [1])[0]).toBeCloseTo(
      (Math.exp(-2 + r) - Math.exp(-2 - r)) / (2 * r),
      12,
    );
  });

  test('pi and roots of numbers do not keep a larger factor from decimals', () => {
    const response = responseTo('1/(s^3 + 2*pi*s^2 + 40*s + sqrt(2))');
    expect(response.exact).toBe(false);
    const wanted = found(
      timeResponse([1], [1, 2 * Math.PI, 40, Math.SQRT2], { kind: 'impulse', size: 1 }, 0.5, 3),
    );
    expect(sampled(response, {}, [1])[0]).toBeCloseTo(wanted[2], 12);
  });

  test('an improper transform has impulses', () => {
    const response = responseTo('(s^2 + 3*s + 1)/(s + 1)');
    expect(response.impulses).toEqual([
      { coefficient: read('2'), order: 0, after: read('0') },
      { coefficient: read('1'), order: 1, after: read('0') },
    ]);
  });

  test('a source that begins later is zero before', () => {
    const x = signal([{ transform: read('1/s'), after: read('2') }]);
    expect(sampled(found(responseOf(x, unknown)), {}, [1, 2, 3])).toEqual([0, 1, 1]);
  });

  test('opposite terms cancel', () => {
    const x = signal([{ transform: read('1/s') }, { transform: read('0-1/s') }]);
    expect(found(responseOf(x, unknown)).terms).toEqual([]);
  });

  test.each([
    ['1/(J*s^3 + Kd*s^2 + Kp*s + Ki)', 'needs-numbers'],
    ['exp(0-s*Td)/(s + 1)', 'dead-time'],
  ])('%s is refused: %s', (transform, code) => {
    expect(responseOf(signal([{ transform: read(transform) }]), positive)).toMatchObject({ code });
  });

  test('noise is refused', () => {
    const x = signal([{ transform: read('1/(s + 1)'), source: 'random' }]);
    expect(responseOf(x, positive)).toMatchObject({ code: 'random' });
  });
});

const amount = (c: Ratio | number): number => (typeof c === 'number' ? c : numberAt(c, {}));

describe('against the matrix exponential', () => {
  const random = seededRandom(3);
  const factors = [
    () => `(s + ${randomInteger(random, 0, 4)})`,
    () => `(s + ${randomInteger(random, 1, 3)})^2`,
    () => `(s^2 + ${randomInteger(random, 1, 5)})`,
    () => `(s^2 + ${randomInteger(random, 1, 5)}*s + ${randomInteger(random, 1, 9)})`,
    () => `(s^2 + s + ${randomInteger(random, 1, 3)})^2`,
    () => `(s^3 + 2*s^2 + ${randomInteger(random, 2, 5)}*s + ${randomInteger(random, 1, 4)})`,
    () => `(s^3 + 3*s^2 + ${randomInteger(random, 4, 6)}*s + ${randomInteger(random, 1, 5)})^2`,
  ];

  test('closed forms follow the simulated response, exact and in decimals', () => {
    const seen = { exact: 0, decimal: 0 };
    for (let round = 0; round < 80; round++) {
      const chosen = Array.from({ length: randomInteger(random, 1, 3) }, () =>
        factors[randomInteger(random, 0, 6)](),
      );
      const transform = `(${randomInteger(random, 1, 5)} + ${randomInteger(random, 0, 2)}*s)/((s + 5)*${chosen.join('*')})`;
      const response = responseTo(transform);
      seen[response.exact ? 'exact' : 'decimal'] += 1;
      const { num, den } = numbersOf(read(transform));
      const wanted = found(timeResponse(num, den, { kind: 'impulse', size: 1 }, 0.5, 9));
      const got = sampled(
        response,
        {},
        Array.from(wanted, (_, i) => 0.5 * i),
      );
      const largest = Math.max(...response.terms.map((t) => Math.abs(amount(t.coefficient))));
      // Terms of close poles are large and nearly cancel: the bound is in units of the largest term.
      const bound = 1e-10 * Math.max(largest, ...wanted.map(Math.abs));
      got.forEach((x, i) => expect(Math.abs(x - wanted[i]), transform).toBeLessThan(bound));
    }
    expect(seen.exact).toBeGreaterThan(15);
    expect(seen.decimal).toBeGreaterThan(15);
  });
});
