import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  equalPolynomials,
  factorPolynomial,
  laplace,
  mulPolynomials,
  polynomialKey,
  powPolynomial,
  productOfPolynomials,
  scalePolynomial,
  squareFreeFactors,
  squareFreePart,
  squareRootOfPolynomial,
  zeroPolynomial,
  type Factorization,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { nonzeroPolynomials, RUNS, type Shape } from './arbitraries.ts';
import { readPolynomial } from './text.ts';

function expand({ unit, factors }: Factorization): Polynomial {
  const powers = factors.map(({ factor, multiplicity }) => powPolynomial(factor, multiplicity));
  return scalePolynomial(productOfPolynomials(powers), unit);
}

function keysOf({ factors }: Factorization): string[] {
  return factors
    .map(({ factor, multiplicity }) => `${polynomialKey(factor)}^${multiplicity}`)
    .sort();
}

const SHAPES: readonly Shape[] = [
  { generators: 1, terms: 4, degree: 3 },
  { generators: 2, terms: 3, degree: 2 },
  { generators: 6, terms: 3, degree: 1 },
];

describe('factors', () => {
  it.each(SHAPES)('multiply back to the polynomial (%o)', (shape) => {
    const p = nonzeroPolynomials(shape);
    fc.assert(
      fc.property(p, p, p, (a, b, c) => {
        const product = mulPolynomials(mulPolynomials(a, b), mulPolynomials(b, c));
        expect(equalPolynomials(expand(factorPolynomial(product)), product)).toBe(true);
      }),
      RUNS,
    );
  });

  it.each<Shape>([
    { generators: 4, terms: 3, degree: 1, size: 2n },
    { generators: 1, terms: 4, degree: 4, size: 10n ** 6n },
    { generators: 1, terms: 3, degree: 3, size: 3n },
  ])('are found however the product was grouped (%o)', (shape) => {
    const p = nonzeroPolynomials(shape);
    fc.assert(
      fc.property(p, p, p, (a, b, c) => {
        const apart = [a, b, c].flatMap((q) =>
          keysOf(factorPolynomial(q)).map((k) => k.split('^')[0]),
        );
        const whole = keysOf(factorPolynomial(productOfPolynomials([a, b, c])));
        expect(new Set(whole.map((k) => k.split('^')[0]))).toEqual(new Set(apart));
      }),
      RUNS,
    );
  });

  it.each([['-6*(s - a)^2*(J*s + b)*c^3', -6n, ['c^3', 's - a^2', 'J*s + b^1']]])(
    'of %s include monomials, contents and repetitions',
    (text, unit) => {
      const result = factorPolynomial(readPolynomial(text));
      expect(result.unit).toBe(unit);
      expect(result.factors.map(({ multiplicity }) => multiplicity).sort()).toEqual([1, 2, 3]);
    },
  );

  it.each<[string, string[]]>([
    ['s^2 - a^2', ['s - a', 's + a']],
    ['s^2 + a^2', ['s^2 + a^2']],
    ['(m*s + b)*(J*s^2 + c*s + k)', ['m*s + b', 'J*s^2 + c*s + k']],
    ['a^3 - b^3', ['a - b', 'a^2 + a*b + b^2']],
    ['s^4 - 1', ['s - 1', 's + 1', 's^2 + 1']],
    ['s^4 + 4', ['s^2 + 2*s + 2', 's^2 - 2*s + 2']],
    ['s^4 - 10*s^2 + 1', ['s^4 - 10*s^2 + 1']],
    ['6*s^3 - 11*s^2 + 6*s - 1', ['s - 1', '2*s - 1', '3*s - 1']],
    ['s^3 + a^3*s + b^3', ['s^3 + a^3*s + b^3']],
    ['s^12 - 1', ['s - 1', 's + 1', 's^2 + s + 1', 's^2 - s + 1', 's^2 + 1', 's^4 - s^2 + 1']],
  ])('of %s are found', (text, expected) => {
    const found = factorPolynomial(readPolynomial(text)).factors;
    expect(found.map(({ factor }) => polynomialKey(factor)).sort()).toEqual(
      expected.map((p) => polynomialKey(readPolynomial(p))).sort(),
    );
  });

  it('of zero and of numbers are none', () => {
    expect(factorPolynomial(zeroPolynomial)).toEqual({ unit: 0n, factors: [] });
    expect(factorPolynomial(readPolynomial('-12'))).toEqual({ unit: -12n, factors: [] });
  });
});

describe('the square-free decomposition', () => {
  it('multiplies back, with square-free and coprime parts', () => {
    const p = readPolynomial('(s + a)*(s + b)^2*(s^2 + c)^2*(s - 1)^5');
    const parts = squareFreeFactors(p, laplace);
    const product = productOfPolynomials(
      parts.map(({ factor, multiplicity }) => powPolynomial(factor, multiplicity)),
    );
    expect(equalPolynomials(product, p)).toBe(true);
    expect(parts.map(({ multiplicity }) => multiplicity)).toEqual([1, 2, 5]);
    const part = squareFreePart(p, laplace);
    expect(polynomialKey(part)).toBe(
      polynomialKey(readPolynomial('(s + a)*(s + b)*(s^2 + c)*(s - 1)')),
    );
  });
});

describe('the square root of a polynomial', () => {
  it('is found for squares and only for squares', () => {
    const p = nonzeroPolynomials({ generators: 3, terms: 5, degree: 3 });
    fc.assert(
      fc.property(p, (a) => {
        const square = mulPolynomials(a, a);
        const root = squareRootOfPolynomial(square);
        expect(root && equalPolynomials(mulPolynomials(root, root), square)).toBe(true);
        expect(squareRootOfPolynomial(scalePolynomial(square, 2n))).toBeNull();
        expect(squareRootOfPolynomial(scalePolynomial(square, -1n))).toBeNull();
      }),
      RUNS,
    );
  });
});
