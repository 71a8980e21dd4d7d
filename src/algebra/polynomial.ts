import { invariant, spend } from '../base/index.ts';
import type { Budget } from '../base/index.ts';
import { frameForProduct, frameForSum, keysIn, placesIn, unionOfGenerators } from './frame.ts';
import type { Frame } from './frame.ts';
import { absolute, bitLength, integerGcd } from './integer.ts';
import { polynomialKey } from './key.ts';
import type { Generator, Polynomial } from './ring.ts';
import {
  mergeTerms,
  polynomialOfPacked,
  polynomialOfTerms,
  polynomialOfUnsortedTerms,
  type PackedTerms,
} from './terms.ts';
import { addWide, multiplyWide, wideWork } from './wide-terms.ts';

const noExponents = new Int32Array(0);

export const zeroPolynomial: Polynomial = polynomialOfTerms([], noExponents, []);
export const onePolynomial: Polynomial = polynomialOfTerms([], noExponents, [1n]);

/** The integer as a polynomial. */
export function constantPolynomial(value: bigint): Polynomial {
  if (value === 0n) return zeroPolynomial;
  return value === 1n ? onePolynomial : polynomialOfTerms([], noExponents, [value]);
}

const generatorPolynomials = new WeakMap<Generator, Polynomial>();

/** A generator as a polynomial. */
export function generatorPolynomial(g: Generator): Polynomial {
  const known = generatorPolynomials.get(g);
  if (known) return known;
  const p = polynomialOfTerms([g], new Int32Array([1]), [1n]);
  generatorPolynomials.set(g, p);
  return p;
}

/** g to a power k ≥ 0. */
export function generatorPower(g: Generator, k: number): Polynomial {
  return k === 0 ? onePolynomial : polynomialOfTerms([g], new Int32Array([k]), [1n]);
}

export function isZeroPolynomial(p: Polynomial): boolean {
  return p.coefficients.length === 0;
}

export function isConstantPolynomial(p: Polynomial): boolean {
  return p.generators.length === 0;
}

export function isOnePolynomial(p: Polynomial): boolean {
  return p.generators.length === 0 && p.coefficients[0] === 1n;
}

/** The integer that a constant polynomial is. */
export function constantValue(p: Polynomial): bigint {
  invariant(isConstantPolynomial(p), 'the value of a polynomial that is not constant');
  return p.coefficients[0] ?? 0n;
}

export function equalPolynomials(a: Polynomial, b: Polynomial): boolean {
  return (
    a === b ||
    (a.coefficients.length === b.coefficients.length &&
      a.generators.length === b.generators.length &&
      a.generators.every((g, k) => g === b.generators[k]) &&
      a.coefficients.every((coefficient, i) => coefficient === b.coefficients[i]) &&
      a.exponents.every((exponent, i) => exponent === b.exponents[i]))
  );
}

/** The generators that occur, in canonical order. */
export function generatorsOf(p: Polynomial): readonly Generator[] {
  return p.generators;
}

/** The degree in a generator: 0 where it does not occur, −1 for the zero polynomial. */
export function degreeIn(p: Polynomial, g: Generator): number {
  if (isZeroPolynomial(p)) return -1;
  const place = p.generators.indexOf(g);
  return place < 0 ? 0 : p.degrees[place];
}

/** The largest sum of exponents of a term; −1 for the zero polynomial. */
export function totalDegree(p: Polynomial): number {
  return termsOf(p).reduce(
    (largest, term) =>
      Math.max(
        largest,
        [...term.exponents.values()].reduce((a, b) => a + b, 0),
      ),
    -1,
  );
}

/** The number of terms. */
export function termCount(p: Polynomial): number {
  return p.coefficients.length;
}

export interface Term {
  readonly coefficient: bigint;
  /** The positive exponents, in canonical order of the generators. */
  readonly exponents: ReadonlyMap<Generator, number>;
}

/** The terms in canonical order: descending lexicographic, s first. */
export function termsOf(p: Polynomial): readonly Term[] {
  const width = p.generators.length;
  return p.coefficients.map((coefficient, i) => {
    const exponents = new Map<Generator, number>();
    p.generators.forEach((g, k) => {
      const exponent = p.exponents[i * width + k];
      if (exponent > 0) exponents.set(g, exponent);
    });
    return { coefficient, exponents };
  });
}

