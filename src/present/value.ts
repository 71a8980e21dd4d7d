import type { NoValue, PartsValue, SignalTerm, SignalValue, Value } from '../control/index.ts';
import {
  addRatios,
  functionOf,
  isZeroRatio,
  laplace,
  mulRatios,
  negRatio,
  ratioFromRational,
  ratioOf,
  rational,
  symbol,
  zeroRatio,
  type Ratio,
} from '../algebra/index.ts';
import { nameToLatex, nameToText } from '../language/index.ts';
import { conditionLatex, conditionText } from './condition.ts';
import { formulaLatex, formulaText, polynomialLatex, polynomialText } from './formula.ts';
import { matrixLatex, matrixText, routhLatex, routhText } from './table.ts';
import { wordsLatex } from './words.ts';
import { timeLast, type Writing } from './writing.ts';

/**
 * Any value as text; re-readable wherever the language has a form for it (formulas, conditions, matrices, sums of
 * parts). Roots are given by their polynomial, since their numbers belong to the numeric stage.
 */
export function valueText(value: Value, writing: Writing): string {
  switch (value.kind) {
    case 'formula':
      return formulaText(value.ratio, writing);
    case 'none':
      return noValueText(value, writing);
    case 'condition':
      return conditionText(value.condition, writing);
    case 'signal':
      return formulaText(transformOf(value), writing);
    case 'matrix':
      return matrixText(value.rows, writing);
    case 'array':
      return routhText(value.routh, writing);
    case 'roots':
      return `${polynomialText(value.polynomial, writing)} = 0`;
    case 'parts':
      return partsText(value, writing);
    case 'text':
      return value.text;
  }
}

/** The same value as {@link valueText}, as LaTeX. */
export function valueLatex(value: Value, writing: Writing): string {
  switch (value.kind) {
    case 'formula':
      return formulaLatex(value.ratio, writing);
    case 'none':
      return noValueLatex(value, writing);
    case 'condition':
      return conditionLatex(value.condition, writing);
    case 'signal':
      return formulaLatex(transformOf(value), writing);
    case 'matrix':
      return matrixLatex(value.rows, writing);
    case 'array':
      return routhLatex(value.routh, writing);
    case 'roots':
      return `${polynomialLatex(value.polynomial, writing)}=0`;
    case 'parts':
      return partsLatex(value, writing);
    case 'text':
      return value.latex;
  }
}

/** Several named formulas: a sum of fractions, or `Kp = …, Ki = …`. */
export function partsText(value: PartsValue, writing: Writing): string {
  if (value.joined === 'sum') {
    return joinSigned(
      value.parts.map((part) => valueText(part.value, writing)),
      ' ',
    );
  }
  return value.parts
    .map((part) => `${nameToText(part.name)} = ${valueText(part.value, writing)}`)
    .join(', ');
}

/** The same parts as {@link partsText}, as LaTeX. */
export function partsLatex(value: PartsValue, writing: Writing): string {
  if (value.joined === 'sum') {
    return joinSigned(
      value.parts.map((part) => valueLatex(part.value, writing)),
      '',
    );
  }
  return value.parts
    .map((part) => `${nameToLatex(part.name)}=${valueLatex(part.value, writing)}`)
    .join(',\\quad ');
}

/** Joins written terms into a sum, a leading minus becoming the sign between. */
function joinSigned(terms: readonly string[], space: string): string {
  if (terms.length === 0) return '0';
  return terms.reduce((sum, term) =>
    term.startsWith('-')
      ? `${sum}${space}-${space}${term.slice(1)}`
      : `${sum}${space}+${space}${term}`,
  );
}

/** The transform of a signal without its noise, each source's share delayed as it begins. */
function transformOf(signal: SignalValue): Ratio {
  return signal.terms
    .filter((term) => !term.noise)
    .reduce((sum, term) => addRatios(sum, delayed(term)), zeroRatio);
}

function delayed({ transform, after }: SignalTerm): Ratio {
  if (isZeroRatio(after)) return transform;
  const exponent = negRatio(mulRatios(after, ratioOf(laplace)));
  return mulRatios(transform, ratioOf(functionOf('exp', [exponent])));
}

function noValueText(value: NoValue, writing: Writing): string {
  if (value.growth === null) return value.reason;
  const { rate, power } = value.growth;
  const what = power === 1 ? 'rate' : `its derivative of order ${power} goes to`;
  return `${value.reason} (${what} ${formulaText(rate, writing)})`;
}

function noValueLatex(value: NoValue, writing: Writing): string {
  if (value.growth === null) return wordsLatex(value.reason);
  const { rate, power } = value.growth;
  const law = Array.from({ length: power }, (_, i) => overCount(i + 1)).reduce(
    (product, factor) => mulRatios(product, factor),
    rate,
  );
  return `\\text{grows as}\\quad ${formulaLatex(law, timeLast(writing))}`;
}

/** t over a count: their product up to n is tⁿ/n!. */
function overCount(count: number): Ratio {
  return mulRatios(ratioOf(symbol('t')), ratioFromRational(rational(1n, BigInt(count))));
}
