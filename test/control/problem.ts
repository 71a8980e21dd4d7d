import {
  addRatios,
  divRatios,
  isZeroRatio,
  laplace,
  mulRatios,
  powRatio,
  ratioFromRational,
  ratioOf,
  rational,
  subRatios,
  symbol,
  termsOf,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../../src/algebra/index.ts';
import { randomInteger, type RandomSource } from '../../src/numeric/index.ts';
import { dual, minus, over, plus, times, toPower, ZERO, type Dual } from './modular.ts';

/** Values of s and of the symbols. */
export type Place = (g: Generator) => Dual;

/** A formula twice: as our exact form, and as a recipe for its values that does not use the algebra. */
export interface Formula {
  readonly exact: Ratio;
  readonly at: (place: Place) => Dual;
}

export const SYMBOLS: readonly Generator[] = Array.from({ length: 12 }, (_, k) => symbol(`p${k}`));

export function number(numerator: bigint, denominator = 1n): Formula {
  const value = over(dual(numerator), dual(denominator));
  return { exact: ratioFromRational(rational(numerator, denominator)), at: () => value };
}

export function variable(g: Generator): Formula {
  return { exact: ratioOf(g), at: (place) => place(g) };
}

export const S = variable(laplace);

export function sum(a: Formula, b: Formula): Formula {
  return { exact: addRatios(a.exact, b.exact), at: (place) => plus(a.at(place), b.at(place)) };
}

export function difference(a: Formula, b: Formula): Formula {
  return { exact: subRatios(a.exact, b.exact), at: (place) => minus(a.at(place), b.at(place)) };
}

export function product(a: Formula, b: Formula): Formula {
  return { exact: mulRatios(a.exact, b.exact), at: (place) => times(a.at(place), b.at(place)) };
}

/** a/b, or a where b is zero. */
export function quotient(a: Formula, b: Formula): Formula {
  if (isZeroRatio(b.exact)) return a;
  return { exact: divRatios(a.exact, b.exact), at: (place) => over(a.at(place), b.at(place)) };
}

export function power(a: Formula, exponent: number): Formula {
  return { exact: powRatio(a.exact, exponent), at: (place) => toPower(a.at(place), exponent) };
}

/** Random values for s and the symbols; the one given moves with slope 1. */
export function randomPlace(random: RandomSource, moving?: Generator): Place {
  const values = new Map<Generator, Dual>();
  return (g) => {
    const known = values.get(g);
    if (known) return known;
    const value = dual(
      BigInt(randomInteger(random, 1, 2 ** 30)) * 1_000_003n +
        BigInt(randomInteger(random, 1, 999)),
      g === moving ? 1n : 0n,
    );
    values.set(g, value);
    return value;
  };
}

/** The same values but one. */
export function movedTo(place: Place, g: Generator, value: Dual): Place {
  return (other) => (other === g ? value : place(other));
}

/** The value of one of our polynomials, term by term. */
export function valueOf(p: Polynomial, place: Place): Dual {
  return termsOf(p).reduce((total, { coefficient, exponents }) => {
    let term = dual(coefficient);
    for (const [g, exponent] of exponents) term = times(term, toPower(place(g), exponent));
    return plus(total, term);
  }, ZERO);
}

/** The value of one of our ratios. */
export function valueOfRatio(r: Ratio, place: Place): Dual {
  return over(valueOf(r.num, place), valueOf(r.den, place));
}

export function pick<T>(random: RandomSource, list: readonly T[]): T {
  return list[randomInteger(random, 0, list.length - 1)];
}

/** A number: small, a fraction, huge or tiny. */
export function randomNumber(random: RandomSource): Formula {
  const n = BigInt(randomInteger(random, -9, 9));
  const kind = random();
  if (kind < 0.8) return number(n);
  if (kind < 0.9) return number(n, BigInt(randomInteger(random, 1, 12)));
  return kind < 0.95 ? number(n * 10n ** 18n + 7n) : number(n, 10n ** 9n);
}

/** A polynomial in s and the symbols, with the degree in s given. */
export function randomPolynomial(
  random: RandomSource,
  symbols: readonly Generator[],
  degree: number,
): Formula {
  let total = number(0n);
  for (let k = 0; k <= degree; k += 1) {
    const factor = random() < 0.5 ? variable(pick(random, symbols)) : randomNumber(random);
    const coefficient = random() < 0.3 ? product(factor, variable(pick(random, symbols))) : factor;
    total = sum(total, product(coefficient, power(S, k)));
  }
  return total;
}

/** A formula built from numbers, s and symbols by the operations of arithmetic, `depth` of them deep. */
export function randomFormula(
  random: RandomSource,
  symbols: readonly Generator[],
  depth: number,
): Formula {
  if (depth === 0) {
    const kind = random();
    if (kind < 0.3) return randomNumber(random);
    return kind < 0.5 ? S : variable(pick(random, symbols));
  }
  const a = randomFormula(random, symbols, depth - 1);
  const kind = randomInteger(random, 0, 9);
  if (kind === 9) return power(a, 2);
  const b = randomFormula(random, symbols, randomInteger(random, 0, depth - 1));
  if (kind < 3) return sum(a, b);
  if (kind < 5) return difference(a, b);
  return kind < 7 ? product(a, b) : quotient(a, b);
}
