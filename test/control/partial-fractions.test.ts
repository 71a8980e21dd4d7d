import { describe, expect, test } from 'vitest';
import {
  addRatios,
  equalRatios,
  mulRatios,
  powRatio,
  sumRatios,
  type Ratio,
} from '../../src/algebra/index.ts';
import { degreeInS, partialFractions } from '../../src/control/index.ts';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { found, read } from './formulas.ts';

function whole(r: Ratio): Ratio {
  const { polynomial, terms } = found(partialFractions(r));
  const entire = polynomial.map((c, k) => mulRatios(c, powRatio(read('s'), k)));
  return sumRatios([...entire, ...terms.map((t) => t.ratio)]);
}

const FORMS: readonly ((random: () => number) => string)[] = [
  (r) => `(s + ${randomInteger(r, 0, 4)})`,
  (r) => `(s - ${randomInteger(r, 1, 4)})^2`,
  () => '(s + a)',
  () => '(b*s + a)^2',
  (r) => `(s^2 + ${randomInteger(r, 1, 5)})`,
  () => '(s^2 + 2*z*w*s + w^2)',
  () => '(m*s^2 + k)^2',
];

describe('partial fractions', () => {
  test('recombine exactly on random products with repeated and symbolic factors', () => {
    const random = seededRandom(12);
    for (let round = 0; round < 60; round++) {
      const count = randomInteger(random, 1, 3);
      const factors = Array.from({ length: count }, () =>
        FORMS[randomInteger(random, 0, 6)](random),
      );
      const numerator = `${randomInteger(random, 1, 5)}*s^${randomInteger(random, 0, 5)} + K*s + ${randomInteger(random, 1, 3)}`;
      const h = read(`(${numerator})/(${factors.join('*')})`);
      expect(equalRatios(whole(h), h), factors.join(' ')).toBe(true);
    }
  });

  test('each numerator has a lower degree than its factor', () => {
    const { terms } = found(partialFractions(read('1/((s + 1)^3*(s^2 + 4)^2)')));
    expect(terms.every((t) => t.numerator.length <= degreeInS(t.factor))).toBe(true);
    expect(terms.map((t) => t.power)).toEqual(expect.arrayContaining([1, 2, 3]));
  });

  test('a product with distinct real poles, M. Abramowitz, I. A. Stegun, NBS AMS 55, 29.3.12 (from memory)', () => {
    const { terms } = found(partialFractions(read('1/((s + a)*(s + b))')));
    const wanted = [read('1/((b - a)*(s + a))'), read('1/((a - b)*(s + b))')];
    expect(terms).toHaveLength(2);
    for (const w of wanted) expect(terms.some((t) => equalRatios(t.ratio, w))).toBe(true);
    expect(equalRatios(sumRatios(terms.map((t) => t.ratio)), addRatios(wanted[0], wanted[1]))).toBe(
      true,
    );
  });

  test('an improper ratio has a polynomial part', () => {
    const { polynomial, terms } = found(partialFractions(read('(s^3 + 1)/(s + 2)')));
    expect(polynomial).toEqual([read('4'), read('0-2'), read('1')]);
    expect(terms.map((t) => t.ratio)).toEqual([read('(0-7)/(s + 2)')]);
  });

  test('a cubic with symbols is refused, with the way out', () => {
    expect(partialFractions(read('1/(J*s^3 + Kd*s^2 + Kp*s + Ki)'))).toMatchObject({
      code: 'needs-numbers',
      reason:
        'a factor of degree 3 of the denominator does not split with symbols; give numbers for them',
    });
  });

  test('dead time is refused', () => {
    expect(partialFractions(read('exp(0-s*Td)/(s + 1)'))).toMatchObject({ code: 'dead-time' });
  });
});
