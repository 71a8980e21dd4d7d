import fc from 'fast-check';
import {
  imaginary,
  isZeroPolynomial,
  laplace,
  polynomialOfTermList,
  rational,
  ratio,
  sqrtOf,
  ratioOf,
  symbol,
  zeroRatio,
  type Generator,
  type Polynomial,
  type Ratio,
  type Rational,
} from '../../src/algebra/index.ts';

/** s and the symbols a … h. */
export const GENERATORS: readonly Generator[] = [laplace, ...[...'abcdefgh'].map(symbol)];

export interface Shape {
  readonly generators: number;
  readonly terms: number;
  readonly degree: number;
  readonly size?: bigint;
}

/** Random sparse polynomials in the first few generators. */
export function polynomials(shape: Shape): fc.Arbitrary<Polynomial> {
  const { generators, terms, degree, size = 9n } = shape;
  const term = fc.record({
    coefficient: fc.bigInt({ min: -size, max: size }),
    exponents: fc.array(fc.nat(degree), { minLength: generators, maxLength: generators }),
  });
  return fc.array(term, { maxLength: terms }).map((list) =>
    polynomialOfTermList(
      list.map(({ coefficient, exponents }) => ({
        coefficient,
        exponents: new Map(
          exponents.flatMap((exponent, k) =>
            exponent > 0 ? [[GENERATORS[k], exponent] as const] : [],
          ),
        ),
      })),
    ),
  );
}

export function nonzeroPolynomials(shape: Shape): fc.Arbitrary<Polynomial> {
  return polynomials(shape).filter((p) => !isZeroPolynomial(p));
}

export function rationals(size = 50n): fc.Arbitrary<Rational> {
  return fc
    .tuple(fc.bigInt({ min: -size, max: size }), fc.bigInt({ min: 1n, max: size }))
    .map(([n, d]) => rational(n, d));
}

/** A rational value for each of the generators. */
export function points(): fc.Arbitrary<(g: Generator) => Rational> {
  return fc
    .array(rationals(), { minLength: GENERATORS.length, maxLength: GENERATORS.length })
    .map((values) => (g: Generator) => values[GENERATORS.indexOf(g)]);
}

export function ratios(shape: Shape): fc.Arbitrary<Ratio> {
  return fc
    .tuple(polynomials(shape), nonzeroPolynomials(shape))
    .map(([num, den]) => (isZeroPolynomial(num) ? zeroRatio : ratio(num, den)));
}

/** Ratios built from numbers, a, j and the square roots of 2, 3 and a. */
export const ROOTS: readonly Ratio[] = [
  ratioOf(imaginary),
  ratioOf(GENERATORS[1]),
  sqrtOf(ratio(polynomialOfTermList([{ coefficient: 2n, exponents: new Map() }]), one())),
  sqrtOf(ratio(polynomialOfTermList([{ coefficient: 3n, exponents: new Map() }]), one())),
  sqrtOf(ratioOf(GENERATORS[1])),
];

function one(): Polynomial {
  return polynomialOfTermList([{ coefficient: 1n, exponents: new Map() }]);
}

/** The fixed seed and the size of the random suites. */
export const RUNS = { seed: 20_250, numRuns: 60 };
