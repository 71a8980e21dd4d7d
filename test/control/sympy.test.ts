import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import {
  addRatios,
  derivativeRatio,
  determinant,
  discriminant,
  equalPolynomials,
  equalRatios,
  factorPolynomial,
  gcdPolynomials,
  isConstantPolynomial,
  laplace,
  lcmPolynomials,
  mulRatios,
  normalPart,
  onePolynomial,
  powPolynomial,
  productOfPolynomials,
  quotientOf,
  ratioFromPolynomial,
  resultant,
  symbol,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../../src/algebra/index.ts';
import { closeLoop, dcGain, partialFractions, transferFunction } from '../../src/control/index.ts';
import { equation, found, read } from './formulas.ts';

/** The problems with sympy's answers; the script beside this file made them. */
interface Stored {
  readonly source: string;
  readonly how: string;
  readonly problems: readonly Problem[];
}

type Problem =
  | { kind: Exclude<Kind, 'factor' | 'determinant' | 'loop'>; given: string[]; answer: string }
  | { kind: 'factor'; given: [string]; answer: [string, [string, number][]] }
  | { kind: 'determinant'; given: string[][]; answer: string }
  | { kind: 'loop'; given: Record<string, string>[]; answer: Record<string, string> };

type Kind =
  | 'cancel'
  | 'gcd'
  | 'factor'
  | 'resultant'
  | 'discriminant'
  | 'determinant'
  | 'derivative'
  | 'partial fractions'
  | 'loop'
  | 'value at 0';

const { source, how, problems } = JSON.parse(
  readFileSync(new URL('../data/sympy-problems.json', import.meta.url), 'utf8'),
) as Stored;

const polynomialOf = (text: string): Polynomial => read(text).num;
const byName = (name: string): Generator => (name === 's' ? laplace : symbol(name));

/** Whether ours is sympy's answer, up to what each calls a normal form. */
function agrees(problem: Problem): boolean {
  switch (problem.kind) {
    case 'factor':
      return agreeInFactors(problem.given[0], problem.answer);
    case 'determinant':
      return equalRatios(determinantOf(problem.given), read(problem.answer));
    case 'loop':
      return agreeInLoop(problem.given, problem.answer);
    case 'gcd':
      return equalUpToNumbers(
        gcdPolynomials(polynomialOf(problem.given[0]), polynomialOf(problem.given[1])),
        polynomialOf(problem.answer),
      );
    default:
      return equalRatios(answerOf(problem.kind, problem.given), read(problem.answer));
  }
}

function answerOf(kind: Kind, [first, second]: readonly string[]): Ratio {
  switch (kind) {
    case 'resultant':
      return ratioFromPolynomial(resultant(polynomialOf(first), polynomialOf(second), laplace));
    case 'discriminant':
      return ratioFromPolynomial(discriminant(polynomialOf(first), laplace));
    case 'derivative':
      return found(derivativeRatio(read(first), byName(second)));
    case 'partial fractions':
      return sumOfFractions(read(first));
    case 'value at 0': {
      const value = found(dcGain(read(first)));
      if (value.kind !== 'formula') throw new Error(value.reason);
      return value.ratio;
    }
    default:
      return read(first);
  }
}

function equalUpToNumbers(a: Polynomial, b: Polynomial): boolean {
  return equalPolynomials(normalPart(a), normalPart(b));
}

/** Our factors, each of them one of sympy's with its multiplicity, and as many. */
function agreeInFactors(text: string, [, wanted]: [string, [string, number][]]): boolean {
  const { factors } = factorPolynomial(polynomialOf(text));
  const proper = wanted.filter(([factor]) => !isConstantPolynomial(polynomialOf(factor)));
  return (
    factors.length === proper.length &&
    proper.every(([factor, multiplicity]) =>
      factors.some(
        (ours) =>
          ours.multiplicity === multiplicity && equalUpToNumbers(ours.factor, polynomialOf(factor)),
      ),
    )
  );
}

/** The determinant of a matrix of fractions without s below the line, cleared row by row. */
function determinantOf(rows: readonly (readonly string[])[]): Ratio {
  const entries = rows.map((row) => row.map(read));
  const multipliers = entries.map((row) =>
    row.reduce((lcm, { den }) => lcmPolynomials(lcm, den), onePolynomial),
  );
  const cleared = entries.map((row, i) =>
    row.map((r) => mulRatios(r, ratioOf(multipliers[i])).num),
  );
  const whole = ratioOf(determinant(cleared));
  return mulRatios(whole, { ...whole, num: onePolynomial, den: productOfPolynomials(multipliers) });
}

const ratioOf = ratioFromPolynomial;

/** The terms as they are, added up; each has a power of an irreducible factor below the line. */
function sumOfFractions(r: Ratio): Ratio {
  const { polynomial, terms } = found(partialFractions(r));
  for (const { factor, power, ratio } of terms)
    quotientOf(powPolynomial(factor, power), normalPart(ratio.den));
  const s = read('s');
  const whole = polynomial.reduceRight((sum, c) => addRatios(mulRatios(sum, s), c), read(0));
  return terms.reduce((sum, term) => addRatios(sum, term.ratio), whole);
}

function agreeInLoop(
  rows: readonly Record<string, string>[],
  answer: Record<string, string>,
): boolean {
  const loop = found(closeLoop(rows.map(equation), Object.keys(answer), ['u']));
  return Object.entries(answer).every(([signal, wanted]) =>
    equalRatios(found(transferFunction(loop, 'u', signal)).ratio, read(wanted)),
  );
}

describe(`${problems.length} problems as ${source} answers them (${how})`, () => {
  const kinds = [...new Set(problems.map(({ kind }) => kind))];
  test.each(kinds)('%s', (kind) => {
    const wrong = problems.filter((problem) => problem.kind === kind && !agrees(problem));
    expect(wrong).toEqual([]);
  });

  test('are 500', () => {
    expect(problems).toHaveLength(500);
  });
});
