import {
  addRational,
  evaluatePolynomial,
  generatorsOf,
  isZeroRational,
  mulRational,
  rational,
  divRational,
  zeroRational,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio, Rational } from '../algebra/index.ts';
import { invariant } from '../base/index.ts';
import type { LoopRow } from './loops.ts';

/** Small primes, one for each generator, so that the point is no root of anything by accident. */
const PRIMES = [7, 11, 13, 17, 19, 23, 29, 31, 37, 41, 43, 47, 53, 59, 61, 67, 71, 73, 79, 83];

/** A point with a value for every generator met; the same generator keeps its value. */
class Point {
  private readonly values = new Map<Generator, Rational>();

  readonly at = (g: Generator): Rational => {
    const known = this.values.get(g);
    if (known) return known;
    const k = this.values.size;
    const value = rational(PRIMES[k % PRIMES.length] + 2 * k, PRIMES[(k + 7) % PRIMES.length]);
    this.values.set(g, value);
    return value;
  };
}

const hasRelation = (generators: readonly Generator[]): boolean => generators.some((g) => g.square);

/** num/den at a point; null at a pole, and where square roots or j would need a value that fits their relation. */
function valueAt(f: { num: Polynomial; den: Polynomial }, point: Point): Rational | null {
  if (hasRelation(generatorsOf(f.num)) || hasRelation(generatorsOf(f.den))) return null;
  const den = evaluatePolynomial(f.den, point.at);
  if (isZeroRational(den)) return null;
  return divRational(evaluatePolynomial(f.num, point.at), den);
}

/**
 * Checks solved signals against an equation of the loop as it was written, at one rational point: a mismatch is our
 * bug. Signals that are not in `solutions` are zero. Says nothing where the point meets a pole.
 */
export function certify(row: LoopRow, solutions: ReadonlyMap<string, Ratio>): void {
  const point = new Point();
  let sum = zeroRational;
  for (const [name, coefficient] of row.coefficients) {
    const solution = solutions.get(name);
    if (!solution) continue;
    const [left, right] = [valueAt(coefficient, point), valueAt(solution, point)];
    if (!left || !right) return;
    sum = addRational(sum, mulRational(left, right));
  }
  invariant(
    isZeroRational(sum),
    'a derived transfer function does not satisfy the equations of its loop',
  );
}
