import { isRefusal, type Budget } from '../base/index.ts';
import { substituteRatio } from './evaluation.ts';
import { factorPolynomial } from './factor.ts';
import { applyFunction } from './function-value.ts';
import { functionOf, imaginary, laplace, generatorsWithin } from './generator.ts';
import { absolute } from './integer.ts';
import {
  constantPolynomial,
  isConstantPolynomial,
  mulPolynomials,
  negPolynomial,
  polynomialOfTermList,
  termsOf,
} from './polynomial.ts';
import { rational } from './rational.ts';
import {
  addRatios,
  asRational,
  divRatios,
  generatorsOfRatio,
  mulRatios,
  oneRatio,
  powRatio,
  ratio,
  ratioFromPolynomial,
  ratioFromRational,
  ratioOf,
  subRatios,
  zeroRatio,
} from './ratio.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';
import { signOfPolynomial, signOfRatio, type Sign, type SignOf } from './sign.ts';

const isAtLeastZero = (sign: Sign): boolean =>
  sign === 'positive' || sign === 'nonnegative' || sign === 'zero';
const isAtMostZero = (sign: Sign): boolean => sign === 'negative' || sign === 'nonpositive';

/** Whether a ratio is real wherever it has a value: without s and j, its roots and logarithms of what allows them. */
function isSurelyReal(r: Ratio, signOf: SignOf): boolean {
  return generatorsWithin(generatorsOfRatio(r)).every((g) => {
    if (g === laplace || g === imaginary) return false;
    if (g.name === 'sqrt' && g.args) return isAtLeastZero(signOfRatio(g.args[0], signOf));
    if (g.name === 'log' && g.args) return signOfRatio(g.args[0], signOf) === 'positive';
    return true;
  });
}

/** What is known of the size of an irreducible factor: itself, its negative, or the root of its square. */
function magnitudeOf(factor: Polynomial, signOf: SignOf, budget?: Budget): Ratio {
  const sign = signOfPolynomial(factor, signOf, budget);
  if (isAtLeastZero(sign)) return ratioFromPolynomial(factor);
  if (isAtMostZero(sign)) return ratioFromPolynomial(negPolynomial(factor));
  return rootKernel(mulPolynomials(factor, factor, budget));
}

function rootKernel(p: Polynomial): Ratio {
  return ratioOf(functionOf('sqrt', [ratioFromPolynomial(p)]));
}

/** |p|, factor by factor. */
function magnitude(p: Polynomial, signOf: SignOf, budget?: Budget): Ratio {
  const { unit, factors } = factorPolynomial(p, budget);
  return factors.reduce(
    (product, { factor, multiplicity }) =>
      mulRatios(product, powRatio(magnitudeOf(factor, signOf, budget), multiplicity), budget),
    ratioFromRational(rational(absolute(unit))),
  );
}

/**
 * √p with every square drawn out as a magnitude, and a root of its own for every factor whose sign is known: for real
 * x ≥ 0 is √(x y) = √x √y, whatever y is. What is left stays under one root.
 */
function rootOfPolynomial(p: Polynomial, signOf: SignOf, budget?: Budget): Ratio {
  const { unit, factors } = factorPolynomial(p, budget);
  let outside = oneRatio;
  let inside = constantPolynomial(unit < 0n ? -1n : 1n);
  for (const { factor, multiplicity } of factors) {
    const size = powRatio(magnitudeOf(factor, signOf, budget), multiplicity >> 1, budget);
    outside = mulRatios(outside, size, budget);
    if (multiplicity % 2 === 0) continue;
    const sign = signOfPolynomial(factor, signOf, budget);
    if (isAtLeastZero(sign)) outside = mulRatios(outside, rootKernel(factor), budget);
    else if (isAtMostZero(sign)) {
      outside = mulRatios(outside, rootKernel(negPolynomial(factor)), budget);
      inside = negPolynomial(inside);
    } else inside = mulPolynomials(inside, factor, budget);
  }
  const number = rootOf(ratioFromRational(rational(absolute(unit))));
  const rest = isConstantPolynomial(inside)
    ? rootOf(ratioFromPolynomial(inside))
    : rootKernel(inside);
  return mulRatios(mulRatios(outside, number, budget), rest, budget);
}

function rootOf(r: Ratio): Ratio {
  const root = applyFunction('sqrt', [r]);
  return isRefusal(root) ? ratioOf(functionOf('sqrt', [r])) : root;
}

/** √(n/d) = √(n d)/|d|. */
function rootOfRatio(r: Ratio, signOf: SignOf, budget?: Budget): Ratio {
  const denested = denestedRoot(r);
  if (denested) return denested;
  if (asRational(r) || !isSurelyReal(r, signOf)) return rootOf(r);
  const product = mulPolynomials(r.num, r.den, budget);
  return divRatios(
    rootOfPolynomial(product, signOf, budget),
    magnitude(r.den, signOf, budget),
    budget,
  );
}

