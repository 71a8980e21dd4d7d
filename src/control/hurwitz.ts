import {
  isZeroPolynomial,
  mulPolynomials,
  onePolynomial,
  subPolynomials,
  zeroPolynomial,
  quotientOf,
} from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { certifyRouth } from './certificate.ts';

/** A row of the Routh array without fractions: its entries are minors of the Hurwitz matrix. */
export interface MinorRow {
  /** The elements of the row times `divisor`; the first one is a Hurwitz determinant. */
  readonly entries: readonly Polynomial[];
  /** The Hurwitz determinant of the row above. */
  readonly divisor: Polynomial;
}

function everySecond(descending: readonly Polynomial[], from: number): Polynomial[] {
  return descending.filter((_, i) => i % 2 === from);
}

const entryAt = (row: MinorRow, i: number): Polynomial => row.entries[i] ?? zeroPolynomial;

/** One step M₊(i) = (M₋(i+1) Δ − Δ₋ M(i+1)) / Δ₋₋, exact over the integers. */
function nextRow(
  above: MinorRow,
  row: MinorRow,
  lead: Polynomial | null,
  budget?: Budget,
): MinorRow {
  const pivot = row.entries[0];
  const entries = above.entries.slice(1).map((entry, i) => {
    const first = mulPolynomials(entry, pivot, budget);
    const second = mulPolynomials(lead ?? row.divisor, entryAt(row, i + 1), budget);
    return quotientOf(subPolynomials(first, second), above.divisor, budget);
  });
  return { entries, divisor: pivot };
}

/**
 * The rows of the Routh array of a₀sⁿ + a₁sⁿ⁻¹ + …, without fractions: element i of row k is entries[i] / divisor.
 *
 * `descending`: the coefficients, a₀ first. The rows end early, with the first one whose first element vanishes
 * identically. Source: F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959, ch. XV, § 6, with the elimination of
 * E. H. Bareiss (1968) so that every division is exact.
 */
export function minorRows(descending: readonly Polynomial[], budget?: Budget): readonly MinorRow[] {
  const degree = descending.length - 1;
  const rows: MinorRow[] = [{ entries: everySecond(descending, 0), divisor: onePolynomial }];
  if (degree > 0) rows.push({ entries: everySecond(descending, 1), divisor: onePolynomial });
  while (rows.length <= degree && !isZeroPolynomial(rows[rows.length - 1].entries[0])) {
    const [above, row] = rows.slice(-2);
    rows.push(nextRow(above, row, rows.length === 2 ? descending[0] : null, budget));
  }
  return rows;
}

/**
 * The determinants Δ₁ … Δₙ of the Hurwitz matrix of a₀sⁿ + a₁sⁿ⁻¹ + …; the list ends early with the first one that
 * vanishes identically: the polynomial then is never stable.
 */
export function hurwitzDeterminants(
  descending: readonly Polynomial[],
  budget?: Budget,
): readonly Polynomial[] {
  const rows = minorRows(descending, budget);
  certifyRouth(
    descending,
    rows.map(({ entries, divisor }) => ({
      entries: entries.map((num) => ({ num, den: divisor })),
      special: null,
    })),
  );
  return rows.slice(1).map((row) => row.entries[0]);
}
