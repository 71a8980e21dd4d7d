import {
  addRatios,
  applyFunction,
  asRational,
  divRatios,
  imaginary,
  laplace,
  mulRatios,
  negRatio,
  oneRatio,
  parseRational,
  pi,
  powRatio,
  ratioFromRational,
  ratioOf,
  symbol,
  zeroRatio,
  type Generator,
  type Ratio,
} from '../../src/algebra/index.ts';
import { isRefusal } from '../../src/base/index.ts';
import {
  canonicalName,
  isReserved,
  parseFormula,
  type Expression,
  type NameKind,
} from '../../src/language/index.ts';
import type { Writing } from '../../src/present/writing.ts';
import { isUnitSymbol } from '../../src/units/index.ts';

const FUNCTIONS = new Set([
  'delay',
  'sqrt',
  'exp',
  'log',
  'sin',
  'cos',
  'tan',
  'atan',
  'abs',
  'nominal',
]);

const vocabulary = {
  isUnit: isUnitSymbol,
  functions: FUNCTIONS,
  slotArguments: () => false,
};

/** Every name of a formula as a symbol of its worksheet, so that none is taken for a unit. */
function symbolsIn(text: string): ReadonlyMap<string, NameKind> {
  const names = text.match(/\p{L}[\p{L}\p{N}_]*/gu) ?? [];
  const own = names.filter((name) => !FUNCTIONS.has(name) && !isReserved(name));
  return new Map(own.map((name) => [canonicalName(name), 'symbol']));
}

/** The exact value of a formula of the worksheet language, read by its own grammar. */
export function readFormula(text: string): Ratio {
  return valueOf(readExpression(text));
}

/** The tree of a formula, which must be free of errors. */
export function readExpression(text: string): Expression {
  const { expression, problems } = parseFormula(text, vocabulary, symbolsIn(text));
  if (problems.some(({ severity }) => severity === 'error') || expression === null) {
    throw new Error(`${text}: ${problems.map(({ message }) => message).join('; ')}`);
  }
  return expression;
}

function valueOf(e: Expression): Ratio {
  switch (e.kind) {
    case 'number':
      return ratioFromRational(parseRational(e.text));
    case 'name':
      return ratioOf(generatorOf(e.name));
    case 'sum':
      return e.terms.reduce(
        (sum, term, i) => addRatios(sum, e.signs[i] < 0 ? negRatio(valueOf(term)) : valueOf(term)),
        zeroRatio,
      );
    case 'product':
      return e.factors.reduce(
        (product, factor, i) =>
          e.inverted[i] ? divRatios(product, valueOf(factor)) : mulRatios(product, valueOf(factor)),
        oneRatio,
      );
    case 'negation':
      return negRatio(valueOf(e.of));
    case 'power':
      return powRatio(valueOf(e.base), Number(asRational(valueOf(e.exponent))?.n));
    case 'call':
      return called(e.callee, e.args.map(valueOf));
    default:
      throw new Error(`no value for a ${e.kind}`);
  }
}

function called(name: string, args: readonly Ratio[]): Ratio {
  if (name === 'delay') return called('exp', [negRatio(mulRatios(args[0], ratioOf(laplace)))]);
  const value = applyFunction(name, args);
  if (isRefusal(value)) throw new Error(value.reason);
  return value;
}

function generatorOf(name: string): Generator {
  if (name === 's') return laplace;
  if (name === 'j') return imaginary;
  return name === 'pi' ? pi : symbol(name);
}

/** A worksheet that introduces these names in this order, all of them positive, the gains tuned. */
export function writingOf(names: string, tuned = ''): Writing {
  const list = names.split(' ');
  return {
    order: (g) => (list.includes(g.name) ? list.indexOf(g.name) : list.length),
    tuned: tuned.split(' ').filter(Boolean).map(symbol),
    signOf: (g) => (g.kind === 'symbol' || g.kind === 'constant' ? 'positive' : 'unknown'),
  };
}
