import { isRefusal, refuse, type Budget, type Refusal } from '../base/index.ts';
import { placesIn } from './frame.ts';
import { functionOf, generatorDependsOn } from './generator.ts';
import { applyFunction } from './function-value.ts';
import {
  constantValue,
  isConstantPolynomial,
  mulPolynomials,
  onePolynomial,
  productOfPolynomials,
  scalePolynomial,
  sumPolynomials,
} from './polynomial.ts';
import { divRational, isZeroRational, rational, type Rational } from './rational.ts';
import { divRatios, generatorsOfRatio, isZeroRatio, ratio, ratioOf } from './ratio.ts';
import type { Quotient } from './relation.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';
import { polynomialOfTerms } from './terms.ts';

/** A polynomial's coefficient of one monomial in the generators that are being replaced. */
interface Part {
  readonly powers: readonly number[];
  readonly coefficient: Polynomial;
}

function partsOver(p: Polynomial, replaced: readonly Generator[]): readonly Part[] {
  const width = p.generators.length;
  const columns = placesIn(replaced, p.generators);
  const kept = [...p.generators.keys()].filter((k) => !columns.includes(k));
  const groups = new Map<string, { powers: number[]; rows: number[]; coefficients: bigint[] }>();
  p.coefficients.forEach((coefficient, i) => {
    const row = p.exponents.subarray(i * width, (i + 1) * width);
    const powers = columns.map((k) => row[k]);
    const key = powers.join(' ');
    const group = groups.get(key) ?? { powers, rows: [], coefficients: [] };
    groups.set(key, group);
    for (const k of kept) group.rows.push(row[k]);
    group.coefficients.push(coefficient);
  });
  const others = kept.map((k) => p.generators[k]);
  // Within a group the replaced columns are equal, so that the rest of the rows is still in order.
  return [...groups.values()].map(({ powers, rows, coefficients }) => ({
    powers,
    coefficient: polynomialOfTerms(others, Int32Array.from(rows), coefficients),
  }));
}

function powersOf(p: Polynomial, highest: number, budget?: Budget): readonly Polynomial[] {
  const powers = [onePolynomial];
  while (powers.length <= highest)
    powers.push(mulPolynomials(powers[powers.length - 1], p, budget));
  return powers;
}

/** The product, its integer factors first: a replacement by numbers is one multiplication. */
function productOfFactors(factors: readonly Polynomial[], budget?: Budget): Polynomial {
  const numbers = factors.filter(isConstantPolynomial);
  const scale = numbers.reduce((product, p) => product * constantValue(p), 1n);
  const others = factors.filter((p) => !isConstantPolynomial(p));
  return scalePolynomial(productOfPolynomials(others, budget), scale);
}

/** p with generators replaced, all at once, over the product of the denominators: not in lowest terms. */
function replaceIn(
  p: Polynomial,
  values: ReadonlyMap<Generator, Ratio>,
  budget?: Budget,
): Quotient {
  const replaced = p.generators.filter((g) => values.has(g));
  if (replaced.length === 0) return { num: p, den: onePolynomial };
  const degrees = replaced.map((g) => p.degrees[p.generators.indexOf(g)]);
  const value = (k: number): Ratio => values.get(replaced[k]) as Ratio;
  const nums = degrees.map((degree, k) => powersOf(value(k).num, degree, budget));
  const dens = degrees.map((degree, k) => powersOf(value(k).den, degree, budget));
  const terms = partsOver(p, replaced).map(({ powers, coefficient }) =>
    productOfFactors(
      [
        coefficient,
        ...powers.map((power, k) => nums[k][power]),
        ...powers.map((power, k) => dens[k][degrees[k] - power]),
      ],
      budget,
    ),
  );
  const den = productOfPolynomials(
    degrees.map((degree, k) => dens[k][degree]),
    budget,
  );
  return { num: sumPolynomials(terms), den };
}

/**
 * p with generators replaced by ratios, all at once. Only generators that stand in the polynomial itself are
 * replaced, not those inside functions; see `substituteRatio`.
 */
export function substitutePolynomial(
  p: Polynomial,
  values: ReadonlyMap<Generator, Ratio>,
  budget?: Budget,
): Ratio {
  const { num, den } = replaceIn(p, values, budget);
  return ratio(num, den, budget);
}

/**
 * r with generators replaced by ratios, all at once and inside the arguments of functions too. Refused
 * (`division-by-zero`) where a denominator vanishes, or a function has no value there (`undefined`).
 */
export function substituteRatio(
  r: Ratio,
  values: ReadonlyMap<Generator, Ratio>,
  budget?: Budget,
): Ratio | Refusal {
  const all = withFunctions(r, values, budget);
  if (isRefusal(all)) return all;
  if (!generatorsOfRatio(r).some((g) => all.has(g))) return r;
  const den = substitutePolynomial(r.den, all, budget);
  if (isZeroRatio(den)) return refuse('division-by-zero', 'the denominator becomes zero');
  return divRatios(substitutePolynomial(r.num, all, budget), den, budget);
}

/** The replacements, with those of the functions in r whose arguments change. */
function withFunctions(
  r: Ratio,
  values: ReadonlyMap<Generator, Ratio>,
  budget?: Budget,
): ReadonlyMap<Generator, Ratio> | Refusal {
  const all = new Map(values);
  const replaced = [...values.keys()];
  for (const g of generatorsOfRatio(r)) {
    if (!g.args || all.has(g) || !replaced.some((other) => generatorDependsOn(g, other))) continue;
    const free = g.binds ? new Map([...values].filter(([other]) => other !== g.binds)) : values;
    const args: Ratio[] = [];
    for (const argument of g.args) {
      const changed = substituteRatio(argument, free, budget);
      if (isRefusal(changed)) return changed;
      args.push(changed);
    }
    const value = g.binds
      ? ratioOf(functionOf(g.name, args, g.binds))
      : applyFunction(g.name, args, budget);
    if (isRefusal(value)) return value;
    all.set(g, value);
  }
  return all;
}

/** The value of p where each generator has a rational value. */
export function evaluatePolynomial(p: Polynomial, valueOf: (g: Generator) => Rational): Rational {
  const values = p.generators.map(valueOf);
  const nums = values.map(({ n }, k) => integerPowers(n, p.degrees[k]));
  const dens = values.map(({ d }, k) => integerPowers(d, p.degrees[k]));
  const width = values.length;
  let sum = 0n;
  p.coefficients.forEach((coefficient, i) => {
    let term = coefficient;
    for (let k = 0; k < width; k += 1) {
      const exponent = p.exponents[i * width + k];
      term *= nums[k][exponent] * dens[k][p.degrees[k] - exponent];
    }
    sum += term;
  });
  return rational(
    sum,
    dens.reduce((product, powers, k) => product * powers[p.degrees[k]], 1n),
  );
}

function integerPowers(base: bigint, highest: number): bigint[] {
  const powers = [1n];
  while (powers.length <= highest) powers.push(powers[powers.length - 1] * base);
  return powers;
}

/**
 * The value of r where each generator has a rational value; `valueOf` is asked for functions too. Refused
 * (`division-by-zero`) where the denominator vanishes.
 */
export function evaluateRatio(r: Ratio, valueOf: (g: Generator) => Rational): Rational | Refusal {
  const den = evaluatePolynomial(r.den, valueOf);
  if (isZeroRational(den)) return refuse('division-by-zero', 'the denominator becomes zero');
  return divRational(evaluatePolynomial(r.num, valueOf), den);
}
