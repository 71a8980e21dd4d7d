import { isZeroRatio, ResiduePoint } from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { invariant } from '../base/index.ts';
import {
  addImages,
  areKnown,
  determinantOf,
  dotAt,
  imageOf,
  mulImages,
  quotientAt,
  sumOfImages,
  type Image,
  type Values,
} from './point-arithmetic.ts';
import { functionsOfS } from './s-polynomial.ts';
import type { LoopRow, RouthRow, SignalTerm } from './values.ts';

/** A result has passed when it holds at this many points; a point that meets a pole says nothing. */
const POINTS = 2;
const MOST_SEEDS = 12;

/**
 * Every result derived in symbols is compared with its definition at random points when it is made; a mismatch is our
 * bug, and no result is shown. `holds` says of a seed of points whether it does, or null if nothing can be said there.
 */
function certifyAtPoints(what: string, holds: (seed: number) => boolean | null): void {
  let passed = 0;
  for (let seed = 1; seed <= MOST_SEEDS && passed < POINTS; seed++) {
    const answer = holds(seed);
    invariant(answer !== false, what);
    if (answer) passed += 1;
  }
}

/** Whether two values are equal; null where one is missing. */
function agree([a, b]: Values): boolean | null {
  return a === null || b === null ? null : a === b;
}

/** Two values of s, at which anything free of s is the same. */
const PLACES = [1_000_003, 2_000_003];

/** What is computed at two values of s, at points that are otherwise the same. */
function atPlaces<T>(seed: number, compute: (point: ResiduePoint) => T): readonly T[] {
  return PLACES.map((s) => compute(new ResiduePoint(seed, s)));
}

/**
 * Checks solved signals against an equation of the loop as it was written. Signals that are not in `solutions` are
 * zero.
 */
export function certify(row: LoopRow, solutions: ReadonlyMap<string, Ratio>): void {
  const present = [...row.coefficients].filter(([name]) => solutions.has(name));
  certifyAtPoints('a derived transfer function does not satisfy its equations', (seed) => {
    const point = new ResiduePoint(seed);
    const coefficients = present.map(([, c]) => point.ratio(c));
    const signals = present.map(([name]) => point.ratio(solutions.get(name) as Ratio));
    return agree([dotAt(coefficients, signals, point), 0]);
  });
}

/**
 * Checks that a characteristic polynomial is the determinant of equations times what they were multiplied by, up to a
 * factor free of s.
 */
export function certifyCharacteristic(
  rows: readonly LoopRow[],
  signals: readonly string[],
  polynomial: Polynomial,
  multipliers: readonly Polynomial[],
): void {
  certifyAtPoints('a characteristic polynomial is not the determinant of its equations', (seed) =>
    agree(
      atPlaces(seed, (point) => {
        const factors = multipliers.map((m) => point.polynomial(m));
        const determinant = determinantOf(rows, signals, point);
        return quotientAt([determinant, ...factors], point.polynomial(polynomial), point);
      }),
    ),
  );
}

/** Checks a loop gain: det(closed) = (1 + L) det(opened) for equations in these signals. */
export function certifyOpening(
  closed: readonly LoopRow[],
  opened: readonly LoopRow[],
  signals: readonly string[],
  loopGain: Ratio,
): void {
  certifyAtPoints('a loop gain does not fit the characteristic equation 1 + L = 0', (seed) => {
    const point = new ResiduePoint(seed);
    const part = determinantOf(opened, signals, point);
    const whole = dotAt([part, part], [1, point.ratio(loopGain)], point);
    return agree([determinantOf(closed, signals, point), whole]);
  });
}

/** Checks that partial fractions add up to the whole. */
export function certifySum(whole: Ratio, parts: readonly Ratio[]): void {
  certifyAtPoints('partial fractions do not add up to the whole', (seed) => {
    const point = new ResiduePoint(seed);
    const shares = parts.map((part) => point.ratio(part));
    const ones = parts.map(() => 1);
    return agree([point.ratio(whole), dotAt(shares, ones, point)]);
  });
}

/** Checks the value of a formula in lowest terms at s = 0. Says nothing of dead time. */
export function certifyAtOrigin(formula: Ratio, value: Ratio): void {
  if ([formula.num, formula.den].some((p) => functionsOfS(p).length > 0)) return;
  certifyAtPoints('a value at s = 0 is wrong', (seed) => {
    const point = new ResiduePoint(seed, 0);
    return agree([point.ratio(formula), point.ratio(value)]);
  });
}

/** Checks that two polynomials in s are equal up to a factor free of s once these values stand in them. */
export function certifyMatch(
  p: Polynomial,
  q: Polynomial,
  values: ReadonlyMap<Generator, Ratio>,
): void {
  certifyAtPoints('matched gains do not make the polynomials equal', (seed) =>
    agree(
      atPlaces(seed, (point) => {
        for (const [g, value] of values) point.assign(g, point.ratio(value));
        return quotientAt([point.polynomial(p)], point.polynomial(q), point);
      }),
    ),
  );
}

