import {
  isZeroPolynomial,
  mulPolynomials,
  onePolynomial,
  subPolynomials,
  zeroPolynomial,
} from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { exactQuotient } from './s-polynomial.ts';

interface MinorRow {
  /** Entries of the Routh row times the determinant before it: minors of the Hurwitz matrix. */
  readonly entries: readonly Polynomial[];
}

function everySecond(descending: readonly Polynomial[], from: number): Polynomial[] {
  return descending.filter((_, i) => i % 2 === from);
}

const entryAt = (row: MinorRow, i: number): Polynomial => row.entries[i] ?? zeroPolynomial;

/** One step M₊(i) = (M₋(i+1) Δ − Δ₋ M(i+1)) / Δ₋₋, exact over the integers. */
function nextRow(
  above: MinorRow,
  row: MinorRow,
  divisors: { readonly pivotAbove: Polynomial; readonly divisor: Polynomial },
  budget?: Budget,
): MinorRow {
  const pivot = row.entries[0];
  const entries = above.entries.slice(1).map((entry, i) => {
    const first = mulPolynomials(entry, pivot, budget);
    const second = mulPolynomials(divisors.pivotAbove, entryAt(row, i + 1), budget);
    return exactQuotient(subPolynomials(first, second), divisors.divisor, budget);
  });
  return { entries };
}

/**
 * The determinants Δ₁ … Δₙ of the Hurwitz matrix of a₀sⁿ + a₁sⁿ⁻¹ + …, without fractions.
 *
 * `descending`: the coefficients, a₀ first. The list ends early with the first determinant that vanishes identically;
 * the polynomial then is never stable. Source: F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959,
 * ch. XV, § 6, with the elimination of E. H. Bareiss (1968) so that every division is exact.
 */
export function hurwitzDeterminants(
  descending: readonly Polynomial[],
  budget?: Budget,
): readonly Polynomial[] {
  const degree = descending.length - 1;
  let above: MinorRow = { entries: everySecond(descending, 0) };
  let row: MinorRow = { entries: everySecond(descending, 1) };
  const determinants: Polynomial[] = [];
  for (let k = 1; k <= degree; k++) {
    const pivot = row.entries[0] ?? zeroPolynomial;
    determinants.push(pivot);
    if (k === degree || isZeroPolynomial(pivot)) return determinants;
    const pivotAbove = k === 1 ? above.entries[0] : determinants[k - 2];
    const divisor = k <= 2 ? onePolynomial : determinants[k - 3];
    const next = nextRow(above, row, { pivotAbove, divisor }, budget);
    [above, row] = [row, next];
  }
  return determinants;
}
