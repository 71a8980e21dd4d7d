import { invariant } from '../base/index.ts';
import type { Budget } from '../base/index.ts';
import { unionOfGenerators } from './frame.ts';
import { gcdPolynomials } from './gcd.ts';
import { generatorDependsOn, generatorsWithin } from './generator.ts';
import { integerGcd } from './integer.ts';
import {
  addPolynomials,
  constantPolynomial,
  contentOf,
  equalPolynomials,
  generatorPolynomial,
  isConstantPolynomial,
  isOnePolynomial,
  isZeroPolynomial,
  leadingCoefficientSign,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  powPolynomial,
  scalePolynomial,
  zeroPolynomial,
} from './polynomial.ts';
import { quotientOf } from './quotient.ts';
import { rational, type Rational } from './rational.ts';
import { hasRelations, rationalise, reduceRelations } from './relation.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

function makeRatio(num: Polynomial, den: Polynomial): Ratio {
  return Object.freeze({ kind: 'ratio', num, den });
}

export const zeroRatio: Ratio = makeRatio(zeroPolynomial, onePolynomial);
export const oneRatio: Ratio = makeRatio(onePolynomial, onePolynomial);

/** The gcd over ℤ: integer contents included. */
function integralGcd(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  const content = integerGcd(contentOf(a), contentOf(b));
  return scalePolynomial(gcdPolynomials(a, b, budget), content);
}

/** num/den in lowest terms with the sign of `den` fixed; neither has a relation left to apply. */
function cancelled(num: Polynomial, den: Polynomial, budget?: Budget): Ratio {
  if (isZeroPolynomial(num)) return zeroRatio;
  const common = scalePolynomial(
    integralGcd(num, den, budget),
    BigInt(leadingCoefficientSign(den)),
  );
  if (isOnePolynomial(common)) return makeRatio(num, den);
  return makeRatio(quotientOf(num, common, budget), quotientOf(den, common, budget));
}

/**
 * The canonical rational function num/den: lowest terms, j² and square roots reduced, none of them in the
 * denominator. A denominator that is zero is our bug: callers test it with `isZeroRatio` first.
 */
export function ratio(num: Polynomial, den: Polynomial, budget?: Budget): Ratio {
  invariant(!isZeroPolynomial(den), 'a ratio with denominator zero');
  if (!hasRelations(num) && !hasRelations(den)) return cancelled(num, den, budget);
  const top = reduceRelations(num, budget);
  const bottom = reduceRelations(den, budget);
  invariant(!isZeroPolynomial(bottom.num), 'a ratio with denominator zero');
  const free = rationalise(
    {
      num: mulPolynomials(top.num, bottom.den, budget),
      den: mulPolynomials(bottom.num, top.den, budget),
    },
    budget,
  );
  return cancelled(free.num, free.den, budget);
}

export function ratioFromRational(r: Rational): Ratio {
  return makeRatio(constantPolynomial(r.n), constantPolynomial(r.d));
}

/** A polynomial as a ratio; relations are applied. */
export function ratioFromPolynomial(p: Polynomial): Ratio {
  return ratio(p, onePolynomial);
}

/** A generator as a ratio. */
export function ratioOf(g: Generator): Ratio {
  return makeRatio(generatorPolynomial(g), onePolynomial);
}

/** The sum, with gcds of the denominators only (P. Henrici, Journal of the ACM 3 (1956), 6–9). */
export function addRatios(a: Ratio, b: Ratio, budget?: Budget): Ratio {
  if (isZeroRatio(a)) return b;
  if (isZeroRatio(b)) return a;
  if (hasRelations(a.den) || hasRelations(b.den)) return addGenerally(a, b, budget);
  const common = equalPolynomials(a.den, b.den) ? a.den : integralGcd(a.den, b.den, budget);
  const left = quotientOf(a.den, common, budget);
  const right = quotientOf(b.den, common, budget);
  const num = addPolynomials(
    mulPolynomials(a.num, right, budget),
    mulPolynomials(b.num, left, budget),
  );
  if (isZeroPolynomial(num)) return zeroRatio;
  const excess = integralGcd(num, common, budget);
  const den = mulPolynomials(left, quotientOf(b.den, excess, budget), budget);
  return makeRatio(quotientOf(num, excess, budget), den);
}

