import {
  coefficientsIn,
  asRational,
  divRatios,
  generatorsOf,
  isZeroPolynomial,
  isZeroRatio,
  isZeroRational,
  laplace,
  lcmPolynomials,
  mulPolynomials,
  mulRatios,
  onePolynomial,
  polynomialFromCoefficients,
  ratio,
  ratioFromPolynomial,
  ratioFromRational,
  ratioOf,
  rational,
  signOfPolynomial,
  signRational,
  subRatios,
  symbol,
  zeroPolynomial,
  zeroRatio,
  quotientOf,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio, Rational } from '../algebra/index.ts';
import { invariant, refuse, spend } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certifyRouth } from './certificate.ts';
import { minorRows } from './hurwitz.ts';
import type { MinorRow } from './hurwitz.ts';
import { FALSE } from './conditions.ts';
import type { SignOf } from '../algebra/index.ts';
import { integersInS } from './pole-place.ts';
import { countRoots } from './root-count.ts';
import { degreeInS, descendingInS, functionsOfS } from './s-polynomial.ts';
import { stabilityConditions } from './stability.ts';
import type { RouthArray, RouthRow } from './values.ts';

/** The array while it is being built. */
interface Building {
  readonly rows: RouthRow[];
  readonly auxiliaries: Polynomial[];
  readonly notes: string[];
  readonly epsilon: Generator;
}

function everySecond(descending: readonly Polynomial[], from: number): Ratio[] {
  return descending.filter((_, i) => i % 2 === from).map((c) => ratioFromPolynomial(c));
}

/** b₁ = a₂ − a₀ a₃/a₁ and so on: the row under two rows, without scaling. */
function rowBelow(above: readonly Ratio[], row: readonly Ratio[], length: number): Ratio[] {
  const quotient = divRatios(above[0], row[0]);
  return Array.from({ length }, (_, i) =>
    subRatios(above[i + 1] ?? zeroRatio, mulRatios(quotient, row[i + 1] ?? zeroRatio)),
  );
}

/** The polynomial c₀ sᵐ + c₁ sᵐ⁻² + … of a row's entries, times the (positive) common denominator. */
function auxiliaryPolynomial(row: RouthRow): Polynomial {
  const denominator = row.entries.reduce((d, c) => lcmPolynomials(d, c.den), onePolynomial);
  const coefficients = row.entries.map((c) =>
    mulPolynomials(c.num, quotientOf(denominator, c.den)),
  );
  const ascending = Array.from({ length: row.power + 1 }, () => zeroPolynomial);
  coefficients.forEach((c, i) => (ascending[row.power - 2 * i] = c));
  return polynomialFromCoefficients(ascending, laplace);
}

function replaceZeroRow(building: Building, power: number): RouthRow {
  const above = building.rows[building.rows.length - 1];
  const entries = above.entries
    .map((c, i) => mulRatios(c, ratioFromRational(rational(above.power - 2 * i))))
    .slice(0, Math.floor(power / 2) + 1);
  building.auxiliaries.push(auxiliaryPolynomial(above));
  building.notes.push(
    `zero row at s^${power}: replaced by the derivative of the auxiliary polynomial of the row at s^${above.power}; ` +
      'its roots lie symmetric to the origin, so the polynomial is not stable',
  );
  return { power, entries, special: 'zero row' };
}

function replaceFirst(building: Building, power: number, entries: readonly Ratio[]): RouthRow {
  building.notes.push(
    `zero first element at s^${power}: replaced by a small positive ${building.epsilon.name}; the polynomial is not stable`,
  );
  return {
    power,
    entries: [ratioOf(building.epsilon), ...entries.slice(1)],
    special: 'zero first element',
  };
}

/** A zero in the last row is left as it is: it only says that there is a root at the origin. */
function settledRow(building: Building, power: number, entries: readonly Ratio[]): RouthRow {
  if (power > 0 && entries.every(isZeroRatio)) return replaceZeroRow(building, power);
  if (power > 0 && isZeroRatio(entries[0])) return replaceFirst(building, power, entries);
  return { power, entries, special: null };
}

/** A symbol for ε that the polynomial does not use itself. */
function freshEpsilon(p: Polynomial): Generator {
  const used = new Set(generatorsOf(p).map((g) => g.name));
  let name = 'ε';
  while (used.has(name)) name += '_0';
  return symbol(name);
}

/** The elements of a row of minors, as fractions. */
function exactEntries(row: MinorRow, budget?: Budget): Ratio[] {
  return row.entries.map((entry) => ratio(entry, row.divisor, budget));
}

