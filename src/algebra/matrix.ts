import { invariant, isRefusal, refuse, type Budget, type Refusal } from '../base/index.ts';
import { eliminate, type CramerSolution, type PolynomialMatrix } from './elimination.ts';
import { lcmPolynomials } from './gcd.ts';
import { mulPolynomials, onePolynomial, productOfPolynomials } from './polynomial.ts';
import { quotientOf } from './quotient.ts';
import {
  addRatios,
  isZeroRatio,
  mulRatios,
  oneRatio,
  ratio,
  ratioFromPolynomial,
  sumRatios,
  zeroRatio,
} from './ratio.ts';
import type { Polynomial, Ratio } from './ring.ts';

/** A matrix of ratios by rows. */
export type RatioMatrix = readonly (readonly Ratio[])[];

function isSquare(m: readonly (readonly unknown[])[]): boolean {
  return m.every((row) => row.length === m.length);
}

/** The determinant of a square matrix of polynomials; 1 for the empty matrix. */
export function determinant(m: PolynomialMatrix, budget?: Budget): Polynomial {
  invariant(isSquare(m), 'the determinant of a matrix that is not square');
  return eliminate(
    m,
    m.map(() => []),
    budget,
  ).determinant;
}

/**
 * Solves m x = rhs for every column of `rhs`, in Cramer's form x = numerators/determinant with nothing cancelled:
 * the determinant is exactly det(m). Refused as `singular` where it vanishes.
 *
 * @param m n × n
 * @param rhs n × k
 */
export function solveLinear(
  m: PolynomialMatrix,
  rhs: PolynomialMatrix,
  budget?: Budget,
): CramerSolution | Refusal {
  invariant(isSquare(m) && rhs.length === m.length, 'a linear system that is not square');
  const solution = eliminate(m, rhs, budget);
  if (isZeroRatio(ratioFromPolynomial(solution.determinant))) {
    return refuse('singular', 'the equations are not independent: their determinant is zero');
  }
  return solution;
}

/** The n × n identity matrix. */
export function identityMatrix(n: number): RatioMatrix {
  return Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, k) => (i === k ? oneRatio : zeroRatio)),
  );
}

/** The transpose of an n × k matrix. */
export function transposeMatrix(m: RatioMatrix): RatioMatrix {
  return (m[0] ?? []).map((_, k) => m.map((row) => row[k]));
}

/** The sum of two matrices of the same shape. */
export function addMatrices(a: RatioMatrix, b: RatioMatrix, budget?: Budget): RatioMatrix {
  invariant(a.length === b.length && a[0]?.length === b[0]?.length, 'a sum of unlike matrices');
  return a.map((row, i) => row.map((r, k) => addRatios(r, b[i][k], budget)));
}

/** The product of an n × k and a k × m matrix. */
export function multiplyMatrices(a: RatioMatrix, b: RatioMatrix, budget?: Budget): RatioMatrix {
  invariant((a[0]?.length ?? 0) === b.length, 'a product of matrices that do not fit');
  const columns = transposeMatrix(b);
  return a.map((row) =>
    columns.map((column) =>
      sumRatios(
        row.map((r, k) => mulRatios(r, column[k], budget)),
        budget,
      ),
    ),
  );
}

/** Each row over its common denominator. */
function clearRows(
  m: RatioMatrix,
  budget?: Budget,
): { rows: PolynomialMatrix; dens: Polynomial[] } {
  const dens = m.map((row) =>
    row.reduce((den, r) => lcmPolynomials(den, r.den, budget), onePolynomial),
  );
  const rows = m.map((row, i) =>
    row.map((r) => mulPolynomials(r.num, quotientOf(dens[i], r.den, budget), budget)),
  );
  return { rows, dens };
}

/** The determinant of a square matrix of ratios. */
export function determinantOfRatios(m: RatioMatrix, budget?: Budget): Ratio {
  const { rows, dens } = clearRows(m, budget);
  return ratio(determinant(rows, budget), productOfPolynomials(dens, budget), budget);
}

/** The inverse of a square matrix of ratios. Refused as `singular` where the determinant vanishes. */
export function inverseMatrix(m: RatioMatrix, budget?: Budget): RatioMatrix | Refusal {
  const { rows, dens } = clearRows(m, budget);
  const rhs = identityMatrix(m.length).map((row, i) =>
    row.map((r) => mulPolynomials(r.num, dens[i])),
  );
  const solution = solveLinear(rows, rhs, budget);
  if (isRefusal(solution)) return solution;
  return solution.numerators.map((row) => row.map((p) => ratio(p, solution.determinant, budget)));
}