function addGenerally(a: Ratio, b: Ratio, budget?: Budget): Ratio {
  const num = addPolynomials(
    mulPolynomials(a.num, b.den, budget),
    mulPolynomials(b.num, a.den, budget),
  );
  return ratio(num, mulPolynomials(a.den, b.den, budget), budget);
}

export function negRatio(a: Ratio): Ratio {
  return makeRatio(negPolynomial(a.num), a.den);
}

export function subRatios(a: Ratio, b: Ratio, budget?: Budget): Ratio {
  return addRatios(a, negRatio(b), budget);
}

/** Whether a product of the two is free of squares to reduce and of roots in a denominator. */
function multipliesFreely(a: Ratio, b: Ratio): boolean {
  if (hasRelations(a.den) || hasRelations(b.den)) return false;
  return !a.num.generators.some((g) => g.square && b.num.generators.includes(g));
}

/** The product; common factors are cancelled crosswise before anything is multiplied. */
export function mulRatios(a: Ratio, b: Ratio, budget?: Budget): Ratio {
  if (isZeroRatio(a) || isZeroRatio(b)) return zeroRatio;
  if (!multipliesFreely(a, b)) {
    return ratio(
      mulPolynomials(a.num, b.num, budget),
      mulPolynomials(a.den, b.den, budget),
      budget,
    );
  }
  const left = integralGcd(a.num, b.den, budget);
  const right = integralGcd(b.num, a.den, budget);
  const num = mulPolynomials(
    quotientOf(a.num, left, budget),
    quotientOf(b.num, right, budget),
    budget,
  );
  const den = mulPolynomials(
    quotientOf(a.den, right, budget),
    quotientOf(b.den, left, budget),
    budget,
  );
  return makeRatio(num, den);
}

/** 1/a; a zero `a` is our bug. */
export function inverseRatio(a: Ratio, budget?: Budget): Ratio {
  return ratio(a.den, a.num, budget);
}

/** a/b; a zero `b` is our bug: callers test it with `isZeroRatio` first. */
export function divRatios(a: Ratio, b: Ratio, budget?: Budget): Ratio {
  return mulRatios(a, inverseRatio(b, budget), budget);
}

/** a to an integer power; a negative power of zero is our bug. */
export function powRatio(a: Ratio, power: number, budget?: Budget): Ratio {
  invariant(Number.isInteger(power), `a ratio to the power ${power}`);
  if (power < 0) return powRatio(inverseRatio(a, budget), -power, budget);
  const num = powPolynomial(a.num, power, budget);
  const den = powPolynomial(a.den, power, budget);
  return hasRelations(num) || hasRelations(den) ? ratio(num, den, budget) : makeRatio(num, den);
}

/** The sum of many ratios, by halves. */
export function sumRatios(list: readonly Ratio[], budget?: Budget): Ratio {
  if (list.length === 0) return zeroRatio;
  if (list.length === 1) return list[0];
  const middle = list.length >> 1;
  return addRatios(
    sumRatios(list.slice(0, middle), budget),
    sumRatios(list.slice(middle), budget),
    budget,
  );
}

export function isZeroRatio(a: Ratio): boolean {
  return isZeroPolynomial(a.num);
}

export function isOneRatio(a: Ratio): boolean {
  return isOnePolynomial(a.num) && isOnePolynomial(a.den);
}

export function equalRatios(a: Ratio, b: Ratio): boolean {
  return a === b || (equalPolynomials(a.num, b.num) && equalPolynomials(a.den, b.den));
}

/** The rational number that a ratio is, or null if it contains any generator. */
export function asRational(a: Ratio): Rational | null {
  if (!isConstantPolynomial(a.num) || !isConstantPolynomial(a.den)) return null;
  return isZeroRatio(a) ? rational(0n) : rational(a.num.coefficients[0], a.den.coefficients[0]);
}

/** The generators that occur outside the arguments of functions, in canonical order. */
export function generatorsOfRatio(a: Ratio): readonly Generator[] {
  return unionOfGenerators(a.num.generators, a.den.generators);
}

/** All symbols that occur, those inside the arguments of functions included, in canonical order. */
export function symbolsOfRatio(a: Ratio): readonly Generator[] {
  return generatorsWithin(generatorsOfRatio(a)).filter((g) => g.kind === 'symbol');
}

/** Whether a generator occurs, be it inside the arguments of functions. */
export function dependsOn(a: Ratio, g: Generator): boolean {
  return generatorsOfRatio(a).some((other) => generatorDependsOn(other, g));
}
