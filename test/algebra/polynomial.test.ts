import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addPolynomials,
  addRational,
  coefficientsIn,
  contentOf,
  degreeIn,
  derivativePolynomial,
  divideExactly,
  equalPolynomials,
  evaluatePolynomial,
  generatorPolynomial,
  generatorsOf,
  laplace,
  mulPolynomials,
  mulRational,
  negPolynomial,
  onePolynomial,
  polynomialFromCoefficients,
  polynomialKey,
  polynomialOfTermList,
  powPolynomial,
  powRational,
  primitivePart,
  pseudoRemainder,
  rational,
  scalePolynomial,
  subPolynomials,
  subRational,
  sumPolynomials,
  symbol,
  termsOf,
  totalDegree,
  zeroPolynomial,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { GENERATORS, nonzeroPolynomials, points, polynomials, RUNS } from './arbitraries.ts';
import { readPolynomial } from './text.ts';

const shape = { generators: 5, terms: 7, degree: 3 };
const big = { generators: 3, terms: 6, degree: 40, size: 10n ** 30n };

/** 30 generators with mixed powers, whose packed monomials do not fit into one number. */
function wide(from: number): Polynomial {
  const names = Array.from({ length: 30 }, (_, k) => generatorPolynomial(symbol(`w${k}`)));
  return sumPolynomials(
    names.map((w, k) =>
      mulPolynomials(powPolynomial(w, 1 + ((k + from) % 7)), names[(7 * k + from) % 30]),
    ),
  );
}

describe('polynomial arithmetic', () => {
  it.each([shape, big])('agrees with arithmetic on values at random points (%o)', (kind) => {
    fc.assert(
      fc.property(polynomials(kind), polynomials(kind), points(), (p, q, at) => {
        const [x, y] = [evaluatePolynomial(p, at), evaluatePolynomial(q, at)];
        expect(evaluatePolynomial(addPolynomials(p, q), at)).toEqual(addRational(x, y));
        expect(evaluatePolynomial(subPolynomials(p, q), at)).toEqual(subRational(x, y));
        expect(evaluatePolynomial(mulPolynomials(p, q), at)).toEqual(mulRational(x, y));
        expect(evaluatePolynomial(powPolynomial(p, 3), at)).toEqual(powRational(x, 3));
      }),
      { ...RUNS, numRuns: 40 },
    );
  });

  it('obeys the laws of a commutative ring, form by form', () => {
    fc.assert(
      fc.property(polynomials(shape), polynomials(shape), polynomials(shape), (p, q, r) => {
        const left = mulPolynomials(addPolynomials(p, q), r);
        const right = addPolynomials(mulPolynomials(r, q), mulPolynomials(r, p));
        expect(polynomialKey(left)).toBe(polynomialKey(right));
        expect(equalPolynomials(left, right)).toBe(true);
        expect(polynomialKey(subPolynomials(p, p))).toBe(polynomialKey(zeroPolynomial));
        expect(equalPolynomials(addPolynomials(p, negPolynomial(p)), zeroPolynomial)).toBe(true);
      }),
      RUNS,
    );
  });

  it('keeps only generators that occur, in canonical order', () => {
    const p = readPolynomial('(b + a + s)*(b - a)');
    expect(generatorsOf(p).map((g) => g.name)).toEqual(['s', 'a', 'b']);
    expect(generatorsOf(subPolynomials(p, readPolynomial('s*(b - a)'))).map((g) => g.name)).toEqual(
      ['a', 'b'],
    );
  });

  it('gives one form whatever the order of the terms', () => {
    const terms = termsOf(readPolynomial('(s + a)^3*(b - 2)'));
    const reversed = polynomialOfTermList([...terms].reverse());
    expect(polynomialKey(reversed)).toBe(polynomialKey(polynomialOfTermList(terms)));
  });

  it('works beyond the packed form: 30 generators', () => {
    const [p, q] = [wide(0), wide(3)];
    const product = mulPolynomials(p, q);
    const at = (g: { name: string }) => rational(Number(g.name.slice(1)) - 11, 3);
    expect(evaluatePolynomial(product, at)).toEqual(
      mulRational(evaluatePolynomial(p, at), evaluatePolynomial(q, at)),
    );
    expect(equalPolynomials(divideExactly(product, p) as Polynomial, q)).toBe(true);
    expect(divideExactly(addPolynomials(product, onePolynomial), p)).toBeNull();
    const sum = addPolynomials(product, p);
    expect(equalPolynomials(subPolynomials(sum, product), p)).toBe(true);
  });
});

