import {
  determinantOfRatios,
  identityMatrix,
  inverseMatrix,
  transposeMatrix,
  zeroRatio,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import { ALWAYS, type MatrixValue, type Value } from '../control/index.ts';
import { formulaAnswer, integerOf, ratioOfArgument, valueOf } from './answer.ts';
import { one, rest, type Argument, type Parameter, type WorksheetFunction } from './spec.ts';

type Rows = MatrixValue['rows'];

const EXAMPLE = 'M = rows(1, 2 | 3, 4)\n';

function matrixFunction(
  name: string,
  summary: string,
  example: string,
  parameters: readonly Parameter[],
  evaluate: (args: readonly Argument[]) => Value | Refusal,
): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example,
    parameters,
    unit: 'unchecked',
    availability: 'now',
    evaluate,
  };
}

function rowsOf(argument: Argument): Rows {
  return (valueOf(argument) as MatrixValue).rows;
}

/** A matrix as an answer; a 1×1 matrix is a number. */
function matrixAnswer(rows: Rows): Value {
  if (rows.length === 1 && rows[0].length === 1) return formulaAnswer(rows[0][0]);
  return { kind: 'matrix', rows, when: ALWAYS, notes: [] };
}

function square(
  rows: Rows,
  name: string,
  compute: (rows: Rows) => Value | Refusal,
): Value | Refusal {
  const width = rows[0].length;
  if (rows.length === width) return compute(rows);
  return refuse(
    'not-square',
    `${name} takes a square matrix, and this one is ${rows.length}×${width}`,
  );
}

function entryOf(rows: Rows, i: Ratio, k: Ratio): Value | Refusal {
  const row = integerOf(i, 1, 'the row of entry');
  if (isRefusal(row)) return row;
  const column = integerOf(k, 1, 'the column of entry');
  if (isRefusal(column)) return column;
  const found = rows[row - 1]?.[column - 1];
  return found
    ? formulaAnswer(found)
    : refuse(
        'no-entry',
        `the matrix is ${rows.length}×${rows[0].length}; it has no entry ${row}, ${column}`,
      );
}

/** Matrices of formulas. */
export const MATRICES: readonly WorksheetFunction[] = [
  matrixFunction(
    'rows',
    'A matrix by its rows, `rows(a, b | c, d)`.',
    EXAMPLE + 'M',
    [one('a, b | c, d', 'rows')],
    ([rows]) => matrixAnswer(rowsOf(rows)),
  ),
  matrixFunction(
    'transpose',
    'The transpose of a matrix.',
    EXAMPLE + 'transpose(M)',
    [one('M', 'matrix')],
    ([m]) => matrixAnswer(transposeMatrix(rowsOf(m))),
  ),
  matrixFunction(
    'inverse',
    'The inverse of a square matrix.',
    EXAMPLE + 'inverse(M)',
    [one('M', 'matrix')],
    ([m]) =>
      square(rowsOf(m), 'inverse', (rows) => {
        const inverse = inverseMatrix(rows);
        return isRefusal(inverse) ? inverse : matrixAnswer(inverse);
      }),
  ),
  matrixFunction(
    'determinant',
    'The determinant of a square matrix.',
    EXAMPLE + 'determinant(M)',
    [one('M', 'matrix')],
    ([m]) => square(rowsOf(m), 'determinant', (rows) => formulaAnswer(determinantOfRatios(rows))),
  ),
  matrixFunction(
    'identity',
    'The identity matrix of n rows.',
    'identity(2)',
    [one('n', 'parameter')],
    ([n]) => {
      const size = integerOf(ratioOfArgument(n), 1, 'the size of identity');
      return isRefusal(size) ? size : matrixAnswer(identityMatrix(size));
    },
  ),
  matrixFunction(
    'diagonal',
    'A matrix with the given entries on its diagonal.',
    'diagonal(1, 2)',
    [one('a', 'parameter'), rest('b', 'parameter')],
    (entries) => {
      const ratios = entries.map(ratioOfArgument);
      return matrixAnswer(
        ratios.map((ratio, i) => ratios.map((_, k) => (i === k ? ratio : zeroRatio))),
      );
    },
  ),
  matrixFunction(
    'entry',
    'The entry of a matrix in row i and column k, counted from 1.',
    EXAMPLE + 'entry(M, 1, 2)',
    [one('M', 'matrix'), one('i', 'parameter'), one('k', 'parameter')],
    ([m, i, k]) => entryOf(rowsOf(m), ratioOfArgument(i), ratioOfArgument(k)),
  ),
];
