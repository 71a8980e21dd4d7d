import { describe, expect, test } from 'vitest';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { evaluateCell } from './worksheet.ts';

const LENGTHS = `
a is 2 m ± 10 %
b is 3 m ± 0.5 m
c is 4 m from 3 to 6 m
`;

const spanOf = (formula: string) => {
  const span = evaluateCell(`${LENGTHS}x = ${formula}`).result('x').span;
  return span && [span.how, span.n, Number(span.low.toFixed(9)), Number(span.high.toFixed(9))];
};

describe('a span over the tolerances', () => {
  test.each([
    ['a + b', 4.3, 5.7],
    ['a - c', -4.2, -0.8],
    ['a/b', 0.514285714, 0.88],
    ['a b/(a + b)', 1.046511628, 1.350877193],
    ['sqrt(a b)', 2.121320344, 2.774887385],
    ['nominal(a) + b', 4.5, 5.5],
    ['abs(a - b)', 0.3, 1.7],
    ['a^2 - 4 a b', -25.96, -14.76],
    ['-2 abs(a - 2 [m])', -0.4, 0],
  ])('of %s, which is monotone, is that of the corners', (formula, low, high) => {
    expect(spanOf(formula)).toEqual(['corners', null, low, high]);
  });

  test.each([
    ['(a - 2 [m])^2', 0, 0.04, 2002],
    ['max(a, b)', 2.5, 3.5, 2004],
  ])('of %s, which is not proved monotone, is sampled, and says so', (formula, low, high, n) => {
    expect(spanOf(formula)).toEqual(['sampled', n, low, high]);
  });

  test('of a quantity without tolerances is not given', () => {
    expect(evaluateCell('k is 3 N/m\nx = 2 k').result('x').span).toBeNull();
  });

  test('of names given to a number of standard deviations is that of their half-width', () => {
    const { span } = evaluateCell('e is 3 m ± 8 % at 3 sigma\nx = 2 e').result('x');
    expect(span!.low).toBeCloseTo(5.52, 12);
    expect(span!.high).toBeCloseTo(6.48, 12);
  });

  test('is shown in the unit of the result', () => {
    const { span } = evaluateCell(`${LENGTHS}x = a + b in mm`).result('x');
    expect(span!.shown).toBe('4300 to 5700 mm');
    expect(span!.low).toBeCloseTo(4.3, 12);
  });

  test('is not given where the value does not exist everywhere, and the place is', () => {
    const cell = evaluateCell(`
m1 is 1 kg
c is 2 N s/m
k is 5 N/m ± 10 %
q is 4 N/m from 3 to 6 N/m
F is 1 N
loop a driven by w
  m1 x'' + c x' + (k - q) x = w
case d of a
  w = step(F)
x_ss = final(d.x)
require x_ss <= 3 m
require stable(a)`);
    const result = cell.result('x_ss');
    expect(result.value).toBe(1);
    expect(result.span).toBeNull();
    expect(result.notes).toContain(
      'No span: the value does not exist at k = 4.5, q = 6 (SI units).',
    );
    expect(cell.requirement('x_ss')).toMatchObject({
      verdict: 'met at nominal only',
      nominal: 1,
      worst: null,
      at: { k: 4.5, q: 6 },
    });
    expect(cell.requirement('x_ss').notes).toEqual([
      'At the worst point there is no value: the block of x has a root outside the open left half plane, s = 0.5811.',
    ]);
    expect(cell.requirement('stable(a)').verdict).toBe('met at nominal only');
  });

  test('holds every value inside the tolerances, and is reached where the corners were enough', () => {
    const random = seededRandom(4);
    for (let run = 0; run < 40; run++) {
      const { text, at } = randomFormula(random);
      const cell = evaluateCell(`p is 2 ± 1\nq is 3 ± 1\nr is 4 from 3 to 7\nx = ${text}`);
      const { span } = cell.result('x');
      if (!span) continue;
      const margin = 1e-9 * (1 + Math.abs(span.low) + Math.abs(span.high));
      const within = span.how === 'corners' ? margin : 0.05 * (span.high - span.low) + margin;
      let [low, high] = [Infinity, -Infinity];
      for (let i = 0; i < 300; i++) {
        const value = at([1 + 2 * random(), 2 + 2 * random(), 3 + 4 * random()]);
        expect(value, text).toBeGreaterThanOrEqual(span.low - within);
        expect(value, text).toBeLessThanOrEqual(span.high + within);
      }
      for (const corner of CORNERS) {
        low = Math.min(low, at(corner));
        high = Math.max(high, at(corner));
      }
      if (span.how !== 'corners') continue;
      expect(Math.abs(low - span.low), text).toBeLessThan(margin);
      expect(Math.abs(high - span.high), text).toBeLessThan(margin);
    }
  });
});

const CORNERS = [1, 3].flatMap((p) => [2, 4].flatMap((q) => [3, 7].map((r) => [p, q, r])));

interface Formula {
  readonly text: string;
  at(point: readonly number[]): number;
}

/** A random formula in p, q and r whose denominators do not vanish, with its values. */
function randomFormula(random: () => number): Formula {
  const top = randomSum(random, random() < 0.3 ? -1 : 1);
  if (random() < 0.5) return top;
  const bottom = randomSum(random, 1);
  return {
    text: `(${top.text})/(${bottom.text})`,
    at: (point) => top.at(point) / bottom.at(point),
  };
}

function randomSum(random: () => number, sign: 1 | -1): Formula {
  const [a, b] = [randomProduct(random), randomProduct(random)];
  return {
    text: `${a.text} ${sign < 0 ? '-' : '+'} ${b.text}`,
    at: (point) => a.at(point) + sign * b.at(point),
  };
}

function randomProduct(random: () => number): Formula {
  const [factor, i, k] = [
    [1, 5],
    [0, 2],
    [0, 2],
  ].map(([low, high]) => randomInteger(random, low, high));
  return {
    text: `${factor}*${'pqr'[i]}*${'pqr'[k]}`,
    at: (point) => factor * point[i] * point[k],
  };
}
