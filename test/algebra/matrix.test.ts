import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isRefusal } from '../../src/base/index.ts';
import {
  addMatrices,
  determinant,
  determinantOfRatios,
  equalPolynomials,
  evaluatePolynomial,
  identityMatrix,
  inverseMatrix,
  isZeroPolynomial,
  mulPolynomials,
  mulRational,
  multiplyMatrices,
  polynomialKey,
  ratioFromRational,
  ratioKey,
  rational,
  rationalToText,
  asRational,
  solveLinear,
  subRational,
  sumPolynomials,
  transposeMatrix,
  zeroPolynomial,
  type CramerSolution,
  type Polynomial,
  type Rational,
  type RatioMatrix,
} from '../../src/algebra/index.ts';
import { points, polynomials, RUNS } from './arbitraries.ts';
import { read, readPolynomial } from './text.ts';

/** Sparse square matrices with a right-hand side of two columns. */
function systems(
  size: number,
  filled: number,
): fc.Arbitrary<{ m: Polynomial[][]; rhs: Polynomial[][] }> {
  const entry = fc
    .tuple(fc.nat(99), polynomials({ generators: 4, terms: 2, degree: 1, size: 3n }))
    .map(([dice, p]) => (dice < filled ? p : zeroPolynomial));
  const matrix = (width: number): fc.Arbitrary<Polynomial[][]> =>
    fc.array(fc.array(entry, { minLength: width, maxLength: width }), {
      minLength: size,
      maxLength: size,
    });
  return fc.record({ m: matrix(size), rhs: matrix(2) });
}

/** The determinant of numbers by expansion along the first row: slow, and nothing like the method under test. */
function numericDeterminant(m: readonly (readonly Rational[])[]): Rational {
  if (m.length === 0) return rational(1);
  return m[0].reduce((sum, entry, k) => {
    const minor = m.slice(1).map((row) => row.filter((_, column) => column !== k));
    const part = mulRational(entry, numericDeterminant(minor));
    return k % 2 === 0 ? subRational(sum, mulRational(part, rational(-1))) : subRational(sum, part);
  }, rational(0));
}

describe('the determinant', () => {
  it.each([
    [3, 100],
    [5, 50],
    [6, 35],
  ])('agrees with expansion by minors at random points (%i × %i, %i %% filled)', (size, filled) => {
    fc.assert(
      fc.property(systems(size, filled), points(), ({ m }, at) => {
        const values = m.map((row) => row.map((p) => evaluatePolynomial(p, at)));
        expect(evaluatePolynomial(determinant(m), at)).toEqual(numericDeterminant(values));
      }),
      { ...RUNS, numRuns: 25 },
    );
  });

  it('of a Vandermonde matrix is the product of the differences', () => {
    const names = ['a', 'b', 'c', 'd'];
    const m = names.map((x) => [0, 1, 2, 3].map((k) => readPolynomial(`${x}^${k}`)));
    const product = '(b - a)*(c - a)*(d - a)*(c - b)*(d - b)*(d - c)';
    expect(polynomialKey(determinant(m))).toBe(polynomialKey(readPolynomial(product)));
  });

  it('of the empty matrix is 1', () => {
    expect(polynomialKey(determinant([]))).toBe(polynomialKey(readPolynomial('1')));
  });

  it.each([
    [2, '1/12'],
    [3, '1/2160'],
    [4, '1/6048000'],
    [5, '1/266716800000'],
  ])(
    'of the Hilbert matrix of order %i is %s (M.-D. Choi, "Tricks or treats with the Hilbert matrix", 1983; from memory)',
    (n, expected) => {
      const value = asRational(determinantOfRatios(hilbert(n)));
      expect(value && rationalToText(value)).toBe(expected);
    },
  );
});

function hilbert(n: number): RatioMatrix {
  return Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, k) => ratioFromRational(rational(1, i + k + 1))),
  );
}

describe('a linear system', () => {
  it.each([
    [3, 100],
    [5, 50],
    [7, 30],
  ])('is solved in Cramer form: m x = det · rhs (%i unknowns, %i %% filled)', (size, filled) => {
    fc.assert(
      fc.property(systems(size, filled), ({ m, rhs }) => {
        const solution = solveLinear(m, rhs);
        const exact = determinant(m);
        if (isRefusal(solution)) {
          expect(isZeroPolynomial(exact)).toBe(true);
          return;
        }
        expect(equalPolynomials(solution.determinant, exact)).toBe(true);
        expectSolved(m, rhs, solution);
      }),
      { ...RUNS, numRuns: 25 },
    );
  });

  it('is refused where its determinant vanishes, also by j² = -1', () => {
    const refusal = {
      kind: 'refusal',
      code: 'singular',
      reason: 'the equations are not independent: their determinant is zero',
    };
    const p = readPolynomial;
    const right = [[p('1')], [p('0')]];
    expect(
      solveLinear(
        [
          [p('a'), p('b')],
          [p('2*a'), p('2*b')],
        ],
        right,
      ),
    ).toEqual(refusal);
    expect(
      solveLinear(
        [
          [p('1'), p('j')],
          [p('j'), p('-1')],
        ],
        right,
      ),
    ).toEqual(refusal);
    expect(
      solveLinear(
        [
          [p('a'), p('0')],
          [p('b'), p('0')],
        ],
        right,
      ),
    ).toEqual(refusal);
  });
});

function expectSolved(m: Polynomial[][], rhs: Polynomial[][], solution: CramerSolution): void {
  m.forEach((row, i) =>
    rhs[i].forEach((right, k) => {
      const left = sumPolynomials(row.map((p, c) => mulPolynomials(p, solution.numerators[c][k])));
      expect(equalPolynomials(left, mulPolynomials(solution.determinant, right))).toBe(true);
    }),
  );
}

function keys(m: RatioMatrix): string[][] {
  return m.map((row) => row.map(ratioKey));
}

describe('matrices of ratios', () => {
  const m = [
    ['s', 'a/(s + 1)', '0'],
    ['b', 's^2', '1'],
    ['1/c', '0', 's + j'],
  ].map((row) => row.map(read));

  it('times their inverse are the identity', () => {
    const inverse = inverseMatrix(m);
    if (isRefusal(inverse)) throw new Error(inverse.reason);
    expect(keys(multiplyMatrices(m, inverse))).toEqual(keys(identityMatrix(3)));
    expect(keys(multiplyMatrices(inverse, m))).toEqual(keys(identityMatrix(3)));
  });

  it('have the inverse of the Hilbert matrix of order 3 (Choi 1983; from memory)', () => {
    const expected = [
      [9, -36, 30],
      [-36, 192, -180],
      [30, -180, 180],
    ].map((row) => row.map((x) => ratioFromRational(rational(x))));
    expect(keys(inverseMatrix(hilbert(3)) as RatioMatrix)).toEqual(keys(expected));
  });

  it('add, transpose and refuse to be inverted where singular', () => {
    expect(keys(transposeMatrix(transposeMatrix(m)))).toEqual(keys(m));
    expect(keys(addMatrices(m, m))).toEqual(
      keys(multiplyMatrices(m, addMatrices(identityMatrix(3), identityMatrix(3)))),
    );
    expect(
      isRefusal(inverseMatrix([[read('a')], [read('b')]].map((row) => [row[0], row[0]]))),
    ).toBe(true);
  });
});
