import {
  coefficientsIn,
  functionOf,
  isZeroRatio,
  laplace,
  mulPolynomials,
  negPolynomial,
  ratio,
  ratioOf,
  scalePolynomial,
  solveLinear,
  sumPolynomials,
  symbolsOfRatio,
  termCount,
  zeroPolynomial,
  zeroRatio,
} from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import { Budget, BudgetExceeded, isRefusal } from '../base/index.ts';
import { certifyNoiseBandwidth } from './certificate.ts';
import { degreeInS, hasFunctionsOfS } from './s-polynomial.ts';

/** Up to this degree in s a bandwidth with symbols is given in closed form; with numbers alone at any degree. */
const CLOSED_DEGREE = 5;
/** A closed form with more terms than this is not read, and computed worse than from the coefficients. */
const MOST_TERMS = 150;
/** Work that may be spent on one closed form. */
const CLOSED_BUDGET = 1_000_000;

/** Whether the gain does not vanish at high frequencies, so that white noise has infinite power behind it. */
export function letsWhiteNoiseThrough(transfer: Ratio): boolean {
  return !isZeroRatio(transfer) && degreeInS(transfer.num) >= degreeInS(transfer.den);
}

/** (−1)^k p */
function alternating(p: Polynomial, k: number): Polynomial {
  return k % 2 === 0 ? p : negPolynomial(p);
}

/** The coefficients of s⁰, s², …, s²ⁿ⁻² in c(s) c(−s), for the ascending coefficients of c. */
function evenSquare(c: readonly Polynomial[], n: number, budget?: Budget): Polynomial[] {
  return Array.from({ length: n }, (_, k) =>
    sumPolynomials(
      c.map((own, i) => {
        const other = c[2 * k - i];
        return other ? alternating(mulPolynomials(own, other, budget), i) : zeroPolynomial;
      }),
    ),
  );
}

/**
 * I/2 for I = (1/2πj) ∫ c(s) c(−s) / (d(s) d(−s)) ds along the imaginary axis.
 *
 * With c(s) c(−s) = p(s) d(−s) + p(−s) d(s) the integral is the initial value p₍ₙ₋₁₎/dₙ. The even powers of s make n linear
 * equations for p, whose matrix is Hurwitz's up to the signs of its columns.
 */
function closedForm(transfer: Ratio, budget?: Budget): Ratio {
  const d = coefficientsIn(transfer.den, laplace);
  const n = d.length - 1;
  const matrix = Array.from({ length: n }, (_, k) =>
    Array.from({ length: n }, (_, i) => alternating(d[2 * k - i] ?? zeroPolynomial, i)),
  );
  const squares = evenSquare(coefficientsIn(transfer.num, laplace), n, budget);
  const solution = solveLinear(
    matrix,
    squares.map((square) => [square]),
    budget,
  );
  if (isRefusal(solution)) return kernel(transfer);
  const last = solution.numerators[n - 1][0];
  const scale = mulPolynomials(scalePolynomial(d[n], 4n), solution.determinant, budget);
  return ratio(last, scale, budget);
}

/** The bandwidth as a function of the transfer function, to be found in numbers. */
function kernel(transfer: Ratio): Ratio {
  return ratioOf(functionOf('noise_bandwidth', [transfer], laplace));
}

function shortClosedForm(transfer: Ratio): Ratio | null {
  try {
    const closed = closedForm(transfer, new Budget(CLOSED_BUDGET));
    return termCount(closed.num) + termCount(closed.den) > MOST_TERMS ? null : closed;
  } catch (error) {
    if (error instanceof BudgetExceeded) return null;
    throw error;
  }
}

/**
 * ∫₀^∞ |H(j2πf)|² df of a strictly proper transfer function all of whose poles decay: the variance behind it of white
 * noise of one-sided density 1 per Hz. In Hz times the square of H's unit; where the gain at rest is 1 it is the
 * equivalent noise bandwidth.
 *
 * In closed form with symbols up to degree 5, with numbers alone at any degree; else, and with dead time, the kernel
 * `noise_bandwidth(H)`. That the poles decay is the caller's to require; the formula says nothing of it.
 * Source: H. M. James, N. B. Nichols, R. S. Phillips, Theory of Servomechanisms, MIT Radiation Laboratory Series 25,
 * McGraw-Hill, 1947, section 7.9 and appendix; G. C. Newton, L. A. Gould, J. F. Kaiser, Analytical Design of Linear
 * Feedback Controls, Wiley, 1957, appendix E (both from memory).
 */
export function noiseBandwidth(transfer: Ratio, budget?: Budget): Ratio {
  if (isZeroRatio(transfer)) return zeroRatio;
  if (hasFunctionsOfS(transfer)) return kernel(transfer);
  const isNumeric = symbolsOfRatio(transfer).length === 0;
  if (!isNumeric && degreeInS(transfer.den) > CLOSED_DEGREE) return kernel(transfer);
  const closed = isNumeric ? closedForm(transfer, budget) : shortClosedForm(transfer);
  if (!closed) return kernel(transfer);
  certifyNoiseBandwidth(transfer, closed);
  return closed;
}

/**
 * ∫ |H(j2πf)|² df over a band of frequencies in Hz, as the kernel `noise_bandwidth(H, from, to)`, which is found in
 * numbers.
 */
export function noiseBandwidthBetween(transfer: Ratio, from: Ratio, to: Ratio): Ratio {
  if (isZeroRatio(transfer)) return zeroRatio;
  return ratioOf(functionOf('noise_bandwidth', [transfer, from, to], laplace));
}
