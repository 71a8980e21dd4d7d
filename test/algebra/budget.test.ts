import { describe, expect, it } from 'vitest';
import { Budget, BudgetExceeded, DEFAULT_BUDGET } from '../../src/base/index.ts';
import {
  discriminant,
  divideExactly,
  equalPolynomials,
  factorPolynomial,
  gcdPolynomials,
  mulPolynomials,
  resultant,
  subPolynomials,
  symbol,
  type Polynomial,
} from '../../src/algebra/index.ts';
import { polynomialOfUnsortedTerms } from '../../src/algebra/terms.ts';

interface Size {
  readonly terms: number;
  readonly digits: number;
  readonly symbols: number;
  readonly degree: number;
}

/** A fixed random polynomial of a size; an exponent row that comes twice is left out. */
function randomPolynomial({ terms, digits, symbols, degree }: Size, seed: number): Polynomial {
  let state = seed;
  const below = (n: number): number => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * n);
  };
  const generators = Array.from({ length: symbols }, (_, k) => symbol(`x${10 + k}`));
  const rows = new Map<string, readonly number[]>();
  for (let k = 0; k < terms; k += 1) {
    const row = generators.map(() => below(degree + 1));
    rows.set(row.join(), row);
  }
  const coefficients = [...rows].map(() =>
    BigInt(Array.from({ length: digits }, () => 1 + below(9)).join('')),
  );
  return polynomialOfUnsortedTerms(
    generators,
    Int32Array.from([...rows.values()].flat()),
    coefficients,
  );
}

/** Two polynomials of a size with a common factor. */
function related(size: Size): readonly [Polynomial, Polynomial, Polynomial] {
  const common = randomPolynomial({ ...size, terms: 3 }, 1);
  const parts = [2, 3].map((seed) => randomPolynomial(size, seed));
  const [a, b] = parts.map((part) => mulPolynomials(part, common));
  return [a, b, common];
}

/** Runs within the default budget: it finishes, or stops with a message that names the step. */
function endsInBudget(run: (budget: Budget) => unknown): void {
  try {
    run(new Budget(DEFAULT_BUDGET));
  } catch (error) {
    if (!(error instanceof BudgetExceeded)) throw error;
    expect(error.message).toMatch(/ was stopped at .*\d/);
  }
}

describe('a problem that is too large stops within its budget', () => {
  it.each<[string, Size]>([
    ['100 000 terms', { terms: 100_000, digits: 5, symbols: 4, degree: 60 }],
    ['coefficients of 2 000 digits', { terms: 20, digits: 2000, symbols: 3, degree: 4 }],
    ['30 symbols', { terms: 40, digits: 3, symbols: 30, degree: 3 }],
    ['exponents of 500', { terms: 20, digits: 3, symbols: 4, degree: 500 }],
    ['all of these', { terms: 200, digits: 2000, symbols: 30, degree: 500 }],
  ])('with %s', (_, size) => {
    const [a, b, common] =
      size.terms > 1000
        ? [randomPolynomial(size, 1), randomPolynomial(size, 2), randomPolynomial(size, 3)]
        : related(size);
    const [g] = a.generators;
    endsInBudget((budget) => gcdPolynomials(a, b, budget));
    endsInBudget((budget) => divideExactly(a, common, budget));
    endsInBudget((budget) => mulPolynomials(a, b, budget));
    endsInBudget((budget) => factorPolynomial(a, budget));
    endsInBudget((budget) => discriminant(a, g, budget));
    endsInBudget((budget) => resultant(a, b, g, budget));
  });

  it('with one generator and degree 1 000', () => {
    const [a] = related({ terms: 8, digits: 5, symbols: 1, degree: 500 });
    expect(() => factorPolynomial(a, new Budget(DEFAULT_BUDGET))).toThrow(
      /^factoring a polynomial was stopped at degree \d+$/,
    );
  });

  it('and longer coefficients spend more', () => {
    const spentFor = (digits: number): number => {
      const [a, b] = related({ terms: 10, digits, symbols: 3, degree: 3 });
      const budget = new Budget(Number.MAX_SAFE_INTEGER);
      mulPolynomials(a, b, budget);
      return budget.spent;
    };
    expect(spentFor(2000)).toBeGreaterThan(10 * spentFor(5));
  });
});

describe('polynomials whose monomials do not fit a packed key', () => {
  it('multiply, divide and subtract as others do', () => {
    const [a, , common] = related({ terms: 30, digits: 4, symbols: 30, degree: 20 });
    const quotient = divideExactly(a, common) as Polynomial;
    expect(equalPolynomials(mulPolynomials(quotient, common), a)).toBe(true);
    expect(subPolynomials(a, mulPolynomials(common, quotient)).coefficients).toHaveLength(0);
    expect(divideExactly(subPolynomials(a, quotient), common)).toBeNull();
    const both = mulPolynomials(a, a);
    expect(equalPolynomials(divideExactly(both, a) as Polynomial, a)).toBe(true);
  });
});
