import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  coefficientsIn,
  degreeIn,
  determinant,
  discriminant,
  gcdPolynomials,
  isZeroPolynomial,
  laplace,
  mulPolynomials,
  polynomialKey,
  resultant,
  symbol,
  zeroPolynomial,
  type Generator,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { nonzeroPolynomials, RUNS } from './arbitraries.ts';
import { readPolynomial } from './text.ts';

/** The Sylvester matrix: n shifted rows of a over m shifted rows of b, highest power first. */
function sylvester(a: Polynomial, b: Polynomial, g: Generator): Polynomial[][] {
  const [m, n] = [degreeIn(a, g), degreeIn(b, g)];
  const rows = (p: Polynomial, count: number): Polynomial[][] =>
    Array.from({ length: count }, (_, shift) => {
      const row = new Array<Polynomial>(m + n).fill(zeroPolynomial);
      [...coefficientsIn(p, g)].reverse().forEach((c, k) => (row[shift + k] = c));
      return row;
    });
  return [...rows(a, n), ...rows(b, m)];
}

describe('the resultant', () => {
  it('is the determinant of the Sylvester matrix, found by another method', () => {
    const p = nonzeroPolynomials({ generators: 3, terms: 4, degree: 3 });
    fc.assert(
      fc.property(p, p, (a, b) => {
        expect(polynomialKey(resultant(a, b, laplace))).toBe(
          polynomialKey(determinant(sylvester(a, b, laplace))),
        );
      }),
      RUNS,
    );
  });

  it('vanishes exactly where there is a common factor in the variable', () => {
    const p = nonzeroPolynomials({ generators: 2, terms: 3, degree: 2 });
    fc.assert(
      fc.property(p, p, p, (a, b, c) => {
        const [x, y] = [mulPolynomials(a, c), mulPolynomials(b, c)];
        if (degreeIn(x, laplace) + degreeIn(y, laplace) === 0) return;
        const shared = degreeIn(gcdPolynomials(x, y), laplace) > 0;
        expect(isZeroPolynomial(resultant(x, y, laplace))).toBe(shared);
      }),
      RUNS,
    );
  });

  it('of the classic pair is ±260708 (Knuth, TAOCP vol. 2, section 4.6.1, the subresultant sequence; from memory)', () => {
    const u = readPolynomial('s^8 + s^6 - 3*s^4 - 3*s^3 + 8*s^2 + 2*s - 5');
    const v = readPolynomial('3*s^6 + 5*s^4 - 4*s^2 - 9*s + 21');
    expect(polynomialKey(resultant(u, v, laplace))).toBe(polynomialKey(readPolynomial('260708')));
    expect(polynomialKey(determinant(sylvester(u, v, laplace)))).toBe(
      polynomialKey(readPolynomial('260708')),
    );
  });
});

describe('the discriminant (standard formulas; from memory)', () => {
  it.each([
    ['a*x^2 + b*x + c', 'b^2 - 4*a*c'],
    ['x^3 + p*x + q', '-4*p^3 - 27*q^2'],
    ['a*x^3 + b*x^2 + c*x + d', 'b^2*c^2 - 4*a*c^3 - 4*b^3*d - 27*a^2*d^2 + 18*a*b*c*d'],
    ['x^4 + q*x + r', '-27*q^4 + 256*r^3'],
    ['x^5 + a*x + b', '3125*b^4 + 256*a^5'],
    ['a*x + b', '1'],
  ])('of %s is %s', (p, expected) => {
    expect(polynomialKey(discriminant(readPolynomial(p), symbol('x')))).toBe(
      polynomialKey(readPolynomial(expected)),
    );
  });
});
