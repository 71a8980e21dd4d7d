import {
  addRatios,
  divRatios,
  factorPolynomial,
  isZeroRatio,
  mulPolynomials,
  mulRatios,
  negRatio,
  powPolynomial,
  powRatio,
  productOfPolynomials,
  ratio,
  ratioFromPolynomial,
  ratioFromRational,
  rational,
  constantPolynomial,
  signOfRatio,
  sqrtOf,
  subRatios,
  symbolsOfRatio,
  zeroRatio,
} from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import { isRefusal, refuse } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { compileRatios } from './compile.ts';
import type { Resolve } from './compile.ts';
import { allOf, compare } from './conditions.ts';
import { overField } from './field-polynomial.ts';
import { numericTerms } from './numeric-response.ts';
import { partialFractions } from './partial-fractions.ts';
import type { PartialFraction } from './partial-fractions.ts';
import type { SignOf } from '../algebra/index.ts';
import { degreeInS, hasFunctionsOfS } from './s-polynomial.ts';
import { gathered, gatheredResponse, originalsOfPower } from './time-function.ts';
import type { PlainTerm, ResponseImpulse, ResponseTerm } from './time-function.ts';
import type { Condition, Response, SignalTerm, SignalValue } from './values.ts';

const number = (n: number): Ratio => ratioFromRational(rational(n));

/**
 * A square root of a ratio with all square factors drawn out, whatever their sign: for use where the sign of the root
 * does not matter (a response is even in its frequency).
 */
function eitherSquareRoot(r: Ratio, budget?: Budget): Ratio {
  const { unit, factors } = factorPolynomial(mulPolynomials(r.num, r.den, budget), budget);
  const outside = productOfPolynomials(
    factors.map((f) => powPolynomial(f.factor, Math.floor(f.multiplicity / 2))),
  );
  const inside = productOfPolynomials(
    factors.filter((f) => f.multiplicity % 2 === 1).map((f) => f.factor),
  );
  const kept = mulPolynomials(inside, constantPolynomial(unit));
  return mulRatios(ratio(outside, r.den, budget), sqrtOf(ratioFromPolynomial(kept), budget));
}

/** Terms of a response while they are being found. */
interface Found {
  readonly terms: ResponseTerm<Ratio>[];
  readonly impulses: ResponseImpulse[];
  readonly conditions: Condition[];
}

const factorial = (n: number): number => (n < 2 ? 1 : n * factorial(n - 1));

/** c/(a s + b)ᵏ ⟷ c/aᵏ tᵏ⁻¹/(k−1)! e^(−b t/a). */
function linearTerm(part: PartialFraction, after: Ratio): ResponseTerm<Ratio> {
  const [b, a] = overField(part.factor);
  const scale = mulRatios(powRatio(a, part.power), number(factorial(part.power - 1)));
  return {
    coefficient: divRatios(part.numerator[0], scale),
    power: part.power - 1,
    rate: negRatio(divRatios(b, a)),
    frequency: zeroRatio,
    wave: 'none',
    after,
  };
}

/** a s² + b s + c = a ((s − centre)² + square). */
function completedSquare(factor: Polynomial): { a: Ratio; centre: Ratio; square: Ratio } {
  const [c, b, a] = overField(factor);
  const centre = negRatio(divRatios(b, mulRatios(number(2), a)));
  return { a, centre, square: subRatios(divRatios(c, a), mulRatios(centre, centre)) };
}

function placed(
  term: PlainTerm,
  at: { centre: Ratio; frequency: Ratio; after: Ratio },
): ResponseTerm<Ratio> {
  const { coefficient, power, wave } = term;
  const base = { coefficient, power, after: at.after };
  if (wave === 'cos' || wave === 'sin') {
    return { ...base, rate: at.centre, frequency: at.frequency, wave };
  }
  const shift = wave === 'rising' ? at.frequency : negRatio(at.frequency);
  return { ...base, rate: addRatios(at.centre, shift), frequency: zeroRatio, wave: 'none' };
}

/** (A s + B)/(a s² + b s + c)ᵏ as damped waves, or as two exponentials where the roots are real. */
function quadraticTerms(
  part: PartialFraction,
  after: Ratio,
  found: Found,
  signOf: SignOf,
  budget?: Budget,
): void {
  const { a, centre, square } = completedSquare(part.factor);
  const sign = signOfRatio(square, signOf);
  const oscillating = sign !== 'negative';
  if (oscillating && sign !== 'positive') found.conditions.push(compare(square, '>', zeroRatio));
  const frequency = eitherSquareRoot(oscillating ? square : negRatio(square), budget);
  const { still, moving } = originalsOfPower(frequency, oscillating, part.power);
  const slope = part.numerator[1] ?? zeroRatio;
  const level = addRatios(part.numerator[0], mulRatios(slope, centre));
  const share = (terms: readonly PlainTerm[], factor: Ratio): PlainTerm[] =>
    terms.map((t) => ({
      ...t,
      coefficient: divRatios(mulRatios(t.coefficient, factor), powRatio(a, part.power)),
    }));
  for (const term of gathered([...share(moving, slope), ...share(still, level)])) {
    found.terms.push(placed(term, { centre, frequency, after }));
  }
}