/** Checks that a value of a symbol solves an equation, given as a polynomial that is to vanish. */
export function certifySolution(equation: Polynomial, unknown: Generator, solution: Ratio): void {
  certifyAtPoints('a solution does not satisfy its equation', (seed) => {
    const point = new ResiduePoint(seed);
    point.assign(unknown, point.ratio(solution));
    return agree([point.polynomial(equation), 0]);
  });
}

function isDelayed({ transform: { num, den }, after }: SignalTerm): boolean {
  return !isZeroRatio(after) || [num, den].some((p) => functionsOfS(p).length > 0);
}

/**
 * Checks a final value f: s ΣX − f vanishes at s = 0, so that with ΣX = N/D every power of s up to that of D divides
 * s N − f D. Says nothing of delayed sources and dead time.
 */
export function certifyFinalValue(terms: readonly SignalTerm[], value: Ratio): void {
  if (terms.some(isDelayed)) return;
  certifyAtPoints('a final value is not the limit of s X(s)', (seed) => {
    const point = new ResiduePoint(seed);
    const sum = sumOfImages(
      terms.map((term) => term.transform),
      point,
    );
    const limit = point.ratio(value);
    if (!sum || limit === null) return null;
    const order = sum.den.findIndex((c) => c !== 0);
    const scaled = mulImages(sum.den, [point.field.sub(0, limit)], point);
    const rest = addImages([0, ...sum.num], scaled, point).slice(0, order + 1);
    return order < 0 ? null : rest.every((c) => c === 0);
  });
}

/** Checks ∫|H|² df in closed form by Åström's recursion on the coefficients, which goes another way. */
export function certifyNoiseBandwidth(transfer: Ratio, value: Ratio): void {
  certifyAtPoints('a noise bandwidth does not agree with the recursion for it', (seed) => {
    const point = new ResiduePoint(seed);
    const [top, bottom] = [imageOf(transfer.num, point), imageOf(transfer.den, point)];
    if (!top || !bottom) return null;
    const power = whiteNoisePowerAt(top, bottom, point);
    const doubled = dotAt([2], [point.ratio(value)], point);
    return agree([power, doubled]);
  });
}

/**
 * The integral I of K. J. Åström at a point, for ascending coefficients; null where a step would divide by zero there.
 * Source: K. J. Åström, Introduction to Stochastic Control Theory, Academic Press, 1970, chapter 5, section 3 (from
 * memory).
 */
function whiteNoisePowerAt(top: Image, bottom: Image, { field }: ResiduePoint): number | null {
  let a = [...bottom].reverse();
  let b = Array.from({ length: a.length - 1 }, (_, i) => top[a.length - 2 - i] ?? 0);
  let sum = 0;
  while (a.length > 1) {
    if (a[0] === 0 || a[1] === 0) return null;
    const inverse = field.inverse(a[1]);
    const half = field.inverse(field.mul(2, a[0]));
    sum = field.add(sum, field.mul(field.mul(field.mul(b[0], b[0]), half), inverse));
    const [alpha, beta] = [a[0], b[0]].map((lead) => field.mul(lead, inverse));
    const odd = a.map((c, i) => (i % 2 === 1 ? c : 0));
    b = b.map((c, i) => field.sub(c, field.mul(beta, odd[i + 1]))).slice(1);
    a = a.map((c, i) => field.sub(c, field.mul(alpha, odd[i + 1] ?? 0))).slice(1);
  }
  return sum;
}

/** A row whose elements have values at a point; `special` where a rule for zeros made it. */
interface ElementRow {
  readonly entries: readonly Pick<Ratio, 'num' | 'den'>[];
  readonly special: RouthRow['special'];
}

/**
 * Checks the rows of a Routh array above the first special one: each of them follows from the two above.
 *
 * `descending`: the coefficients of the polynomial, that of the highest power of s first.
 */
export function certifyRouth(descending: readonly Polynomial[], rows: readonly ElementRow[]): void {
  const special = rows.findIndex((row) => row.special !== null);
  const regular = special < 0 ? rows : rows.slice(0, special);
  certifyAtPoints('a row of the Routh array does not follow from those above it', (seed) => {
    const point = new ResiduePoint(seed);
    const wanted = routhRowsAt(descending, regular.length, point);
    const found = regular.map((row) => row.entries.map((entry) => point.ratio(entry)));
    if (!wanted || !found.every(areKnown)) return null;
    return wanted.every((row, k) => found[k].every((value, i) => value === (row[i] ?? 0)));
  });
}

/** The first rows of the Routh array of a polynomial at a point; null where a first element vanishes there. */
function routhRowsAt(
  descending: readonly Polynomial[],
  count: number,
  point: ResiduePoint,
): readonly (readonly number[])[] | null {
  const { field } = point;
  const values: Values = descending.map((c) => point.polynomial(c));
  if (!areKnown(values)) return null;
  const rows = [0, 1].map((from) => values.filter((_, i) => i % 2 === from));
  while (rows.length < count) {
    const [above, row] = rows.slice(-2);
    if (!row[0]) return null;
    const factor = field.mul(above[0], field.inverse(row[0]));
    rows.push(above.slice(1).map((x, i) => field.sub(x, field.mul(factor, row[i + 1] ?? 0))));
  }
  return rows.slice(0, count);
}