/**
 * √(a + c) = √((a + q)/2) ± √((a − q)/2) for a rational a > 0 and a root c (a number, its square rational) where
 * q = √(a² − c²) is rational; null where it is not. The sign is that of the number before the root.
 */
function denestedRoot(r: Ratio): Ratio | null {
  const terms = termsOf(r.num);
  if (terms.length !== 2 || terms[1].exponents.size > 0) return null;
  const [c, a] = terms.map((term) => ratio(polynomialOfTermList([term]), r.den));
  const [square, whole] = [asRational(powRatio(c, 2)), asRational(a)];
  if (!square || square.n <= 0n || !whole || whole.n <= 0n) return null;
  const q = rootOf(subRatios(powRatio(a, 2), powRatio(c, 2)));
  if (!asRational(q)) return null;
  const half = ratioFromRational(rational(1n, 2n));
  const larger = rootOf(mulRatios(addRatios(a, q), half));
  const smaller = rootOf(mulRatios(subRatios(a, q), half));
  return terms[0].coefficient > 0n ? addRatios(larger, smaller) : subRatios(larger, smaller);
}

/** The prime factors below this bound are taken out of the logarithm of a number. */
const TRIAL_LIMIT = 1000n;

function logOfInteger(value: bigint): Ratio {
  let sum = zeroRatio;
  let rest = value;
  const log = (n: bigint): Ratio => ratioOf(functionOf('log', [ratioFromRational(rational(n))]));
  for (let prime = 2n; prime < TRIAL_LIMIT && rest > 1n; prime += 1n) {
    for (; rest % prime === 0n; rest /= prime) sum = addRatios(sum, log(prime));
  }
  return rest === 1n ? sum : addRatios(sum, log(rest));
}

/** The logarithm of a polynomial whose factors are all positive, as a sum; null for others. */
function logOfPolynomial(p: Polynomial, signOf: SignOf, budget?: Budget): Ratio | null {
  const { unit, factors } = factorPolynomial(p, budget);
  if (unit < 0n) return null;
  let sum = logOfInteger(unit);
  for (const { factor, multiplicity } of factors) {
    if (signOfPolynomial(factor, signOf, budget) !== 'positive') return null;
    const log = logOfFactor(factor);
    sum = addRatios(sum, mulRatios(ratioFromRational(rational(multiplicity)), log));
  }
  return sum;
}

/** log exp(x) = x, log √x = (log x)/2. */
function logOfFactor(factor: Polynomial): Ratio {
  const [g] = factor.generators;
  const [argument] = g.args ?? [];
  const isAlone = factor.coefficients.length === 1 && factor.degrees[0] === 1;
  if (isAlone && argument && g.name === 'exp') return argument;
  if (isAlone && argument && g.name === 'sqrt') {
    const half = ratioFromRational(rational(1n, 2n));
    return mulRatios(half, ratioOf(functionOf('log', [argument])));
  }
  return ratioOf(functionOf('log', [ratioFromPolynomial(factor)]));
}

function logOfRatio(r: Ratio, signOf: SignOf, budget?: Budget): Ratio | null {
  if (!isSurelyReal(r, signOf)) return null;
  const [num, den] = [r.num, r.den].map((p) => logOfPolynomial(p, signOf, budget));
  return num && den && subRatios(num, den);
}

function related(name: string, args: readonly Ratio[], signOf: SignOf, budget?: Budget): Ratio {
  const [first] = args;
  if (name === 'sqrt') return rootOfRatio(first, signOf, budget);
  if (name === 'log') {
    const sum = logOfRatio(first, signOf, budget);
    if (sum) return sum;
  }
  if (name === 'abs' && isSurelyReal(first, signOf)) {
    const [num, den] = [first.num, first.den].map((p) => magnitude(p, signOf, budget));
    return divRatios(num, den, budget);
  }
  if (name === 'tan') {
    const [sine, cosine] = ['sin', 'cos'].map((f) => applyFunction(f, [first]));
    if (!isRefusal(sine) && !isRefusal(cosine)) return divRatios(sine, cosine, budget);
  }
  const value = applyFunction(name, args, budget);
  return isRefusal(value) ? ratioOf(functionOf(name, args)) : value;
}

/**
 * The ratio with its roots, magnitudes and logarithms taken apart as far as the signs allow (√(a² b) = a √b for a > 0,
 * log(a b) = log a + log b), and tan as sin/cos. Equal to it wherever both have a value.
 */
export function withRootsApart(r: Ratio, signOf: SignOf, budget?: Budget): Ratio {
  const values = new Map<Generator, Ratio>();
  for (const g of generatorsOfRatio(r)) {
    if (!g.args || g.name === 'nominal') continue;
    const args = g.args.map((argument) => withRootsApart(argument, signOf, budget));
    values.set(g, related(g.name, args, signOf, budget));
  }
  const changed = substituteRatio(r, values, budget);
  return isRefusal(changed) ? r : changed;
}
