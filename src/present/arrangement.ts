import {
  coefficientsIn,
  dependsOn,
  dependsOnLaplace,
  divRatios,
  generatorsOf,
  isOnePolynomial,
  isZeroPolynomial,
  laplace,
  mulRatios,
  negRatio,
  ratioFromRational,
  ratioOf,
  rational,
  termsOf,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../algebra/index.ts';
import { decimalOver, isDecimalOver, writeNumber } from './exact-number.ts';
import { inFactors, mainOf, withoutContent, type Factored } from './factored.ts';
import { withRootsBelow } from './roots-below.ts';
import {
  ZERO,
  fractionOf,
  productOf,
  raised,
  signed,
  sumOf,
  timesForms,
  type SignedTerm,
  type Written,
} from './written.ts';
import { textOf } from './written-text.ts';
import { compareFactors, type Layout } from './writing.ts';

/** Over smaller numbers fractions are read more easily than decimals: `3 b/(4 J)`. */
const SMALLEST_DIVISOR = 10n;

/**
 * The written form of a rational function: sign, then one fraction, each side in factors where that is shorter and
 * otherwise collected by descending powers of the main variable. Of the ways to write its numbers (whole, or in
 * decimals over a common divisor) the shortest is taken.
 */
export function arrangeRatio(r: Ratio, layout: Layout): Written {
  if (isZeroPolynomial(r.num)) return ZERO;
  const { num, den } = withRootsBelow(r);
  const whole = isOnePolynomial(den)
    ? polynomialForm(num, 1n, layout)
    : wholeForm(num, den, layout);
  const decimal = decimalForm(num, den, layout);
  return decimal === null ? whole : shorter(whole, decimal);
}

/** The written form of a polynomial: a sum, unless a product is shorter. */
export function arrangePolynomial(p: Polynomial, layout: Layout): Written {
  return isZeroPolynomial(p) ? ZERO : polynomialForm(p, 1n, layout);
}

/** The first form, unless the second is at most as long. */
function shorter(first: Written, second: Written): Written {
  return textOf(first).length < textOf(second).length ? first : second;
}

/** One fraction with whole numbers. */
function wholeForm(num: Polynomial, den: Polynomial, layout: Layout): Written {
  if (layout.shape === 'expanded') {
    return fractionWith(polynomialForm(num, 1n, layout), polynomialForm(den, 1n, layout));
  }
  const top = factorsOf(num, layout);
  const bottom = factorsOf(den, layout);
  const number = writeNumber(top.number, bottom.number);
  const above = productOf([number.num, ...factorForms(top, layout)]);
  const below = productOf([number.den, ...factorForms(bottom, layout)]);
  return signed(top.negative !== bottom.negative, fractionOf(above, below));
}

/**
 * Numerator and denominator over the leading number of the denominator, as `1/(s^2 + 1.2 s + 0.5)`; null if that is
 * small, or a number over it is no decimal.
 */
function decimalForm(num: Polynomial, den: Polynomial, layout: Layout): Written | null {
  const divisor = leadingNumber(den, layout);
  if (divisor === null || divisor < SMALLEST_DIVISOR) return null;
  const all = [...termsOf(num), ...termsOf(den)];
  if (!all.every(({ coefficient }) => isDecimalOver(coefficient, divisor))) return null;
  const above = polynomialForm(num, divisor, layout);
  return fractionWith(above, polynomialForm(den, divisor, layout));
}

/** A fraction with the sign of its numerator in front. */
function fractionWith(num: Written, den: Written): Written {
  if (den.kind === 'negative') return fractionWith(signed(true, num), den.of);
  if (num.kind !== 'negative') return fractionOf(num, den);
  return num.of.kind === 'negative'
    ? fractionWith(num.of.of, den)
    : signed(true, fractionOf(num.of, den));
}

function leadingNumber(p: Polynomial, layout: Layout): bigint | null {
  const main = mainOf(p, layout);
  const lead = main === null ? p : coefficientsIn(p, main).at(-1);
  const terms = lead === undefined ? [] : termsOf(lead);
  return terms.length === 1 ? terms[0].coefficient : null;
}

/** A polynomial over a divisor: a sum, unless a product is shorter. */
function polynomialForm(p: Polynomial, divisor: bigint, layout: Layout): Written {
  const sum = sumOf(termsIn(p, divisor, layout));
  if (layout.shape === 'expanded') return sum;
  const parts = factorsOf(p, layout);
  const product = signed(parts.negative, productForm(parts, divisor, layout));
  return layout.shape === 'factored' ? product : shorter(product, sum);
}

function productForm(parts: Factored, divisor: bigint, layout: Layout): Written {
  return productOf([numberForm(parts.number, divisor), ...factorForms(parts, layout)]);
}

function numberForm(number: bigint, divisor: bigint): Written {
  return divisor === 1n ? writeNumber(number, 1n).num : decimalOver(number, divisor);
}

/** The factors without the number: parameters, sums of parameters, s, sums in s, functions of s. */
function factorForms(parts: Factored, layout: Layout): Written[] {
  const generators = [...parts.monomial.keys()].sort((a, b) =>
    compareFactors(a, b, layout.writing),
  );
  const powers = generators.map((g) => ({
    rank: g === laplace ? 2 : dependsOnLaplace(g) ? 4 : 0,
    form: powerForm(g, parts.monomial.get(g) ?? 0, layout),
  }));
  const sums = parts.sums.map(({ polynomial, multiplicity }) => ({
    rank: generatorsOf(polynomial).some(dependsOnLaplace) ? 3 : 1,
    form: raised(sumOf(termsIn(polynomial, 1n, layout)), multiplicity),
  }));
  const bySize = sums.sort((a, b) => compareTexts(textOf(a.form), textOf(b.form)));
  return [...powers, ...bySize].sort((a, b) => a.rank - b.rank).map(({ form }) => form);
}

function compareTexts(a: string, b: string): number {
  return a.length - b.length || (a < b ? -1 : 1);
}

/** A generator to a power; a power of an exponential is that of the multiplied exponent, a dead time is `delay(Td)`. */
function powerForm(g: Generator, power: number, layout: Layout): Written {
  if (!g.args) return raised({ kind: 'name', name: g.name }, power);
  if (g.name !== 'exp') return raised(callForm(g.name, g.args, layout), power);
  const exponent = mulRatios(g.args[0], ratioFromRational(rational(power)));
  const deadTime = deadTimeIn(exponent);
  return deadTime ? callForm('delay', [deadTime], layout) : callForm('exp', [exponent], layout);
}

/** T where the exponent is -s T; null for any other. */
function deadTimeIn(exponent: Ratio): Ratio | null {
  if (!dependsOn(exponent, laplace)) return null;
  const time = negRatio(divRatios(exponent, ratioOf(laplace)));
  return dependsOn(time, laplace) ? null : time;
}

function callForm(name: string, args: readonly Ratio[], layout: Layout): Written {
  return { kind: 'call', name, args: args.map((arg) => arrangeRatio(arg, layout)) };
}

/** The factors of a polynomial, split where that is shorter (or asked for). */
function factorsOf(p: Polynomial, layout: Layout): Factored {
  const plain = withoutContent(p, layout);
  const split = layout.shape === 'expanded' ? null : inFactors(plain, layout);
  if (split === null) return plain;
  if (layout.shape === 'factored') return split;
  const length = (parts: Factored): number => textOf(productForm(parts, 1n, layout)).length;
  return length(split) < length(plain) ? split : plain;
}

/** The terms of a sum: collected by descending powers of the main variable; what has no dead time comes first. */
function termsIn(p: Polynomial, divisor: bigint, layout: Layout): SignedTerm[] {
  const main = mainOf(p, layout);
  if (main === null) return monomialTerms(p, divisor, layout);
  const powers = coefficientsIn(p, main).map((coefficient, power) => ({ coefficient, power }));
  const ordered = main === layout.main ? powers.reverse() : powers;
  return ordered
    .filter(({ coefficient }) => !isZeroPolynomial(coefficient))
    .flatMap(({ coefficient, power }) =>
      layout.shape === 'expanded'
        ? expandedTerms(coefficient, main, power, divisor, layout)
        : collectedTerms(coefficient, main, power, divisor, layout),
    );
}

function expandedTerms(
  coefficient: Polynomial,
  main: Generator,
  power: number,
  divisor: bigint,
  layout: Layout,
): SignedTerm[] {
  const flat = termsIn(coefficient, divisor, layout);
  if (power === 0) return flat;
  const factor = powerForm(main, power, layout);
  return flat.map((term) => ({ ...term, of: timesForms(term.of, [factor]) }));
}

function collectedTerms(
  coefficient: Polynomial,
  main: Generator,
  power: number,
  divisor: bigint,
  layout: Layout,
): SignedTerm[] {
  const parts = factorsOf(coefficient, layout);
  const { negative } = parts;
  if (power > 0) {
    const monomial = new Map([...parts.monomial, [main, power] as const]);
    return [{ negative, of: productForm({ ...parts, monomial }, divisor, layout) }];
  }
  const flat = termsIn(coefficient, divisor, layout);
  const folded = [{ negative, of: productForm(parts, divisor, layout) }];
  return textOf(sumOf(folded)).length < textOf(sumOf(flat)).length ? folded : flat;
}

/** Monomials in the worksheet's order of symbols, a positive one first if there is one. */
function monomialTerms(p: Polynomial, divisor: bigint, layout: Layout): SignedTerm[] {
  const generators = [...generatorsOf(p)].sort((a, b) => compareFactors(a, b, layout.writing));
  const terms = termsOf(p).map(({ coefficient, exponents }) => ({
    coefficient,
    exponents: generators.map((g) => exponents.get(g) ?? 0),
  }));
  terms.sort((a, b) => compareExponents(a.exponents, b.exponents));
  const leader = terms.findIndex(({ coefficient }) => coefficient > 0n);
  if (leader > 0) terms.unshift(...terms.splice(leader, 1));
  return terms.map(({ coefficient, exponents }) => {
    const negative = coefficient < 0n;
    const powers = generators.flatMap((g, i) =>
      exponents[i] === 0 ? [] : [powerForm(g, exponents[i], layout)],
    );
    return {
      negative,
      of: productOf([numberForm(negative ? -coefficient : coefficient, divisor), ...powers]),
    };
  });
}

function compareExponents(a: readonly number[], b: readonly number[]): number {
  const i = a.findIndex((exponent, k) => exponent !== b[k]);
  return i < 0 ? 0 : b[i] - a[i];
}