describe('the parts of a polynomial', () => {
  it('are its coefficients in any generator, and put it together again', () => {
    fc.assert(
      fc.property(polynomials(shape), fc.constantFrom(...GENERATORS.slice(0, 5)), (p, g) => {
        const coefficients = coefficientsIn(p, g);
        expect(coefficients.length).toBe(degreeIn(p, g) + 1);
        expect(coefficients.every((c) => !generatorsOf(c).includes(g))).toBe(true);
        expect(polynomialKey(polynomialFromCoefficients(coefficients, g))).toBe(polynomialKey(p));
      }),
      RUNS,
    );
  });

  it('are its content and its primitive part', () => {
    fc.assert(
      fc.property(polynomials(shape), fc.bigInt({ min: 1n, max: 99n }), (p, k) => {
        const scaled = scalePolynomial(p, -k);
        expect(contentOf(scaled)).toBe(contentOf(p) * k);
        expect(
          equalPolynomials(scalePolynomial(primitivePart(scaled), contentOf(scaled)), scaled),
        ).toBe(true);
      }),
      RUNS,
    );
  });

  it('has degree -1 and no coefficients where it is zero', () => {
    expect(degreeIn(zeroPolynomial, laplace)).toBe(-1);
    expect(totalDegree(zeroPolynomial)).toBe(-1);
    expect(coefficientsIn(zeroPolynomial, laplace)).toEqual([]);
    expect(totalDegree(readPolynomial('s^2*a + a^4*b'))).toBe(5);
  });

  it('is differentiated by the product rule', () => {
    fc.assert(
      fc.property(polynomials(shape), polynomials(shape), (p, q) => {
        const slope = derivativePolynomial(mulPolynomials(p, q), laplace);
        const rule = addPolynomials(
          mulPolynomials(derivativePolynomial(p, laplace), q),
          mulPolynomials(p, derivativePolynomial(q, laplace)),
        );
        expect(polynomialKey(slope)).toBe(polynomialKey(rule));
      }),
      RUNS,
    );
  });
});

describe('division', () => {
  it.each([shape, big])('finds the cofactor of a product (%o)', (kind) => {
    fc.assert(
      fc.property(nonzeroPolynomials(kind), polynomials(kind), (p, q) => {
        const quotient = divideExactly(mulPolynomials(p, q), p);
        expect(quotient && polynomialKey(quotient)).toBe(polynomialKey(q));
      }),
      RUNS,
    );
  });

  it('answers null exactly where multiplying back fails', () => {
    fc.assert(
      fc.property(polynomials(shape), nonzeroPolynomials(shape), polynomials(shape), (p, q, r) => {
        const dividend = addPolynomials(mulPolynomials(p, q), r);
        const quotient = divideExactly(dividend, q);
        const possible = divideExactly(r, q);
        expect(quotient === null).toBe(possible === null);
        if (quotient) expect(equalPolynomials(mulPolynomials(quotient, q), dividend)).toBe(true);
      }),
      RUNS,
    );
  });

  it('does not divide over the rationals: x is not a multiple of 2 x', () => {
    expect(divideExactly(readPolynomial('s'), readPolynomial('2*s'))).toBeNull();
    expect(divideExactly(readPolynomial('s'), readPolynomial('a'))).toBeNull();
  });

  it('with remainder satisfies lc(b)^(m-n+1) a = q b + r, so that r vanishes where b does', () => {
    fc.assert(
      fc.property(polynomials(shape), nonzeroPolynomials(shape), (a, b) => {
        const [m, n] = [degreeIn(a, laplace), degreeIn(b, laplace)];
        if (m < n || n < 1) return;
        const rest = pseudoRemainder(a, b, laplace);
        expect(degreeIn(rest, laplace)).toBeLessThan(n);
        const lead = coefficientsIn(b, laplace)[n];
        const scaled = mulPolynomials(powPolynomial(lead, m - n + 1), a);
        expect(divideExactly(subPolynomials(scaled, rest), b)).not.toBeNull();
      }),
      RUNS,
    );
  });

  it('gives the published pseudo-remainder (Knuth, TAOCP vol. 2, 3rd ed., section 4.6.1, example (9); from memory, checked by hand)', () => {
    const u = readPolynomial('s^8 + s^6 - 3*s^4 - 3*s^3 + 8*s^2 + 2*s - 5');
    const v = readPolynomial('3*s^6 + 5*s^4 - 4*s^2 - 9*s + 21');
    expect(polynomialKey(pseudoRemainder(u, v, laplace))).toBe(
      polynomialKey(readPolynomial('-15*s^4 + 3*s^2 - 9')),
    );
  });
});
