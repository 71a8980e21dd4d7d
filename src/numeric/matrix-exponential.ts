import { invariant, isRefusal } from '../base/index.ts';
import { solveLinear } from './linear-solve.ts';
import type { Matrix } from './matrix.ts';
import { combineMatrices, multiplyMatrices, oneNorm, scalarMatrix } from './matrix.ts';

/** Coefficients of the [13/13] Padé numerator of exp: Higham 2005, equation (2.2). */
const PADE = [
  64764752532480000, 32382376266240000, 7771770303897600, 1187353796428800, 129060195264000,
  10559470521600, 670442572800, 33522128640, 1323241920, 40840800, 960960, 16380, 182, 1,
];

/** Up to this norm the approximant is exact to double precision: Higham 2005, table 2.3. */
const LARGEST_NORM = 5.371920351148152;

/**
 * The exponential of a square matrix.
 *
 * Source: N. J. Higham, The scaling and squaring method for the matrix exponential revisited, SIAM Journal on Matrix
 * Analysis and Applications 26 (2005), 1179–1193, algorithm 2.3 with m = 13. Cost: about (6 + squarings) n³.
 */
export function matrixExponential(matrix: Matrix): Matrix {
  invariant(matrix.rows === matrix.columns, 'the exponential of a matrix that is not square');
  const norm = oneNorm(matrix);
  if (!Number.isFinite(norm)) return scalarMatrix(matrix.rows, NaN);
  const squarings = Math.max(0, Math.ceil(Math.log2(norm / LARGEST_NORM)));
  let exponential = padeExponential(combineMatrices([matrix], [2 ** -squarings]));
  for (let i = 0; i < squarings; i++) exponential = multiplyMatrices(exponential, exponential);
  return exponential;
}

/** The Padé approximant (V − U)⁻¹ (V + U), U odd and V even in A (Higham 2005, equations (2.3) and (2.4)). */
function padeExponential(a: Matrix): Matrix {
  const one = scalarMatrix(a.rows, 1);
  const a2 = multiplyMatrices(a, a);
  const a4 = multiplyMatrices(a2, a2);
  const a6 = multiplyMatrices(a4, a2);
  const part = (first: number): Matrix => {
    const weights = [0, 2, 4, 6].map((k) => PADE[first + k]!);
    const low = combineMatrices([one, a2, a4, a6], weights);
    const high = combineMatrices(
      [a2, a4, a6],
      [8, 10, 12].map((k) => PADE[first + k]!),
    );
    return combineMatrices([low, multiplyMatrices(a6, high)], [1, 1]);
  };
  const odd = multiplyMatrices(a, part(1));
  const even = part(0);
  const solution = solveLinear(
    combineMatrices([even, odd], [1, -1]),
    combineMatrices([even, odd], [1, 1]),
  );
  invariant(!isRefusal(solution), 'the Padé denominator of exp is singular');
  return solution;
}
