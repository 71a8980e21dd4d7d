import {
  coefficientsIn,
  constantPolynomial,
  contentOf,
  degreeIn,
  dependsOnLaplace,
  divideExactly,
  factorPolynomial,
  generatorPolynomial,
  generatorsOf,
  isZeroPolynomial,
  laplace,
  mulPolynomials,
  negPolynomial,
  powPolynomial,
  termsOf,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../algebra/index.ts';
import { Budget, BudgetExceeded, invariant } from '../base/index.ts';
import { writeNumber } from './exact-number.ts';
import {
  ONE,
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

/**
 * A polynomial as sign · number · monomial · sums, the parts in which it is written. No sum has a common factor that
 * is a number or a monomial, and none begins with a minus where turning its sign avoids that.
 */
interface Factored {
  readonly negative: boolean;
  readonly number: bigint;
  readonly monomial: ReadonlyMap<Generator, number>;
  readonly sums: readonly { readonly polynomial: Polynomial; readonly multiplicity: number }[];
}

/** Larger polynomials, and searches dearer than this, are written without looking for factors. */
const MOST_TERMS_TO_FACTOR = 60;
const FACTOR_BUDGET = 300_000;

/**
 * The written form of a rational function: sign, then one fraction, each side in factors where that is shorter and
 * otherwise collected by descending powers of the main variable.
 */
export function arrangeRatio(r: Ratio, layout: Layout): Written {
  if (isZeroPolynomial(r.num)) return ZERO;
  if (isUnit(r.den)) return arrangePolynomial(r.num, layout);
  const top = factorsOf(r.num, layout);
  const bottom = factorsOf(r.den, layout);
  const number = writeNumber(top.number, bottom.number);
  const num = productOf([number.num, ...factorForms(top, layout)]);
  const den = productOf([number.den, ...factorForms(bottom, layout)]);
  return signed(top.negative !== bottom.negative, fractionOf(num, den));
}

/** The written form of a polynomial: a sum, unless a product is shorter. */
export function arrangePolynomial(p: Polynomial, layout: Layout): Written {
  const sum = sumOf(termsIn(p, layout));
  if (layout.shape === 'expanded') return sum;
  const parts = factorsOf(p, layout);
  const product = signed(parts.negative, productForm(parts, layout));
  if (layout.shape === 'factored') return product;
  return textOf(product).length < textOf(sum).length ? product : sum;
}

function isUnit(p: Polynomial): boolean {
  return generatorsOf(p).length === 0 && termsOf(p)[0].coefficient === 1n;
}

function productForm(parts: Factored, layout: Layout): Written {
  return productOf([writeNumber(parts.number, 1n).num, ...factorForms(parts, layout)]);
}

/** The factors without the number: parameters, sums of parameters, s, sums in s, functions of s. */
function factorForms(parts: Factored, layout: Layout): Written[] {
  const generators = [...parts.monomial.keys()].sort((a, b) =>
    compareFactors(a, b, layout.writing),
  );
  const powers = generators.map((g) => ({
    rank: g === laplace ? 2 : dependsOnLaplace(g) ? 4 : 0,
    form: raised(generatorForm(g, layout), parts.monomial.get(g) ?? 0),
  }));
  const sums = parts.sums.map(({ polynomial, multiplicity }) => ({
    rank: generatorsOf(polynomial).some(dependsOnLaplace) ? 3 : 1,
    form: raised(sumOf(termsIn(polynomial, layout)), multiplicity),
  }));
  const bySize = sums.sort((a, b) => compareTexts(textOf(a.form), textOf(b.form)));
  return [...powers, ...bySize].sort((a, b) => a.rank - b.rank).map(({ form }) => form);
}

function compareTexts(a: string, b: string): number {
  return a.length - b.length || (a < b ? -1 : 1);
}

function generatorForm(g: Generator, layout: Layout): Written {
  if (!g.args) return { kind: 'name', name: g.name };
  return { kind: 'call', name: g.name, args: g.args.map((arg) => arrangeRatio(arg, layout)) };
}

function factorsOf(p: Polynomial, layout: Layout): Factored {
  const { negative, number, monomial, rest } = pullContent(p, layout);
  if (rest === null) return { negative, number, monomial, sums: [] };
  const plain: Factored = {
    negative,
    number,
    monomial,
    sums: [{ polynomial: rest, multiplicity: 1 }],
  };
  const split = layout.shape === 'expanded' ? null : splitFactors(rest, layout);
  if (split === null) return plain;
  const whole = { ...plain, negative: negative !== split.negative, sums: split.sums };
  if (layout.shape === 'factored') return whole;
  return textOf(productForm(whole, layout)).length < textOf(productForm(plain, layout)).length
    ? whole
    : plain;
}

/** Takes the sign, the integer content and the common monomial out of a polynomial; the rest is null if it is 1. */
function pullContent(
  p: Polynomial,
  layout: Layout,
): Omit<Factored, 'sums'> & { readonly rest: Polynomial | null } {
  const terms = termsOf(p);
  const monomial = new Map<Generator, number>();
  for (const g of generatorsOf(p)) {
    const power = Math.min(...terms.map((term) => term.exponents.get(g) ?? 0));
    if (power > 0) monomial.set(g, power);
  }
  const number = contentOf(p);
  const rest = divideExactly(p, monomialPolynomial(number, monomial));
  invariant(rest, 'the content of a polynomial does not divide it');
  const negative = looksNegative(rest, layout);
  if (terms.length === 1) return { negative, number, monomial, rest: null };
  return { negative, number, monomial, rest: negative ? negPolynomial(rest) : rest };
}

function monomialPolynomial(number: bigint, monomial: ReadonlyMap<Generator, number>): Polynomial {
  return [...monomial].reduce(
    (product, [g, power]) => mulPolynomials(product, powPolynomial(generatorPolynomial(g), power)),
    constantPolynomial(number),
  );
}

/** Whether the coefficient that would stand first is negative in all its terms. */
function looksNegative(p: Polynomial, layout: Layout): boolean {
  const main = mainOf(p, layout);
  if (main === null) return termsOf(p).every(({ coefficient }) => coefficient < 0n);
  const coefficients = coefficientsIn(p, main);
  const first = main === layout.main ? coefficients.at(-1) : coefficients.find(isNotZero);
  return first !== undefined && looksNegative(first, layout);
}

function isNotZero(p: Polynomial): boolean {
  return !isZeroPolynomial(p);
}

/** The factors of a primitive polynomial, or null if it has only one or looking for them costs too much. */
function splitFactors(p: Polynomial, layout: Layout): Pick<Factored, 'negative' | 'sums'> | null {
  const found = findFactors(p);
  if (found === null || (found.factors.length === 1 && found.factors[0].multiplicity === 1)) {
    return null;
  }
  let negative = found.unit < 0n;
  const sums = found.factors.map(({ factor, multiplicity }) => {
    const turned = looksNegative(factor, layout);
    if (turned && multiplicity % 2 === 1) negative = !negative;
    return { polynomial: turned ? negPolynomial(factor) : factor, multiplicity };
  });
  return { negative, sums };
}

function findFactors(p: Polynomial): ReturnType<typeof factorPolynomial> | null {
  if (termsOf(p).length > MOST_TERMS_TO_FACTOR) return null;
  try {
    return factorPolynomial(p, new Budget(FACTOR_BUDGET));
  } catch (error) {
    if (error instanceof BudgetExceeded) return null;
    throw error;
  }
}

/** What a sum is collected by: a function of s if there is one (dead time), else the main variable, else nothing. */
function mainOf(p: Polynomial, layout: Layout): Generator | null {
  if (layout.shape === 'expanded') return degreeIn(p, layout.main) > 0 ? layout.main : null;
  const generators = generatorsOf(p);
  const dead = generators.find((g) => g.kind === 'function' && dependsOnLaplace(g));
  return dead ?? (generators.includes(layout.main) ? layout.main : null);
}

/** The terms of a sum: collected by descending powers of the main variable; what has no dead time comes first. */
function termsIn(p: Polynomial, layout: Layout): SignedTerm[] {
  const main = mainOf(p, layout);
  if (main === null) return monomialTerms(p, layout);
  const powers = coefficientsIn(p, main).map((coefficient, power) => ({ coefficient, power }));
  const ordered = main === layout.main ? powers.reverse() : powers;
  return ordered
    .filter(({ coefficient }) => isNotZero(coefficient))
    .flatMap(({ coefficient, power }) => coefficientTerms(coefficient, main, power, layout));
}

function coefficientTerms(
  coefficient: Polynomial,
  main: Generator,
  power: number,
  layout: Layout,
): SignedTerm[] {
  const flat = termsIn(coefficient, layout);
  if (layout.shape === 'expanded') return flat.map((term) => timesPower(term, main, power, layout));
  const parts = factorsOf(coefficient, layout);
  const folded = { negative: parts.negative, of: productForm(parts, layout) };
  if (power === 0) {
    return textOf(sumOf([folded])).length < textOf(sumOf(flat)).length ? [folded] : flat;
  }
  const monomial = new Map([...parts.monomial, [main, power] as const]);
  return [{ negative: parts.negative, of: productForm({ ...parts, monomial }, layout) }];
}

function timesPower(term: SignedTerm, g: Generator, power: number, layout: Layout): SignedTerm {
  if (power === 0) return term;
  return { ...term, of: timesForms(term.of, [raised(generatorForm(g, layout), power)]) };
}

/** Monomials in the worksheet's order of symbols, a positive one first if there is one. */
function monomialTerms(p: Polynomial, layout: Layout): SignedTerm[] {
  const generators = [...generatorsOf(p)].sort((a, b) => compareFactors(a, b, layout.writing));
  const terms = termsOf(p).map(({ coefficient, exponents }) => ({
    coefficient,
    exponents: generators.map((g) => exponents.get(g) ?? 0),
  }));
  terms.sort((a, b) => compareExponents(a.exponents, b.exponents));
  const leader = terms.findIndex(({ coefficient }) => coefficient > 0n);
  if (leader > 0) terms.unshift(...terms.splice(leader, 1));
  return terms.map(({ coefficient, exponents }) => ({
    negative: coefficient < 0n,
    of: productOf([
      coefficient === 1n || coefficient === -1n
        ? ONE
        : writeNumber(coefficient < 0n ? -coefficient : coefficient, 1n).num,
      ...generators.flatMap((g, i) =>
        exponents[i] === 0 ? [] : [raised(generatorForm(g, layout), exponents[i])],
      ),
    ]),
  }));
}

function compareExponents(a: readonly number[], b: readonly number[]): number {
  const i = a.findIndex((exponent, k) => exponent !== b[k]);
  return i < 0 ? 0 : b[i] - a[i];
}