function exactTerms(
  term: SignalTerm,
  found: Found,
  signOf: SignOf,
  budget?: Budget,
): Refusal | null {
  const parts = partialFractions(term.transform, budget);
  if (isRefusal(parts)) return parts;
  pushImpulses(parts.polynomial, term.after, found.impulses);
  for (const part of parts.terms) {
    if (degreeInS(part.factor) === 1) found.terms.push(linearTerm(part, term.after));
    else quadraticTerms(part, term.after, found, signOf, budget);
  }
  return null;
}

function pushImpulses(
  polynomial: readonly Ratio[],
  after: Ratio,
  impulses: ResponseImpulse[],
): void {
  polynomial.forEach((coefficient, order) => {
    if (!isZeroRatio(coefficient)) impulses.push({ coefficient, order, after });
  });
}

/** Whether all factors of the denominator have degree at most 2 in s, so that the exact form is short. */
function isShort(transform: Ratio, budget?: Budget): boolean {
  return factorPolynomial(transform.den, budget).factors.every(
    ({ factor }) => degreeInS(factor) <= 2,
  );
}

function hasSymbols(r: Ratio): boolean {
  return symbolsOfRatio(r).length > 0;
}

function decimalResponse(
  terms: readonly SignalTerm[],
  x: SignalValue,
  budget?: Budget,
): Response | Refusal {
  const impulses: ResponseImpulse[] = [];
  const found: ResponseTerm<number>[] = [];
  for (const term of terms) {
    const parts = partialFractions(term.transform, budget);
    if (isRefusal(parts)) return parts;
    pushImpulses(parts.polynomial, term.after, impulses);
    found.push(...numericTerms(term.transform, term.after, budget));
  }
  const { when, notes } = x;
  return Object.freeze({ kind: 'response', exact: false, terms: found, impulses, when, notes });
}

/**
 * The time response of a signal in closed form, for t ≥ 0 with zero initial conditions.
 *
 * Exact where every factor of the denominators has degree at most 2 in s, with symbols too; a quadratic factor of
 * unknown discriminant is taken as oscillating under the condition `when`. Where a larger factor has numbers only, its
 * roots are found numerically and the whole response is in decimals (`exact` is false). Refuses larger factors with
 * symbols (`needs-numbers`), dead time, and noise.
 * Source: M. Abramowitz, I. A. Stegun (eds.), Handbook of Mathematical Functions, NBS, 1964, section 29.
 */
export function responseOf(x: SignalValue, signOf: SignOf, budget?: Budget): Response | Refusal {
  const terms = x.terms.filter((t) => !isZeroRatio(t.transform));
  const random = terms.find((t) => t.source === 'random');
  if (random) {
    return refuse(
      'random',
      `the noise in ${random.input} has no closed form in time; constant(…) leaves it out`,
    );
  }
  if (terms.some((t) => hasFunctionsOfS(t.transform))) {
    return refuse(
      'dead-time',
      'a loop with dead time has no closed-form response; use rational_delay(Td, n)',
    );
  }
  const decimals = terms.some((t) => !isShort(t.transform, budget));
  if (decimals && !terms.some((t) => hasSymbols(t.transform)))
    return decimalResponse(terms, x, budget);
  const found: Found = { terms: [], impulses: [], conditions: [] };
  for (const term of terms) {
    const refusal = exactTerms(term, found, signOf, budget);
    if (refusal) return refusal;
  }
  return Object.freeze({
    kind: 'response',
    exact: true,
    terms: gatheredResponse(found.terms),
    impulses: found.impulses,
    when: allOf([x.when, ...found.conditions]),
    notes: x.notes,
  });
}

type NumberTerm = Omit<ResponseTerm<number>, 'after'> & { readonly after: number };

/** A response as a function of time, its parameters still to be given. */
export interface ResponseSampler {
  readonly inputs: readonly string[];
  /** The response at each time (its impulses left out), for inputs in the order of `inputs`. */
  sample(values: ArrayLike<number>, times: ArrayLike<number>): Float64Array;
}

function valueAt(term: NumberTerm, time: number): number {
  const t = time - term.after;
  if (t < 0) return 0;
  const angle = term.frequency * t;
  const wave = term.wave === 'none' ? 1 : term.wave === 'cos' ? Math.cos(angle) : Math.sin(angle);
  return term.coefficient * t ** term.power * Math.exp(term.rate * t) * wave;
}

/** The exact amounts of a response, four for each term. */
function amountsOf(response: Response): Ratio[] {
  return response.exact
    ? response.terms.flatMap((t) => [t.coefficient, t.rate, t.frequency, t.after])
    : response.terms.map((t) => t.after);
}

/** Compiles a response for evaluation over times. */
export function compileResponse(response: Response, resolve: Resolve): ResponseSampler {
  const { tape, inputs, outputs } = compileRatios(amountsOf(response), resolve);
  const numberTerms = (values: ArrayLike<number>): NumberTerm[] => {
    const all = tape.evaluate(values);
    const amount = (k: number): number => (outputs[k].im === null ? all[outputs[k].re] : NaN);
    if (!response.exact) return response.terms.map((t, i) => ({ ...t, after: amount(i) }));
    return response.terms.map((t, i) => ({
      power: t.power,
      wave: t.wave,
      coefficient: amount(4 * i),
      rate: amount(4 * i + 1),
      frequency: amount(4 * i + 2),
      after: amount(4 * i + 3),
    }));
  };
  return {
    inputs,
    sample(values, times) {
      const terms = numberTerms(values);
      return Float64Array.from(times, (t) =>
        terms.reduce((sum, term) => sum + valueAt(term, t), 0),
      );
    },
  };
}
