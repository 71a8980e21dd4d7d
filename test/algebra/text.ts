import {
  addRatios,
  divRatios,
  imaginary,
  laplace,
  mulRatios,
  negRatio,
  parseRational,
  pi,
  powRatio,
  ratioFromRational,
  ratioOf,
  symbol,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../../src/algebra/index.ts';

const RESERVED = new Map<string, Generator>([
  ['s', laplace],
  ['j', imaginary],
  ['pi', pi],
]);

/** Reads tests' formulas: numbers, names, + - * / ^ and brackets; a space does not multiply. */
export function read(text: string): Ratio {
  const tokens = text.match(/\d+(?:\.\d+)?|[A-Za-z]\w*|[-+*/^()]/g) ?? [];
  let at = 0;
  const atom = (): Ratio => {
    const token = tokens[at++];
    if (token === '-') return negRatio(power());
    if (token === '(') {
      const inner = sum();
      at += 1;
      return inner;
    }
    if (/^\d/.test(token)) return ratioFromRational(parseRational(token));
    return ratioOf(RESERVED.get(token) ?? symbol(token));
  };
  const power = (): Ratio => {
    const base = atom();
    if (tokens[at] !== '^') return base;
    at += 1;
    return powRatio(base, Number(tokens[at++]));
  };
  const product = (): Ratio => {
    let value = power();
    while (tokens[at] === '*' || tokens[at] === '/') {
      const divides = tokens[at++] === '/';
      value = divides ? divRatios(value, power()) : mulRatios(value, power());
    }
    return value;
  };
  const sum = (): Ratio => {
    let value = product();
    while (tokens[at] === '+' || tokens[at] === '-') {
      const negative = tokens[at++] === '-';
      const next = product();
      value = addRatios(value, negative ? negRatio(next) : next);
    }
    return value;
  };
  return sum();
}

/** The same for a polynomial with integer coefficients. */
export function readPolynomial(text: string): Polynomial {
  return read(text).num;
}
