import {
  divideExactly,
  factorPolynomial,
  gcdPolynomials,
  isConstantPolynomial,
  productOfPolynomials,
  signOfPolynomial,
} from '../algebra/index.ts';
import type { Polynomial } from '../algebra/index.ts';
import type { Budget } from '../base/index.ts';
import { describePlace, integersInS, unstablePlace } from './pole-place.ts';
import type { SignOf } from '../algebra/index.ts';
import {
  degreeInS,
  descendingInS,
  functionsOfS,
  isFreeOfS,
  withoutPowerOfS,
} from './s-polynomial.ts';
import { stabilityConditions } from './stability.ts';
import type { SignalTerm, SignalValue, StabilityBlock } from './values.ts';

/** Whether a polynomial's roots all decay: yes, no (with words for where they lie), or open (it depends on values). */
export type Verdict =
  | { readonly kind: 'stable' }
  | { readonly kind: 'unstable'; readonly words: string }
  | { readonly kind: 'open' };

const STABLE: Verdict = Object.freeze({ kind: 'stable' });
const OPEN: Verdict = Object.freeze({ kind: 'open' });

/** Up to this degree a factor with symbols is judged by its Hurwitz conditions; above, by coefficient signs alone. */
const JUDGED_DEGREE = 4;

function judgeSymbolic(p: Polynomial, signOf: SignOf, budget?: Budget): Verdict {
  const signs = descendingInS(p).map((c) => signOfPolynomial(c, signOf));
  const missing = signs.indexOf('zero');
  if (missing >= 0) {
    const power = degreeInS(p) - missing;
    return {
      kind: 'unstable',
      words: `poles on or right of the imaginary axis for all values (its term in s^${power} is missing)`,
    };
  }
  if (signs.includes('positive') && signs.includes('negative')) {
    return {
      kind: 'unstable',
      words: 'a pole in the right half plane for all values (its coefficients differ in sign)',
    };
  }
  if (degreeInS(p) > JUDGED_DEGREE) return OPEN;
  const conditions = stabilityConditions(p, signOf, budget);
  if (conditions.length === 0) return STABLE;
  const never = conditions.some((c) => c.kind === 'truth' && !c.value);
  return never
    ? { kind: 'unstable', words: 'poles on or right of the imaginary axis for all values' }
    : OPEN;
}

function judgeFactor(p: Polynomial, signOf: SignOf, budget?: Budget): Verdict {
  const integers = integersInS(p);
  if (!integers) return judgeSymbolic(p, signOf, budget);
  const place = unstablePlace(integers);
  return place ? { kind: 'unstable', words: describePlace(place) } : STABLE;
}

/** Judges whether all roots of a polynomial in s decay, as far as numbers and known signs decide it. */
export function judgeStability(p: Polynomial, signOf: SignOf, budget?: Budget): Verdict {
  if (functionsOfS(p).length > 0) return OPEN;
  let verdict: Verdict = STABLE;
  for (const { factor } of factorPolynomial(p, budget).factors) {
    if (isFreeOfS(factor)) continue;
    const judged = judgeFactor(factor, signOf, budget);
    if (judged.kind === 'unstable') return judged;
    if (judged.kind === 'open') verdict = judged;
  }
  return verdict;
}

/** What must decay for a signal to settle: a block of its loop, or poles that only a source or a formula brings. */
export interface Settling extends StabilityBlock {
  /** The source's share whose own poles these are; null for a block of the loop. */
  readonly term: SignalTerm | null;
}

/** A polynomial divided by everything it shares with another. */
function coprimeTo(p: Polynomial, other: Polynomial, budget?: Budget): Polynomial {
  for (let rest = p; ;) {
    const common = gcdPolynomials(rest, other, budget);
    const next = isConstantPolynomial(common) ? null : divideExactly(rest, common, budget);
    if (!next) return rest;
    rest = next;
  }
}

/** All that must decay, poles at s = 0 left out: these are counted, not judged. */
export function settlingOf(x: SignalValue, budget?: Budget): readonly Settling[] {
  const blocks = x.blocks.map((b) => ({
    ...b,
    polynomial: withoutPowerOfS(b.polynomial),
    term: null,
  }));
  const all = productOfPolynomials(
    x.blocks.map((b) => b.polynomial),
    budget,
  );
  const own = x.terms.map((term) => ({
    signals: [],
    polynomial: coprimeTo(withoutPowerOfS(term.transform.den), all, budget),
    term,
  }));
  return [...blocks, ...own].filter(
    ({ polynomial }) => degreeInS(polynomial) > 0 || functionsOfS(polynomial).length > 0,
  );
}
