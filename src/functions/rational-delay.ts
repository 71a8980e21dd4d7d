import {
  addRatios,
  divRatios,
  laplace,
  mulRatios,
  negRatio,
  powRatio,
  ratioFromRational,
  ratioOf,
  rational,
  zeroRatio,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { integerOf, onFormula, ratioOfArgument } from './answer.ts';
import { one, slot, type WorksheetFunction } from './spec.ts';

export const rationalDelay: WorksheetFunction = {
  name: 'rational_delay',
  summary: 'The diagonal Padé approximant of order n of a dead time.',
  source:
    'G. H. Golub, C. F. Van Loan, Matrix Computations, 3rd ed., Johns Hopkins, 1996, section 11.3.1.',
  example: 'Td is 0.1 s\nrational_delay(Td, 2)',
  parameters: [slot('Td'), one('n', 'parameter')],
  unit: 'number',
  availability: 'now',
  evaluate: ([time, order]) => {
    const n = integerOf(ratioOfArgument(order), 1, 'the order of rational_delay');
    if (isRefusal(n)) return n;
    return onFormula(time, (ratio) => {
      const x = mulRatios(ratio, ratioOf(laplace));
      return divRatios(diagonalPolynomial(negRatio(x), n), diagonalPolynomial(x, n));
    });
  },
};

/** Σ (2n−k)! n! / ((2n)! k! (n−k)!) xᵏ: numerator of the [n/n] approximant of eˣ; its denominator is that of −x. */
function diagonalPolynomial(x: Ratio, n: number): Ratio {
  let [sum, coefficient] = [zeroRatio, rational(1)];
  for (let k = 0; k <= n; k++) {
    sum = addRatios(sum, mulRatios(ratioFromRational(coefficient), powRatio(x, k)));
    coefficient = rational(
      coefficient.n * BigInt(n - k),
      coefficient.d * BigInt((2 * n - k) * (k + 1)),
    );
  }
  return sum;
}
