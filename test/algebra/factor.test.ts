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

  it.each<[string[]]>([
    [['y*z + x + 20', 'x*y + z + 10', 'x*z + y + 30']],
    [['x^3*(z + y) + z - 11', 'x^2*(z^2 + y^2) + y + 90']],
    [['y*z^3 + x*y*z + y^2 + x^3', 'x*(z^4 + 1) + z + x^3*y^2']],
  ])(
    'of the product of %j are these (P. S. Wang, Math. Comp. 32 (1978), 1215–1231, examples; from memory)',
    (texts) => {
      const written = texts.map(readPolynomial);
      const result = factorPolynomial(productOfPolynomials(written));
      expect(result.factors.map((f) => polynomialKey(f.factor)).sort()).toEqual(
        written.map(polynomialKey).sort(),
      );
    },
  );

  it.each<[string, string[]]>([
    [
      '(a*s^3 + b^3*s + a^3 - 2)*(b*s^3 + a^3 + 5*b^3*s + 7)*(s^3 + a^3*b^3 + 1)',
      ['a*s^3 + b^3*s + a^3 - 2', 'b*s^3 + a^3 + 5*b^3*s + 7', 's^3 + a^3*b^3 + 1'],
    ],
    ['s^9 - a^9*b^9', ['s - a*b', 's^2 + s*a*b + a^2*b^2', 's^6 + s^3*a^3*b^3 + a^6*b^6']],
    ['s^4 + s^3*a^3*b^3 + a^4 + b^4', ['s^4 + s^3*a^3*b^3 + a^4 + b^4']],
    [
      '(123456789012345678901*s^3 + a^3*b)*(s^3 - 98765432109876543210*a^4 + b^3)',
      ['123456789012345678901*s^3 + a^3*b', 's^3 - 98765432109876543210*a^4 + b^3'],
    ],
  ])('of %s, of high degree in every symbol, are found by lifting', (text, expected) => {
    const found = factorPolynomial(readPolynomial(text)).factors;
    expect(found.map(({ factor }) => polynomialKey(factor)).sort()).toEqual(
      expected.map((q) => polynomialKey(readPolynomial(q))).sort(),
    );
  });

  it('of high degree in every symbol are found however the product was grouped', () => {
    const p = nonzeroPolynomials({ generators: 3, terms: 4, degree: 4, size: 30n });
    fc.assert(
      fc.property(p, p, p, (a, b, c) => {
        const whole = factorPolynomial(productOfPolynomials([a, b, c]));
        expect(equalPolynomials(expand(whole), productOfPolynomials([a, b, c]))).toBe(true);
        const apart = [a, b, c].flatMap((q) => factorPolynomial(q).factors);
        expect(new Set(whole.factors.map((f) => polynomialKey(f.factor)))).toEqual(
          new Set(apart.map((f) => polynomialKey(f.factor))),
        );
      }),
      { ...RUNS, numRuns: 40 },
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
