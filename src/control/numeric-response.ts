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
import { degreeInS, descendingInS, isFreeOfS } from './s-polynomial.ts';
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

/** Coefficients of 1/(s − r)^m, …, 1/(s − r) in num/den at a root r of multiplicity m of den; index 0 for the first. */
function principalPart(
  num: readonly number[],
  den: readonly number[],
  root: Complex,
  multiplicity: number,
): Complex[] {
  const top = shifted(num, root);
  const bottom = shifted(den, root).slice(multiplicity);
  const quotient: Complex[] = [];
  for (let k = 0; k < multiplicity; k++) {
    let rest = top[k] ?? zero;
    for (let i = 1; i <= k; i++) {
      rest = subtractComplex(rest, multiplyComplex(bottom[i] ?? zero, quotient[k - i]));
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
  const [lead] = descendingInS(r.den);
  const num = numbersOver(r.num, lead);
  const den = numbersOver(r.den, lead);
  return factorPolynomial(r.den, budget)
    .factors.filter(({ factor }) => !isFreeOfS(factor) && degreeInS(factor) > 0)
    .flatMap(({ factor, multiplicity }) =>
      polynomialRoots(numbersOver(factor, descendingInS(factor)[0]))
        .filter((root) => root.im >= 0)
        .flatMap((root) =>
          principalPart(num, den, root, multiplicity).flatMap((c, k) =>
            termsAt(root, c, multiplicity - 1 - k, after),
          ),
        ),
    )
    .filter((term) => term.coefficient !== 0);
}