/** The rows up to the first that needs one of the special rules, by elimination without fractions. */
function regularRows(descending: readonly Polynomial[], budget?: Budget): RouthRow[] {
  const degree = descending.length - 1;
  return minorRows(descending, budget)
    .map((row, k): RouthRow => ({
      power: degree - k,
      entries: exactEntries(row, budget),
      special: null,
    }))
    .filter((row, k) => k === 0 || row.power === 0 || !isZeroRatio(row.entries[0]));
}

function buildRows(p: Polynomial, budget?: Budget): Building {
  const descending = descendingInS(p);
  const degree = descending.length - 1;
  const rows = regularRows(descending, budget);
  const building: Building = { rows, auxiliaries: [], notes: [], epsilon: freshEpsilon(p) };
  for (let power = degree - rows.length; power >= 0; power--) {
    const length = Math.floor(power / 2) + 1;
    spend(budget, length, 'the Routh array', `the row of s^${power}`);
    rows.push(settledRow(building, power, entriesAt(building, descending, length)));
  }
  return building;
}

/** The elements of the next row before its special rule, from the two rows above or, for the second, as given. */
function entriesAt(
  { rows }: Building,
  descending: readonly Polynomial[],
  length: number,
): readonly Ratio[] {
  if (rows.length === 1) return everySecond(descending, 1);
  const [above, row] = rows.slice(-2);
  return rowBelow(above.entries, row.entries, length);
}

/** Exact root counts of a polynomial of numbers, checked against the sign changes of a regular array. */
function countsOf(p: Polynomial, rows: readonly RouthRow[]): RouthArray['counts'] {
  const ascending = integersInS(p);
  if (!ascending) return null;
  const counts = countRoots(ascending);
  const column = rows.map((row) => asRational(row.entries[0]));
  const isRegular = column.every((x) => x && !isZeroRational(x)) && isWithoutSpecials(rows);
  invariant(
    !isRegular || signChanges(column) === counts.right,
    'the sign changes of a Routh array contradict the root count',
  );
  return counts;
}

const isWithoutSpecials = (rows: readonly RouthRow[]): boolean =>
  rows.every((row) => row.special === null);

function signChanges(column: readonly (Rational | null)[]): number {
  const signs = column.map((x) => (x ? signRational(x) : 0));
  return signs.filter((sign, i) => i > 0 && sign !== signs[i - 1]).length;
}

function leadNotes(p: Polynomial, signOf: SignOf): string[] {
  const [lead] = descendingInS(p);
  const sign = signOfPolynomial(lead, signOf);
  if (sign === 'negative') {
    return ['the leading coefficient is negative: all of the first column must be negative'];
  }
  if (sign === 'positive') return [];
  const power = degreeInS(p);
  return [
    `the sign of the coefficient of s^${power} is not known: the conditions ask for one sign throughout the first ` +
      'column; where that coefficient vanishes the degree falls and they do not apply',
  ];
}

function originNotes(p: Polynomial): string[] {
  return isZeroPolynomial(coefficientsIn(p, laplace)[0])
    ? ['the constant term is zero: a root at the origin']
    : [];
}

/**
 * The Routh array of a polynomial in s of any degree, with numbers or symbols, rows not scaled.
 *
 * A zero first element of a row that is not zero becomes ε, small and positive; a zero row becomes the derivative
 * of the auxiliary polynomial above it. Conditions are those of `stabilityConditions`; `[false]` in either special
 * case. Root counts do not rest on ε: they are exact, see `countRoots`.
 * Refuses the zero polynomial and functions of s (dead time).
 * Source: F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959, ch. XV, §§ 3–4.
 */
export function routhArray(p: Polynomial, signOf: SignOf, budget?: Budget): RouthArray | Refusal {
  if (isZeroPolynomial(p))
    return refuse('zero-polynomial', 'the polynomial is zero: every s is a root');
  if (functionsOfS(p).length > 0) {
    return refuse(
      'dead-time',
      'a Routh array needs a polynomial in s; replace delay(Td) by rational_delay(Td, n)',
    );
  }
  const { rows, auxiliaries, notes } = buildRows(p, budget);
  certifyRouth(descendingInS(p), rows);
  return Object.freeze({
    rows: Object.freeze(rows),
    auxiliaries: Object.freeze(auxiliaries),
    conditions: isWithoutSpecials(rows) ? stabilityConditions(p, signOf, budget) : [FALSE],
    counts: countsOf(p, rows),
    notes: [...leadNotes(p, signOf), ...notes, ...originNotes(p)],
  });
}