/** The polynomial of any list of terms, repeated monomials and zeros included. */
export function polynomialOfTermList(terms: readonly Term[]): Polynomial {
  return sumPolynomials(
    terms.map(({ coefficient, exponents }) => {
      const generators = [...exponents.keys()];
      const row = new Int32Array(exponents.values());
      if (coefficient === 0n) return zeroPolynomial;
      return [...generators.keys()].reduce(
        (product, k) => mulPolynomials(product, generatorPower(generators[k], row[k])),
        constantPolynomial(coefficient),
      );
    }),
  );
}

function mapCoefficients(p: Polynomial, change: (coefficient: bigint) => bigint): Polynomial {
  return Object.freeze({ ...p, coefficients: p.coefficients.map(change) });
}

/** p with every coefficient changed; terms whose coefficient becomes 0 are dropped. */
export function mapTerms(p: Polynomial, change: (coefficient: bigint) => bigint): Polynomial {
  const mapped = mapCoefficients(p, change);
  if (!mapped.coefficients.includes(0n)) return mapped;
  const width = p.generators.length;
  const kept = [...mapped.coefficients.keys()].filter((i) => mapped.coefficients[i] !== 0n);
  const exponents = new Int32Array(kept.length * width);
  kept.forEach((i, to) =>
    exponents.set(p.exponents.subarray(i * width, (i + 1) * width), to * width),
  );
  return polynomialOfTerms(
    p.generators,
    exponents,
    kept.map((i) => mapped.coefficients[i]),
  );
}

export function negPolynomial(p: Polynomial): Polynomial {
  return mapCoefficients(p, (coefficient) => -coefficient);
}

/** p times an integer. */
export function scalePolynomial(p: Polynomial, factor: bigint): Polynomial {
  if (factor === 1n) return p;
  return factor === 0n ? zeroPolynomial : mapCoefficients(p, (coefficient) => coefficient * factor);
}

/** p divided by an integer that divides every coefficient. */
export function unscalePolynomial(p: Polynomial, divisor: bigint): Polynomial {
  return divisor === 1n ? p : mapCoefficients(p, (coefficient) => coefficient / divisor);
}

function packed(p: Polynomial, frame: Frame): PackedTerms {
  return { keys: keysIn(p, frame), coefficients: p.coefficients };
}

function combine(a: Polynomial, b: Polynomial, sign: 1 | -1): Polynomial {
  const frame = frameForSum(a, b);
  if (!frame) return addWide(a, b, sign > 0 ? 1n : -1n);
  return polynomialOfPacked(mergeTerms(packed(a, frame), packed(b, frame), sign), frame);
}

export function addPolynomials(a: Polynomial, b: Polynomial): Polynomial {
  if (isZeroPolynomial(a)) return b;
  return isZeroPolynomial(b) ? a : combine(a, b, 1);
}

export function subPolynomials(a: Polynomial, b: Polynomial): Polynomial {
  if (isZeroPolynomial(b)) return a;
  return isZeroPolynomial(a) ? negPolynomial(b) : combine(a, b, -1);
}

/** The sum of many polynomials, by halves so that long sums are not merged term by term. */
export function sumPolynomials(list: readonly Polynomial[]): Polynomial {
  if (list.length === 0) return zeroPolynomial;
  if (list.length === 1) return list[0];
  const middle = list.length >> 1;
  return addPolynomials(sumPolynomials(list.slice(0, middle)), sumPolynomials(list.slice(middle)));
}

function productOfTerm(key: number, coefficient: bigint, b: PackedTerms): PackedTerms {
  const keys = Float64Array.from(b.keys, (other) => other + key);
  return { keys, coefficients: b.coefficients.map((other) => other * coefficient) };
}

function productOfRows(a: PackedTerms, from: number, to: number, b: PackedTerms): PackedTerms {
  if (to - from === 1) return productOfTerm(a.keys[from], a.coefficients[from], b);
  const middle = (from + to) >> 1;
  return mergeTerms(productOfRows(a, from, middle, b), productOfRows(a, middle, to, b));
}

