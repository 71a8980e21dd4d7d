import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addFractions,
  addRatios,
  divFractions,
  divRatios,
  equalRatios,
  fractionOfRatio,
  isZeroFraction,
  mulFractions,
  mulRatios,
  negFraction,
  polynomialKey,
  powFraction,
  powRatio,
  ratioOfFraction,
  type Fraction,
} from '../../src/algebra/index.ts';
import { ratios, RUNS } from './arbitraries.ts';
import { read, readPolynomial } from './text.ts';

const fraction = (text: string): Fraction => fractionOfRatio(read(text));

function expectFraction(f: Fraction, num: string, den: string): void {
  expect([polynomialKey(f.num), polynomialKey(f.den)]).toEqual([
    polynomialKey(readPolynomial(num)),
    polynomialKey(readPolynomial(den)),
  ]);
}

describe('uncancelled fractions', () => {
  it('have the value of the ratios', () => {
    const shape = { generators: 3, terms: 3, degree: 2 };
    fc.assert(
      fc.property(ratios(shape), ratios(shape), (a, b) => {
        const [x, y] = [fractionOfRatio(a), fractionOfRatio(b)];
        expect(equalRatios(ratioOfFraction(addFractions(x, y)), addRatios(a, b))).toBe(true);
        expect(equalRatios(ratioOfFraction(mulFractions(x, y)), mulRatios(a, b))).toBe(true);
        expect(equalRatios(ratioOfFraction(powFraction(x, 2)), powRatio(a, 2))).toBe(true);
        if (isZeroFraction(y)) return;
        expect(equalRatios(ratioOfFraction(divFractions(x, y)), divRatios(a, b))).toBe(true);
      }),
      RUNS,
    );
  });

  it('keep a mode that cancels in a product', () => {
    expectFraction(
      mulFractions(fraction('(s - 1)/(s + 2)'), fraction('1/(s - 1)')),
      's - 1',
      '(s + 2)*(s - 1)',
    );
    expectFraction(
      mulFractions(fraction('a*(s - 1)/b'), fraction('b/(a*(s - 1))')),
      's - 1',
      's - 1',
    );
  });

  it('cancel what is free of s', () => {
    expectFraction(
      mulFractions(fraction('2*a*s/b'), fraction('b/(4*a*(s + 1))')),
      's',
      '2*(s + 1)',
    );
  });

  it('cancel poles common to both sides of a quotient, and only those', () => {
    expectFraction(divFractions(fraction('1/(s*(s + 1))'), fraction('1/s')), '1', 's + 1');
    expectFraction(divFractions(fraction('s/(s + 1)'), fraction('s')), 's', '(s + 1)*s');
  });

  it('add over the least common denominator and cancel nothing that contains s after', () => {
    expectFraction(addFractions(fraction('1/s'), fraction('1/(s*(s + 1))')), 's + 2', 's*(s + 1)');
    const sum = addFractions(fraction('1/s + 0'), fraction('(s - 1)/s'));
    expectFraction(sum, 's', 's');
    const gap = addFractions(fraction('1/s'), negFraction(fraction('1/s')));
    expectFraction(gap, '0', '1');
  });

  it('invert for negative powers', () => {
    expectFraction(powFraction(fraction('2*s/(s + a)'), -2), '(s + a)^2', '4*s^2');
  });
});
