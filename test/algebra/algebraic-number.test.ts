import { describe, expect, test } from 'vitest';
import {
  algebraicNumber,
  algebraicToNumber,
  decimalBound,
  equalRatios,
  exactForm,
  isolateRealRoots,
  mulRational,
  powRational,
  rational,
  rationalToNumber,
  rationalToText,
  type AlgebraicNumber,
} from '../../src/algebra/index.ts';
import { randomInteger, seededRandom } from '../../src/numeric/index.ts';
import { polynomialOf, read } from '../control/formulas.ts';

function rootsOf(text: string): readonly AlgebraicNumber[] {
  const p = polynomialOf(text);
  return isolateRealRoots(p).map((interval) => algebraicNumber(p, interval));
}

test('a root knows its irreducible polynomial', () => {
  const roots = rootsOf('(x - 1/3)*(x^2 - 2)*(x^3 - 5)');
  expect(roots.map(({ polynomial }) => polynomial)).toEqual(
    ['x^2 - 2', '3*x - 1', 'x^2 - 2', 'x^3 - 5'].map(polynomialOf),
  );
});

describe('the exact form', () => {
  test.each([
    ['3*x - 1', ['1/3']],
    ['x^2 - 2', ['0 - sqrt(2)', 'sqrt(2)']],
    ['2*x^2 + 3*x - 7', ['(0 - 3 - sqrt(65))/4', '(0 - 3 + sqrt(65))/4']],
    ['x*(x - 5)', ['0', '5']],
  ])('of the roots of %s is written with square roots', (text, wanted) => {
    const forms = rootsOf(text).map((root) => exactForm(root));
    forms.forEach((form, k) => expect(form && equalRatios(form, read(wanted[k]))).toBe(true));
    expect(forms).toHaveLength(wanted.length);
  });

  test('of a root of a cubic is none', () => {
    expect(rootsOf('x^3 - 2').map((root) => exactForm(root))).toEqual([null]);
  });
});

describe('decimals', () => {
  const [root] = rootsOf('x^3 - 2');

  /** 2^(1/3) = 1.25992104989487316476721060727822835057…, OEIS A002580. */
  test.each([
    [6, 'down', '1.25992'],
    [6, 'up', '1.25993'],
    [38, 'down', '1.2599210498948731647672106072782283505'],
  ] as const)('to %i digits rounded %s', (digits, direction, wanted) => {
    const text = rationalToText(
      mulRational(decimalBound(root, digits, direction), power(digits - 1)),
    );
    expect(text).toBe(wanted.replace('.', ''));
  });

  test('enclose the root, whatever its size and sign', () => {
    const random = seededRandom(3);
    for (let round = 0; round < 100; round += 1) {
      const [n, d] = [randomInteger(random, -999, 999), 10 ** randomInteger(random, -6, 6)];
      if (n === 0) continue;
      const scale = d >= 1 ? `${d}` : `1/${Math.round(1 / d)}`;
      for (const each of rootsOf(`(${scale})*x^3 - (0 + ${n})`.replace('+ -', '- '))) {
        const [down, up] = (['down', 'up'] as const).map((way) => decimalBound(each, 5, way));
        const value = algebraicToNumber(each);
        expect(value).toBeCloseTo(Math.cbrt(n / d), 9);
        expect(rationalToNumber(down)).toBeLessThanOrEqual(value);
        expect(rationalToNumber(up)).toBeGreaterThanOrEqual(value);
        const gap = rationalToNumber(up) - rationalToNumber(down);
        expect(gap).toBeLessThanOrEqual(2e-4 * Math.abs(value));
      }
    }
  });

  const power = (exponent: number) => powRational(rational(10), exponent);
});