/** About the bits of p's coefficients, from three of them; numbers of one machine word count as none. */
function coefficientBits(p: Polynomial): number {
  const { coefficients } = p;
  const sample = [0, coefficients.length >> 1, coefficients.length - 1].map((i) => coefficients[i]);
  return sample.reduce((most, c) => Math.max(most, isWord(c) ? 0 : bitLength(c)), 0);
}

const WORD = 1n << 62n;

function isWord(c: bigint): boolean {
  return c < WORD && c > -WORD;
}

/** The work of finding the content of p: Euclid's algorithm goes with the square of the bits. */
export function contentWork(p: Polynomial): number {
  const isTerm = p.coefficients.length === 1;
  return Math.ceil(p.exponents.length / 8 + (isTerm ? 0 : coefficientBits(p) ** 2 / 2 ** 11));
}

/** The work of one product of coefficients of a and b: 1 for short ones, for long ones by their lengths. */
export function coefficientWork(a: Polynomial, b: Polynomial): number {
  return 1 + Math.ceil((coefficientBits(a) * coefficientBits(b)) / 2 ** 20);
}

/** The product; cost: terms of a times terms of b, and a logarithm for sorting. */
export function mulPolynomials(a: Polynomial, b: Polynomial, budget?: Budget): Polynomial {
  if (isZeroPolynomial(a) || isZeroPolynomial(b)) return zeroPolynomial;
  if (isConstantPolynomial(a)) return scalePolynomial(b, a.coefficients[0]);
  if (isConstantPolynomial(b)) return scalePolynomial(a, b.coefficients[0]);
  const pairs = termCount(a) * termCount(b);
  const frame = frameForProduct(a, b);
  const work = pairs * coefficientWork(a, b) * (frame ? 1 : wideWork(a));
  spend(budget, work, 'the product of two polynomials', () => `${pairs} terms`);
  if (!frame) return multiplyWide(a, b);
  const [short, long] = termCount(a) < termCount(b) ? [a, b] : [b, a];
  const terms = productOfRows(packed(short, frame), 0, termCount(short), packed(long, frame));
  return polynomialOfPacked(terms, frame);
}

/** p to an integer power k ≥ 0, by repeated squaring. */
export function powPolynomial(p: Polynomial, k: number, budget?: Budget): Polynomial {
  invariant(Number.isInteger(k) && k >= 0, `a polynomial to the power ${k}`);
  let result = onePolynomial;
  let square = p;
  for (let rest = k; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) result = mulPolynomials(result, square, budget);
    if (rest > 1) square = mulPolynomials(square, square, budget);
  }
  return result;
}

/** The product of many polynomials. */
export function productOfPolynomials(list: readonly Polynomial[], budget?: Budget): Polynomial {
  return list.reduce((product, p) => mulPolynomials(product, p, budget), onePolynomial);
}

/** The terms of p with one power in a column, that column left out; `count` of them. */
function termsWithPower(p: Polynomial, column: number, power: number, count: number): Polynomial {
  const width = p.generators.length;
  const rows = new Int32Array(count * (width - 1));
  const coefficients: bigint[] = [];
  for (let i = 0, start = 0, to = 0; coefficients.length < count; i += 1, start += width) {
    if (p.exponents[start + column] !== power) continue;
    for (let k = 0; k < width; k += 1) if (k !== column) rows[to++] = p.exponents[start + k];
    coefficients.push(p.coefficients[i]);
  }
  const others = p.generators.filter((_, k) => k !== column);
  return polynomialOfTerms(others, rows, coefficients);
}

/** How many terms have each power of a column. */
function powerCounts(p: Polynomial, column: number): Int32Array {
  const counts = new Int32Array(p.degrees[column] + 1);
  const width = p.generators.length;
  for (let at = column; at < p.exponents.length; at += width) counts[p.exponents[at]] += 1;
  return counts;
}

