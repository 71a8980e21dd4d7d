import {
  factorPolynomial,
  isZeroPolynomial,
  mulPolynomials,
  negPolynomial,
  termCount,
} from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { allOf, FALSE, undecided } from './conditions.ts';
import { hurwitzDeterminants } from './hurwitz.ts';
import { partsOf, reduceRelation, reduceTogether } from './reduced-condition.ts';
import type { SignOf } from '../algebra/index.ts';
import { degreeInS, descendingInS, functionsOfS, isFreeOfS } from './s-polynomial.ts';
import { simpleSign } from './simple-factors.ts';
import type { Condition, StabilityBlock } from './values.ts';

/** What must be positive: a coefficient or a Hurwitz determinant, `odd` if it changes sign with the polynomial. */
interface Positive {
  readonly polynomial: Polynomial;
  readonly odd: boolean;
}

/**
 * The two shortest sets of A. Liénard and M. H. Chipart for a₀ > 0: the determinants Δₙ₋₁, Δₙ₋₃, … together with
 * either aₙ, aₙ₋₂, … or aₙ, aₙ₋₁, aₙ₋₃, …
 * Source: F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959, ch. XV, § 13, theorem 11.
 */
function lienardChipart(
  descending: readonly Polynomial[],
  determinants: readonly Polynomial[],
): readonly (readonly Positive[])[] {
  const n = descending.length - 1;
  const shared = determinants
    .map((polynomial, i) => ({ polynomial, odd: i % 2 === 0 }))
    .filter((_, i) => i + 1 < n && (n - 1 - (i + 1)) % 2 === 0);
  const coefficients = (wanted: (fromLast: number) => boolean): Positive[] =>
    descending
      .map((polynomial) => ({ polynomial, odd: true }))
      .filter((_, k) => k > 0 && wanted(n - k));
  return [
    [...coefficients((k) => k % 2 === 0), ...shared],
    [...coefficients((k) => k === 0 || k % 2 === 1), ...shared],
  ];
}

function positivity(
  set: readonly Positive[],
  lead: Polynomial,
  signOf: SignOf,
  budget?: Budget,
): readonly Condition[] {
  const sign = simpleSign(lead, signOf);
  const conditions = set.map(({ polynomial, odd }) => {
    const signed = sign === 'negative' && odd ? negPolynomial(polynomial) : polynomial;
    const known = sign === 'positive' || sign === 'negative' || !odd;
    const product = known ? signed : mulPolynomials(lead, signed, budget);
    return reduceRelation({ polynomial: product, operator: '>' }, signOf, budget);
  });
  return partsOf(allOf(conditions));
}

function length(conditions: readonly Condition[]): number {
  return conditions.reduce((sum, c) => sum + (c.kind === 'compare' ? comparedTerms(c) : 1), 0);
}

function comparedTerms(c: Extract<Condition, { kind: 'compare' }>): number {
  return 1 + termCount(c.left.num) + termCount(c.right.num);
}

function shortest(sets: readonly (readonly Condition[])[]): readonly Condition[] {
  return sets.reduce((best, set) =>
    set.length < best.length || (set.length === best.length && length(set) < length(best))
      ? set
      : best,
  );
}

/** Conditions for one factor that contains s. */
function conditionsOfFactor(p: Polynomial, signOf: SignOf, budget?: Budget): readonly Condition[] {
  const descending = descendingInS(p);
  if (isZeroPolynomial(descending[descending.length - 1])) return [FALSE];
  const determinants = hurwitzDeterminants(descending, budget);
  if (determinants.some(isZeroPolynomial)) return [FALSE];
  return shortest(
    lienardChipart(descending, determinants).map((set) =>
      positivity(set, descending[0], signOf, budget),
    ),
  );
}

/**
 * The conditions that together say that all roots of a polynomial in s lie in the open left half plane.
 *
 * Factors of known sign are dropped, and so is what other conditions of the list imply by a sign. An empty list is
 * always stable, `[false]` never. A leading coefficient of unknown sign is taken to be nonzero. The zero polynomial
 * is never stable; dead time gives `undecided`.
 * Cost: Hurwitz determinants of every factor, spent from the budget.
 */
export function stabilityConditions(
  p: Polynomial,
  signOf: SignOf,
  budget?: Budget,
): readonly Condition[] {
  if (isZeroPolynomial(p)) return [FALSE];
  if (functionsOfS(p).length > 0) {
    return [undecided('with dead time stability is decided at numbers only')];
  }
  const conditions = factorPolynomial(p, budget).factors.flatMap(({ factor }) =>
    isFreeOfS(factor)
      ? [reduceRelation({ polynomial: factor, operator: '!=' }, signOf, budget)]
      : conditionsOfFactor(factor, signOf, budget),
  );
  return reduceTogether(conditions, signOf, budget);
}

/** Every `stable` in a condition replaced by the inequalities it stands for. */
export function expandStable(condition: Condition, signOf: SignOf, budget?: Budget): Condition {
  switch (condition.kind) {
    case 'stable':
      return allOf(
        condition.blocks.flatMap((b) => stabilityConditions(b.polynomial, signOf, budget)),
      );
    case 'all':
      return allOf(condition.of.map((c) => expandStable(c, signOf, budget)));
    case 'any':
      return { kind: 'any', of: condition.of.map((c) => expandStable(c, signOf, budget)) };
    case 'not':
      return { kind: 'not', of: expandStable(condition.of, signOf, budget) };
    default:
      return condition;
  }
}

/** That all these blocks are stable; blocks without s drop out. */
export function stable(blocks: readonly StabilityBlock[]): Condition {
  const dynamic = blocks.filter(
    (b) => degreeInS(b.polynomial) > 0 || functionsOfS(b.polynomial).length > 0,
  );
  return dynamic.length === 0
    ? allOf([])
    : Object.freeze({ kind: 'stable', blocks: Object.freeze(dynamic) });
}
