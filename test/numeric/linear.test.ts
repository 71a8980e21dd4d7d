import { all, create } from 'mathjs';
import { describe, expect, it } from 'vitest';
import {
  combineMatrices,
  matrixExponential,
  matrixOf,
  multiplyMatrices,
  oneNorm,
  randomNormal,
  scalarMatrix,
  seededRandom,
  solveLinear,
} from '../../src/numeric/index.ts';
import type { Matrix } from '../../src/numeric/index.ts';
import { answer } from './answer.ts';

const random = seededRandom(41);

function randomMatrix(rows: number, columns: number): Matrix {
  const data = Float64Array.from({ length: rows * columns }, () => randomNormal(random));
  return { rows, columns, data };
}

function expectEqual(a: Matrix, b: Matrix, relative: number): void {
  const gap = oneNorm(combineMatrices([a, b], [1, -1]));
  expect(gap).toBeLessThanOrEqual(relative * Math.max(oneNorm(a), oneNorm(b)));
}

describe('a linear system', () => {
  it('is satisfied by its solution', () => {
    for (let size = 1; size <= 12; size++) {
      const [a, b] = [randomMatrix(size, size), randomMatrix(size, 2)];
      expectEqual(multiplyMatrices(a, answer(solveLinear(a, b))), b, 1e-11);
    }
  });

  it('needs no pivot to be large', () => {
    const a = matrixOf([
      [0, 1],
      [1e-20, 1e-20],
    ]);
    expectEqual(answer(solveLinear(a, matrixOf([[2], [3e-20]]))), matrixOf([[1], [2]]), 1e-15);
  });

  it('is refused when it is singular', () => {
    const a = matrixOf([
      [1, 2],
      [2, 4],
    ]);
    expect(solveLinear(a, matrixOf([[1], [1]]))).toMatchObject({
      code: 'singular-matrix',
      reason: 'the 2×2 matrix is singular to rounding',
    });
  });
});

describe('the exponential of a matrix', () => {
  it('turns by an angle', () => {
    const turn = matrixExponential(
      matrixOf([
        [0, -2],
        [2, 0],
      ]),
    );
    expectEqual(
      turn,
      matrixOf([
        [Math.cos(2), -Math.sin(2)],
        [Math.sin(2), Math.cos(2)],
      ]),
      1e-15,
    );
  });

  it('is 1 + A for a nilpotent matrix and exp(a) for a number', () => {
    expectEqual(
      matrixExponential(
        matrixOf([
          [0, 1e6],
          [0, 0],
        ]),
      ),
      matrixOf([
        [1, 1e6],
        [0, 1],
      ]),
      1e-15,
    );
    for (const a of [-700, -30, -1e-9, 0, 3, 50]) {
      expectEqual(matrixExponential(scalarMatrix(1, a)), scalarMatrix(1, Math.exp(a)), 1e-13);
    }
  });

  it('is Moler and Van Loan’s for their example (C. Moler, C. Van Loan, Nineteen dubious ways, SIAM Review 20, 1978, section 3; from memory, confirmed by its eigenvalues −1 and −17)', () => {
    const exponential = matrixExponential(
      matrixOf([
        [-49, 24],
        [-64, 31],
      ]),
    );
    const printed = matrixOf([
      [-0.735759, 0.551819],
      [-1.471518, 1.103638],
    ]);
    expectEqual(exponential, printed, 2e-6);
  });

  it('of −A undoes that of A, and agrees with mathjs', () => {
    const math = create(all);
    for (let size = 1; size <= 8; size++) {
      const a = randomMatrix(size, size);
      const exponential = matrixExponential(a);
      const inverse = matrixExponential(combineMatrices([a], [-1]));
      expectEqual(multiplyMatrices(exponential, inverse), scalarMatrix(size, 1), 1e-9);
      const rows = Array.from({ length: size }, (_, i) =>
        Array.from(a.data.subarray(i * size, (i + 1) * size)),
      );
      expectEqual(
        exponential,
        matrixOf(math.expm(math.matrix(rows)).toArray() as number[][]),
        1e-11,
      );
    }
  });

  it('is NaN where the matrix is not finite', () => {
    expect(matrixExponential(scalarMatrix(1, Infinity)).data[0]).toBeNaN();
  });
});
