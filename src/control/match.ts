import {
  coefficientsIn,
  degreeIn,
  divRatios,
  generatorDependsOn,
  isZeroPolynomial,
  isZeroRatio,
  laplace,
  mulRatios,
  negRatio,
  ratioFromPolynomial,
  ratioOf,
  subRatios,
  substituteRatio,
  symbol,
  symbolsOfRatio,
  zeroRatio,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { isRefusal, refuse } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certifyMatch } from './certificate.ts';
import { degreeInS, functionsOfS } from './s-polynomial.ts';

/** One gain that was found. */
export interface MatchedGain {
  readonly gain: Generator;
  readonly value: Ratio;
}

/** An equation `ratio = 0` that came from comparing the coefficients of s^power. */
interface Equation {
  readonly ratio: Ratio;
  readonly power: number;
}

/** The factor between the two polynomials, where no coefficient gives it at once; no worksheet can use the name. */
const FACTOR = symbol('the factor between the polynomials');

const coefficient = (p: Polynomial, power: number): Ratio =>
  ratioFromPolynomial(coefficientsIn(p, laplace)[power] ?? (zeroRatio.num as Polynomial));

function holdsAny(r: Ratio, unknowns: readonly Generator[]): boolean {
  return symbolsOfRatio(r).some((g) => unknowns.includes(g));
}

/** p = factor · q, coefficient by coefficient, the factor read from the highest pair that holds no unknown. */
function equationsOf(p: Polynomial, q: Polynomial, unknowns: Generator[]): readonly Equation[] {
  const top = Math.max(degreeInS(p), degreeInS(q));
  const pairs = Array.from({ length: top + 1 }, (_, k) => ({
    power: top - k,
    left: coefficient(p, top - k),
    right: coefficient(q, top - k),
  }));
  const plain = pairs.find(
    ({ left, right }) =>
      !isZeroRatio(right) &&
      !isZeroRatio(left) &&
      !holdsAny(left, unknowns) &&
      !holdsAny(right, unknowns),
  );
  if (!plain) unknowns.push(FACTOR);
  const factor = plain ? divRatios(plain.left, plain.right) : ratioOf(FACTOR);
  return pairs.map(({ power, left, right }) => ({
    power,
    ratio: subRatios(left, mulRatios(factor, right)),
  }));
}

interface Pivot {
  readonly equation: Equation;
  readonly gain: Generator;
  readonly value: Ratio;
}

/** The unknown solved from an equation linear in it, if its coefficient holds no other unknown. */
function pivotOf(
  equation: Equation,
  gain: Generator,
  unknowns: readonly Generator[],
): Pivot | null {
  const { num } = equation.ratio;
  if (degreeIn(num, gain) !== 1) return null;
  if (symbolsOfRatio(equation.ratio).some((g) => g !== gain && generatorDependsOn(g, gain)))
    return null;
  const [rest, factor] = coefficientsIn(num, gain).map((c) => ratioFromPolynomial(c));
  if (holdsAny(factor, unknowns)) return null;
  return { equation, gain, value: negRatio(divRatios(rest, factor)) };
}

/** The pivot whose equation holds the fewest unknowns. */
function bestPivot(equations: readonly Equation[], unknowns: readonly Generator[]): Pivot | null {
  let best: { pivot: Pivot; count: number } | null = null;
  for (const equation of equations) {
    const present = unknowns.filter((g) => holdsAny(equation.ratio, [g]));
    for (const gain of present) {
      const pivot = pivotOf(equation, gain, unknowns);
      if (pivot && (!best || present.length < best.count)) best = { pivot, count: present.length };
    }
  }
  return best?.pivot ?? null;
}

function substituted(
  equations: readonly Equation[],
  pivot: Pivot,
  budget?: Budget,
): Equation[] | Refusal {
  const result: Equation[] = [];
  for (const equation of equations) {
    if (equation === pivot.equation) continue;
    const ratio = substituteRatio(equation.ratio, new Map([[pivot.gain, pivot.value]]), budget);
    if (isRefusal(ratio)) return ratio;
    if (!isZeroRatio(ratio)) result.push({ ...equation, ratio });
  }
  return result;
}

function names(generators: readonly Generator[]): string {
  return generators
    .filter((g) => g !== FACTOR)
    .map((g) => g.name)
    .join(', ');
}

function stuck(equations: readonly Equation[], left: readonly Generator[]): Refusal | null {
  const open = equations.filter((e) => !isZeroRatio(e.ratio));
  if (open.length > 0 && !holdsAny(open[0].ratio, left)) {
    return refuse(
      'overdetermined',
      `the coefficients of s^${open[0].power} cannot be matched: what is left holds none of the unknowns`,
    );
  }
  if (open.length > 0) {
    return refuse(
      'not-linear',
      `the equations for ${names(left)} are not linear, one after the other, in them`,
    );
  }
  return names(left) === ''
    ? null
    : refuse(
        'underdetermined',
        `nothing determines ${names(left)}: there are fewer coefficients than unknowns`,
      );
}

/** Earlier values hold unknowns found later; these are put in from the end. */
function backSubstituted(
  pivots: readonly Pivot[],
  budget?: Budget,
): ReadonlyMap<Generator, Ratio> | Refusal {
  const values = new Map<Generator, Ratio>();
  for (const { gain, value } of [...pivots].reverse()) {
    const known = substituteRatio(value, values, budget);
    if (isRefusal(known)) return known;
    values.set(gain, known);
  }
  return values;
}

/**
 * The gains that make a polynomial p in s equal to q up to a factor free of s (pole placement by matching
 * coefficients).
 *
 * Solves the equations one after the other, each linear in an unknown whose factor holds no other unknown; a linear
 * system is the usual case. Unknowns may occur in q too. Refuses where coefficients cannot be matched
 * (`overdetermined`), where unknowns are left over (`underdetermined`), where the equations are not linear, and dead time.
 * Source: K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, section 10-2 (direct comparison of coefficients).
 */
export function matchCoefficients(
  p: Polynomial,
  q: Polynomial,
  gains: readonly Generator[],
  budget?: Budget,
): readonly MatchedGain[] | Refusal {
  if (isZeroPolynomial(p) || isZeroPolynomial(q))
    return refuse('zero-polynomial', 'one of the polynomials is zero');
  if (functionsOfS(p).length + functionsOfS(q).length > 0) {
    return refuse(
      'dead-time',
      'coefficients are matched for polynomials in s; use rational_delay(Td, n)',
    );
  }
  let unknowns = [...gains];
  let equations: Equation[] = equationsOf(p, q, unknowns).filter((e) => !isZeroRatio(e.ratio));
  const pivots: Pivot[] = [];
  for (;;) {
    const pivot = bestPivot(equations, unknowns);
    if (!pivot) break;
    const next = substituted(equations, pivot, budget);
    if (isRefusal(next)) return next;
    equations = next;
    unknowns = unknowns.filter((g) => g !== pivot.gain);
    pivots.push(pivot);
  }
  const fault = stuck(equations, unknowns);
  if (fault) return fault;
  const values = backSubstituted(pivots, budget);
  if (isRefusal(values)) return values;
  certifyMatch(p, q, values);
  return gains.map((gain) => ({ gain, value: values.get(gain) ?? zeroRatio }));
}