/** The coefficients of ascending powers of g, degree + 1 of them; none for the zero polynomial. */
export function coefficientsIn(p: Polynomial, g: Generator): readonly Polynomial[] {
  const column = p.generators.indexOf(g);
  if (column < 0) return isZeroPolynomial(p) ? [] : [p];
  return Array.from(powerCounts(p, column), (count, power) =>
    count === 0 ? zeroPolynomial : termsWithPower(p, column, power, count),
  );
}

/** The coefficient of the highest power of g. */
export function leadingCoefficientIn(p: Polynomial, g: Generator): Polynomial {
  const column = p.generators.indexOf(g);
  if (column < 0) return p;
  return termsWithPower(p, column, p.degrees[column], leadingTermCount(p, g));
}

/** The number of terms of the coefficient of the highest power of g. */
export function leadingTermCount(p: Polynomial, g: Generator): number {
  const column = p.generators.indexOf(g);
  return column < 0 ? termCount(p) : powerCounts(p, column)[p.degrees[column]];
}

/** Σ coefs[k] g^k; the coefficients do not contain g. */
export function polynomialFromCoefficients(coefs: readonly Polynomial[], g: Generator): Polynomial {
  const generators = coefs.reduce(
    (union, c) => unionOfGenerators(union, c.generators),
    unionOfGenerators([g], []),
  );
  const column = generators.indexOf(g);
  const rows: number[] = [];
  const coefficients: bigint[] = [];
  for (let power = coefs.length - 1; power >= 0; power -= 1) {
    appendTerms(rows, coefs[power], generators, column, power);
    coefficients.push(...coefs[power].coefficients);
  }
  const build = column === 0 ? polynomialOfTerms : polynomialOfUnsortedTerms;
  return build(generators, Int32Array.from(rows), coefficients);
}

function appendTerms(
  rows: number[],
  p: Polynomial,
  generators: readonly Generator[],
  column: number,
  power: number,
): void {
  const places = placesIn(p.generators, generators);
  invariant(!places.includes(column), 'a coefficient that contains the main variable');
  const width = places.length;
  for (let i = 0; i < p.coefficients.length; i += 1) {
    const start = rows.length;
    for (let k = 0; k < generators.length; k += 1) rows.push(0);
    rows[start + column] = power;
    for (let k = 0; k < width; k += 1) rows[start + places[k]] = p.exponents[i * width + k];
  }
}

/** The partial derivative with respect to a generator, all generators taken as independent. */
export function derivativePolynomial(p: Polynomial, g: Generator): Polynomial {
  const slopes = coefficientsIn(p, g)
    .slice(1)
    .map((coefficient, k) => scalePolynomial(coefficient, BigInt(k + 1)));
  return polynomialFromCoefficients(slopes, g);
}

/** The greatest common divisor of the coefficients, never negative; 0 for the zero polynomial. */
export function contentOf(p: Polynomial): bigint {
  let content = 0n;
  for (const coefficient of p.coefficients) {
    content = integerGcd(content, coefficient);
    if (content === 1n) return 1n;
  }
  return absolute(content);
}

/** p divided by its content, so that p = contentOf(p) · primitivePart(p); zero stays zero. */
export function primitivePart(p: Polynomial): Polynomial {
  return isZeroPolynomial(p) ? p : unscalePolynomial(p, contentOf(p));
}

/** The sign of the first term's coefficient in the canonical order; 0 for zero. */
export function leadingCoefficientSign(p: Polynomial): -1 | 0 | 1 {
  if (isZeroPolynomial(p)) return 0;
  return p.coefficients[0] < 0n ? -1 : 1;
}

/** The primitive part with a positive leading coefficient. */
export function normalPart(p: Polynomial): Polynomial {
  const primitive = primitivePart(p);
  return leadingCoefficientSign(primitive) < 0 ? negPolynomial(primitive) : primitive;
}

/** An order of polynomials that does not depend on how they were found: fewer terms first, then by key. */
export function comparePolynomials(a: Polynomial, b: Polynomial): number {
  const difference = termCount(a) - termCount(b);
  if (difference !== 0) return difference;
  const left = polynomialKey(a);
  const right = polynomialKey(b);
  return left < right ? -1 : left > right ? 1 : 0;
}
