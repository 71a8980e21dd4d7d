import {
  coefficientsIn,
  contentOf,
  degreeIn,
  dependsOnLaplace,
  factorPolynomial,
  generatorsOf,
  isZeroPolynomial,
  monomialContent,
  negPolynomial,
  quotientOf,
  scalePolynomial,
  termCount,
  termsOf,
  type Generator,
  type Polynomial,
} from '../algebra/index.ts';
import { Budget, BudgetExceeded } from '../base/index.ts';
import type { Layout } from './writing.ts';

/**
 * A polynomial as sign · number · monomial · sums, the parts in which it is written. No sum has a common factor that
 * is a number or a monomial, and none begins with a minus where turning its sign avoids that.
 */
export interface Factored {
  readonly negative: boolean;
  readonly number: bigint;
  readonly monomial: ReadonlyMap<Generator, number>;
  readonly sums: readonly { readonly polynomial: Polynomial; readonly multiplicity: number }[];
}

/** Larger polynomials, and searches dearer than this, are written without looking for factors. */
const MOST_TERMS_TO_FACTOR = 60;
const FACTOR_BUDGET = 300_000;

/** Takes sign, number and monomial out of a polynomial other than zero; what is left is one sum, or none if it is 1. */
export function withoutContent(p: Polynomial, layout: Layout): Factored {
  const number = contentOf(p);
  const common = monomialContent(p);
  const rest = quotientOf(p, scalePolynomial(common, number));
  const monomial = new Map(termsOf(common)[0].exponents);
  const negative = looksNegative(rest, layout);
  if (termCount(rest) === 1) return { negative, number, monomial, sums: [] };
  const polynomial = negative ? negPolynomial(rest) : rest;
  return { negative, number, monomial, sums: [{ polynomial, multiplicity: 1 }] };
}

/** The same polynomial with its sum in factors, or null if it has only one or looking for them costs too much. */
export function inFactors(plain: Factored, layout: Layout): Factored | null {
  const found = plain.sums.length === 0 ? null : findFactors(plain.sums[0].polynomial);
  if (found === null || (found.factors.length === 1 && found.factors[0].multiplicity === 1)) {
    return null;
  }
  let negative = plain.negative !== found.unit < 0n;
  const sums = found.factors.map(({ factor, multiplicity }) => {
    const turned = looksNegative(factor, layout);
    if (turned && multiplicity % 2 === 1) negative = !negative;
    return { polynomial: turned ? negPolynomial(factor) : factor, multiplicity };
  });
  return { ...plain, negative, sums };
}

function findFactors(p: Polynomial): ReturnType<typeof factorPolynomial> | null {
  if (termsOf(p).length > MOST_TERMS_TO_FACTOR) return null;
  try {
    return factorPolynomial(p, new Budget(FACTOR_BUDGET));
  } catch (error) {
    if (error instanceof BudgetExceeded) return null;
    throw error;
  }
}

/** Whether the coefficient that would stand first is negative in all its terms. */
function looksNegative(p: Polynomial, layout: Layout): boolean {
  const main = mainOf(p, layout);
  if (main === null) return termsOf(p).every(({ coefficient }) => coefficient < 0n);
  const coefficients = coefficientsIn(p, main);
  const first =
    main === layout.main ? coefficients.at(-1) : coefficients.find((c) => !isZeroPolynomial(c));
  return first !== undefined && looksNegative(first, layout);
}

/** What a sum is collected by: a function of s if there is one (dead time), else the main variable, else nothing. */
export function mainOf(p: Polynomial, layout: Layout): Generator | null {
  if (layout.shape === 'expanded') return degreeIn(p, layout.main) > 0 ? layout.main : null;
  const generators = generatorsOf(p);
  const dead = generators.find((g) => g.kind === 'function' && dependsOnLaplace(g));
  return dead ?? (generators.includes(layout.main) ? layout.main : null);
}
