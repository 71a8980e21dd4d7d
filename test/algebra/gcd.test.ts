import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Budget, BudgetExceeded } from '../../src/base/index.ts';
import {
  contentIn,
  contentOf,
  divideExactly,
  equalPolynomials,
  gcdPolynomials,
  isOnePolynomial,
  lcmPolynomials,
  leadingCoefficientSign,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  polynomialKey,
  scalePolynomial,
  zeroPolynomial,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { normalPart } from '../../src/algebra/polynomial.ts';
import { lastRemainder } from '../../src/algebra/remainder-sequence.ts';
import { nonzeroPolynomials, RUNS, type Shape } from './arbitraries.ts';
import { readPolynomial } from './text.ts';

/** Proves g to be the gcd of a and b, given a common divisor: it divides both and the cofactors are coprime. */
function certify(a: Polynomial, b: Polynomial, known: Polynomial): void {
  const g = gcdPolynomials(a, b);
  expect(contentOf(g)).toBe(1n);
  expect(leadingCoefficientSign(g)).toBe(1);
  const left = divideExactly(normalPart(a), g);
  const right = divideExactly(normalPart(b), g);
  expect(left && right && divideExactly(g, normalPart(known))).not.toBeNull();
  expect(isOnePolynomial(gcdPolynomials(left as Polynomial, right as Polynomial))).toBe(true);
}

const SHAPES: readonly Shape[] = [
  { generators: 1, terms: 5, degree: 6, size: 10n ** 12n },
  { generators: 2, terms: 5, degree: 4 },
  { generators: 4, terms: 6, degree: 2, size: 1000n },
  { generators: 9, terms: 8, degree: 1 },
  { generators: 9, terms: 6, degree: 3, size: 10n ** 20n },
];

describe('the greatest common divisor', () => {
  it.each(SHAPES)('divides both, and leaves coprime cofactors (%o)', (shape) => {
    const p = nonzeroPolynomials(shape);
    fc.assert(
      fc.property(p, p, p, (a, b, c) => certify(mulPolynomials(a, c), mulPolynomials(b, c), c)),
      { ...RUNS, numRuns: 30 },
    );
  });

  it('agrees with the subresultant sequence, an independent method', () => {
    const p = nonzeroPolynomials({ generators: 2, terms: 4, degree: 3 });
    fc.assert(
      fc.property(p, p, p, (a, b, c) => {
        const [x, y] = [mulPolynomials(a, c), mulPolynomials(b, c)];
        const [s] = [...x.generators].filter((g) => y.generators.includes(g));
        if (!s) return;
        const modular = gcdPolynomials(x, y);
        const last = lastRemainder(x, y, s);
        const byRemainders = divideExactly(normalPart(last), contentIn(last, s)) as Polynomial;
        const byImages = divideExactly(modular, contentIn(modular, s)) as Polynomial;
        expect(polynomialKey(normalPart(byRemainders))).toBe(polynomialKey(byImages));
      }),
      RUNS,
    );
  });

  it('finds nothing in the classic coprime pair (Knuth, TAOCP vol. 2, section 4.6.1; from memory)', () => {
    const u = readPolynomial('s^8 + s^6 - 3*s^4 - 3*s^3 + 8*s^2 + 2*s - 5');
    const v = readPolynomial('3*s^6 + 5*s^4 - 4*s^2 - 9*s + 21');
    expect(isOnePolynomial(gcdPolynomials(u, v))).toBe(true);
  });

  it.each([
    ['4*s', '6*s', 's'],
    ['s^2*a - a', 's*a^2 - a^2', '(s - 1)*a'],
    ['(J*s + b)*(s^2 + 1)', '(J*s + b)*(a + c)', 'J*s + b'],
    ['(s + a)^3*(s + b)', '(s + a)^2*(s + c)^5', '(s + a)^2'],
    ['(s*a + b*c)*(s + 1)', '(s*a + b*c)*(a + 1)', 's*a + b*c'],
    ['a*s + b', 'c*s + d', '1'],
    ['-2*s - 2*a', '3*s + 3*a', 's + a'],
  ])('of %s and %s is %s', (a, b, expected) => {
    const g = gcdPolynomials(readPolynomial(a), readPolynomial(b));
    expect(polynomialKey(g)).toBe(polynomialKey(readPolynomial(expected)));
  });

  it('settles zero and constants', () => {
    const p = readPolynomial('-4*s + 6');
    expect(polynomialKey(gcdPolynomials(zeroPolynomial, p))).toBe(
      polynomialKey(readPolynomial('2*s - 3')),
    );
    expect(equalPolynomials(gcdPolynomials(zeroPolynomial, zeroPolynomial), zeroPolynomial)).toBe(
      true,
    );
    expect(isOnePolynomial(gcdPolynomials(p, scalePolynomial(onePolynomial, 12n)))).toBe(true);
  });

  it('survives coefficients that vanish modulo the first primes', () => {
    const common = readPolynomial('(s^2*b + a*s + 1)*(67108859*s^2*a + b + c)');
    const a = mulPolynomials(readPolynomial('67108859*s^3*a + c'), common);
    const b = mulPolynomials(readPolynomial('(67108859*s^2*a + c*b + s)*(s + c)'), common);
    certify(a, b, common);
  });

  it('has 41-digit coefficients where the inputs have them', () => {
    const digits = '1'.padEnd(41, '7');
    const c = readPolynomial(`${digits}*s^2*a + ${digits}1*b`);
    const g = gcdPolynomials(
      mulPolynomials(c, readPolynomial('s*b + a + 2')),
      mulPolynomials(negPolynomial(c), readPolynomial('s*a - b^2 + 1')),
    );
    expect(polynomialKey(g)).toBe(polynomialKey(normalPart(c)));
  });
});

describe('a budget', () => {
  it('stops a gcd and a product that cost too much, and says where', () => {
    const a = readPolynomial('(s + a + b + c + d)^4*(s*a + b*c + d)');
    const b = readPolynomial('(s + a + b + c + d)^4*(s*b + a*d + c)');
    expect(() => gcdPolynomials(a, b, new Budget(100))).toThrow(BudgetExceeded);
    expect(() => mulPolynomials(a, b, new Budget(100))).toThrow(
      'the product of two polynomials was stopped at',
    );
    const budget = new Budget(10_000_000);
    gcdPolynomials(a, b, budget);
    expect(budget.spent).toBeGreaterThan(0);
  });
});

describe('the least common multiple', () => {
  it('is a multiple of both, and no more than the product over the gcd', () => {
    const p = nonzeroPolynomials({ generators: 3, terms: 4, degree: 2 });
    fc.assert(
      fc.property(p, p, (a, b) => {
        const multiple = lcmPolynomials(a, b);
        expect(divideExactly(multiple, a)).not.toBeNull();
        expect(divideExactly(multiple, b)).not.toBeNull();
        const product = mulPolynomials(normalPart(a), normalPart(b));
        const both = mulPolynomials(normalPart(multiple), gcdPolynomials(a, b));
        expect(equalPolynomials(both, product)).toBe(true);
      }),
      RUNS,
    );
  });

  it('keeps integer contents', () => {
    const multiple = lcmPolynomials(readPolynomial('4*s'), readPolynomial('-6*s*a'));
    expect(polynomialKey(multiple)).toBe(polynomialKey(readPolynomial('12*s*a')));
  });
});
