import {
  addRatios,
  applyFunction,
  asRational,
  coefficientsIn,
  divRatios,
  fractionOfRatio,
  laplace,
  mulRatios,
  negRatio,
  parseRational,
  pi,
  polynomialFromCoefficients,
  powRatio,
  rational,
  rationalToNumber,
  ratioFromPolynomial,
  ratioFromRational,
  ratioOf,
  subRatios,
  symbol,
  type Polynomial,
  type Ratio,
  type Sign,
  type SignOf,
} from '../../src/algebra/index.ts';
import { isRefusal, type Refusal } from '../../src/base/index.ts';
import {
  ALWAYS,
  compileRatios,
  type LoopRow,
  type SignalTerm,
  type SignalValue,
} from '../../src/control/index.ts';

const GENERATORS = new Map([
  ['s', laplace],
  ['pi', pi],
]);

/** Reads a plain expression: numbers, names, + - * / ** ^, brackets and functions of one argument. */
export function read(text: string | number): Ratio {
  const tokens =
    String(text).match(/\d+(?:\.\d+)?(?:e[+-]?\d+)?|\p{L}[\p{L}\d_]*|\*\*|[-+*/^()]/gu) ?? [];
  let at = 0;
  const bracket = (): Ratio => {
    at += 1;
    const inner = sum();
    at += 1;
    return inner;
  };
  const atom = (): Ratio => {
    if (tokens[at] === '(') return bracket();
    const token = tokens[at++];
    if (token === '-') return negRatio(power());
    if (/^\d/.test(token)) return ratioFromRational(parseRational(token));
    if (tokens[at] === '(') return found(applyFunction(token, [bracket()]));
    return ratioOf(GENERATORS.get(token) ?? symbol(token));
  };
  const power = (): Ratio => {
    const base = atom();
    if (tokens[at] !== '**' && tokens[at] !== '^') return base;
    at += 1;
    return powRatio(base, Number(tokens[at++]));
  };
  const product = (): Ratio => {
    let value = power();
    while (tokens[at] === '*' || tokens[at] === '/') {
      value = tokens[at++] === '/' ? divRatios(value, power()) : mulRatios(value, power());
    }
    return value;
  };
  const sum = (): Ratio => {
    let value = product();
    while (tokens[at] === '+' || tokens[at] === '-') {
      value = tokens[at++] === '-' ? subRatios(value, product()) : addRatios(value, product());
    }
    return value;
  };
  return sum();
}

/** The answer of a function that must not refuse here. */
export function found<T>(answer: T | Refusal): T {
  if (isRefusal(answer)) throw new Error(`${answer.code}: ${answer.reason}`);
  return answer;
}

/** A polynomial in s from coefficients, highest power first, each a number or an expression without a denominator. */
export function polynomial(descending: readonly (number | string)[]): Polynomial {
  const ratios = descending.map(read);
  const scaled = ratios.reduce((d, r) => mulRatios(d, ratioFromPolynomial(r.den)), read(1));
  const coefficients = ratios.map((r) => mulRatios(r, scaled).num);
  return polynomialFromCoefficients(coefficients.reverse(), laplace);
}

/** The quotient of two lists of coefficients, highest power first. */
export function quotient(f: {
  readonly num: readonly number[];
  readonly den: readonly number[];
}): Ratio {
  const poly = (list: readonly number[]): Ratio =>
    list.reduce(
      (sum, c) => addRatios(mulRatios(sum, read('s')), read(c < 0 ? `0${c}` : c)),
      read(0),
    );
  return divRatios(poly(f.num), poly(f.den));
}

/** A polynomial in s as its ratio's numerator, from a formula. */
export function polynomialOf(text: string): Polynomial {
  return read(text).num;
}

/** Coefficients in s as texts cannot disagree: compares canonical forms. */
export function coefficientList(p: Polynomial): readonly Ratio[] {
  return [...coefficientsIn(p, laplace)].reverse().map((c) => ratioFromPolynomial(c));
}

/** Signs by name; symbols that are not named are unknown. */
export function signs(named: Readonly<Record<string, Sign>>): SignOf {
  return (g) => named[g.name] ?? 'unknown';
}

/** Every symbol positive. */
export const positive: SignOf = () => 'positive';

/** Nothing known of any symbol. */
export const unknown: SignOf = () => 'unknown';

/** An equation Σ coefficient · signal = 0 from formulas. */
export function equation(coefficients: Readonly<Record<string, string | number>>): LoopRow {
  return {
    coefficients: new Map(
      Object.entries(coefficients).map(([name, c]) => [name, fractionOfRatio(read(c))]),
    ),
  };
}

/** A signal from its terms; `blocks` as characteristic polynomials. */
export function signal(
  terms: readonly Partial<SignalTerm>[],
  blocks: SignalValue['blocks'] = [],
): SignalValue {
  return {
    kind: 'signal',
    name: 'x',
    when: ALWAYS,
    notes: [],
    inputs: [],
    blocks,
    terms: terms.map((t) => ({
      input: 'w',
      source: 'constant',
      transform: read(0),
      after: read(0),
      ...t,
    })),
  };
}

/** The numbers that a ratio in s without symbols has as coefficients, highest power first. */
export function numbersOf(r: Ratio): { readonly num: number[]; readonly den: number[] } {
  const list = (p: Polynomial): number[] =>
    coefficientList(p).map((c) => rationalToNumber(asRational(c) ?? rational(0)));
  return { num: list(r.num), den: list(r.den) };
}

/** The value of a ratio at numbers for its symbols. */
export function numberAt(r: Ratio, values: Readonly<Record<string, number>>): number {
  const { tape, inputs } = compileRatios([r], () => 'input');
  return tape.evaluate(inputs.map((name) => values[name]))[0];
}
