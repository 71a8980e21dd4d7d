import { divRatios, factorPolynomial, ratioFromPolynomial } from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import {
  addComplex,
  complex,
  divideComplex,
  multiplyComplex,
  polynomialRoots,
  subtractComplex,
} from '../numeric/index.ts';
import type { Complex } from '../numeric/index.ts';
import { numberOf } from './compile.ts';
import { degreeInS, descendingInS } from './s-polynomial.ts';
import type { ResponseTerm } from './time-function.ts';

/** Coefficients of a polynomial in s divided by one of them, as numbers, highest power first. */
function numbersOver(p: Polynomial, by: Polynomial): number[] {
  const divisor = ratioFromPolynomial(by);
  return descendingInS(p).map((c) => numberOf(divRatios(ratioFromPolynomial(c), divisor)));
}

/** p(r + ε) as a polynomial in ε, lowest power first, by repeated synthetic division. */
function shifted(descending: readonly number[], r: Complex): Complex[] {
  let rest: Complex[] = descending.map((c) => complex(c));
  const result: Complex[] = [];
  while (rest.length > 0) {
    const sums: Complex[] = [];
    for (const c of rest) {
      const before = sums[sums.length - 1];
      sums.push(before ? addComplex(c, multiplyComplex(before, r)) : c);
    }
    result.push(sums[sums.length - 1]);
    rest = sums.slice(0, -1);
  }
  return result;
}

const zero = complex(0);

/** A monic factor of the denominator, highest power first, with its multiplicity. */
interface MonicFactor {
  readonly coefficients: readonly number[];
  readonly multiplicity: number;
}

/** The product of two power series, cut to a length. */
function mulSeries(a: readonly Complex[], b: readonly Complex[], length: number): Complex[] {
  return Array.from({ length }, (_, k) => {
    let sum = zero;
    for (let i = 0; i <= k; i++) {
      sum = addComplex(sum, multiplyComplex(a[i] ?? zero, b[k - i] ?? zero));
    }
    return sum;
  });
}

/**
 * The denominator at root + ε, divided by ε^m, as a series of m terms. Taken factor by factor: expanded, a denominator
 * with close roots would lose half of the digits.
 */
function denominatorAt(
  root: Complex,
  own: MonicFactor,
  factors: readonly MonicFactor[],
): readonly Complex[] {
  const length = own.multiplicity;
  let product: Complex[] = [complex(1)];
  for (const factor of factors) {
    const series = shifted(factor.coefficients, root).slice(factor === own ? 1 : 0);
    for (let k = 0; k < factor.multiplicity; k++) product = mulSeries(product, series, length);
  }
  return product;
}

/** Coefficients of 1/(s − r)^m, …, 1/(s − r) at a root r of a factor of multiplicity m; index 0 for the first. */
function principalPart(
  num: readonly number[],
  root: Complex,
  own: MonicFactor,
  factors: readonly MonicFactor[],
): Complex[] {
  const top = shifted(num, root);
  const bottom = denominatorAt(root, own, factors);
  const quotient: Complex[] = [];
  for (let k = 0; k < own.multiplicity; k++) {
    let rest = top[k] ?? zero;
    for (let i = 1; i <= k; i++) {
      rest = subtractComplex(rest, multiplyComplex(bottom[i], quotient[k - i]));
    }
    quotient.push(divideComplex(rest, bottom[0]));
  }
  return quotient;
}

const factorial = (n: number): number => (n < 2 ? 1 : n * factorial(n - 1));

/** c tᵏ/k! e^(root t), together with its conjugate if the root is complex. */
function termsAt(root: Complex, c: Complex, power: number, after: Ratio): ResponseTerm<number>[] {
  const scale = 1 / factorial(power);
  const base = { power, rate: root.re, after };
  if (root.im === 0) {
    return [{ ...base, coefficient: c.re * scale, frequency: 0, wave: 'none' }];
  }
  const pair = { ...base, frequency: root.im };
  return [
    { ...pair, coefficient: 2 * c.re * scale, wave: 'cos' },
    { ...pair, coefficient: -2 * c.im * scale, wave: 'sin' },
  ];
}

/**
 * The time terms of the strictly proper part of a ratio in s without other symbols, in decimals.
 *
 * Multiplicities come from the exact factors, the roots of each factor are simple and numeric.
 */
export function numericTerms(r: Ratio, after: Ratio, budget?: Budget): ResponseTerm<number>[] {
  const num = numbersOver(r.num, descendingInS(r.den)[0]);
  const factors: readonly MonicFactor[] = factorPolynomial(r.den, budget)
    .factors.filter(({ factor }) => degreeInS(factor) > 0)
    .map(({ factor, multiplicity }) => ({
      coefficients: numbersOver(factor, descendingInS(factor)[0]),
      multiplicity,
    }));
  return factors
    .flatMap((own) =>
      polynomialRoots(own.coefficients)
        .filter((root) => root.im >= 0)
        .flatMap((root) =>
          principalPart(num, root, own, factors).flatMap((c, k) =>
            termsAt(root, c, own.multiplicity - 1 - k, after),
          ),
        ),
    )
    .filter((term) => term.coefficient !== 0);
}
