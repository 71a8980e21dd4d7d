import { isRefusal, type Budget } from '../base/index.ts';
import { substituteRatio } from './evaluation.ts';
import { applyFunction } from './function-value.ts';
import { functionOf, imaginary, pi } from './generator.ts';
import { absolute, integerGcd } from './integer.ts';
import { ratioKey } from './key.ts';
import {
  coefficientsIn,
  constantPolynomial,
  contentOf,
  generatorPolynomial,
  leadingCoefficientSign,
  mulPolynomials,
  negPolynomial,
  onePolynomial,
  polynomialOfTermList,
  powPolynomial,
  subPolynomials,
  sumPolynomials,
  termsOf,
  unscalePolynomial,
} from './polynomial.ts';
import { rational, type Rational } from './rational.ts';
import {
  addRatios,
  divRatios,
  generatorsOfRatio,
  mulRatios,
  oneRatio,
  powRatio,
  ratio,
  ratioFromRational,
  ratioOf,
  subRatios,
} from './ratio.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

/** A term c · u of an argument: u without a number in front. */
interface Part {
  readonly scale: Rational;
  readonly unit: Ratio;
}

function partsOf(argument: Ratio): readonly Part[] {
  return termsOf(argument.num).map((term) => {
    const { num, den } = ratio(polynomialOfTermList([term]), argument.den);
    const size = contentOf(num) * BigInt(leadingCoefficientSign(num));
    const content = contentOf(den);
    const unit = ratio(unscalePolynomial(num, size), unscalePolynomial(den, content));
    return { scale: rational(size, content), unit };
  });
}

/** The greatest rational of which both are whole multiples. */
function commonMeasure(a: Rational, b: Rational): Rational {
  return rational(integerGcd(a.n * b.d, b.n * a.d), a.d * b.d);
}

const ANGULAR: ReadonlySet<string> = new Set(['sin', 'cos']);

/** For each family of functions and each unit the common measure of what stands before it. */
class Measures {
  private readonly found = new Map<string, Rational>();

  constructor(generators: readonly Generator[]) {
    for (const g of generators) {
      for (const { scale, unit } of g.args ? partsOf(g.args[0]) : []) {
        const key = keyOf(g, unit);
        const size = rational(absolute(scale.n), scale.d);
        const known = this.found.get(key);
        this.found.set(key, known ? commonMeasure(known, size) : size);
      }
    }
  }

  /** The part as a whole multiple of a base that it shares with all others of its unit. */
  multiple(g: Generator, { scale, unit }: Part): { readonly base: Ratio; readonly count: number } {
    const measure = this.found.get(keyOf(g, unit)) as Rational;
    const base = mulRatios(unit, ratioFromRational(measure));
    return { base, count: Number((scale.n * measure.d) / (scale.d * measure.n)) };
  }
}

function keyOf(g: Generator, unit: Ratio): string {
  return `${ANGULAR.has(g.name) ? 'angle' : g.name} ${ratioKey(unit)}`;
}

/** Multiples beyond this are left as they are. */
const LARGEST_MULTIPLE = 60;

/** exp(base): x where the base is log x, √x where it is (log x)/2. */
function exponential(base: Ratio): Ratio {
  const [g] = base.num.generators;
  const isLog = g?.name === 'log' && base.num.degrees[0] === 1 && base.num.coefficients[0] === 1n;
  if (isLog && base.num.generators.length === 1 && g.args && base.den.generators.length === 0) {
    const divisor = base.den.coefficients[0];
    if (divisor === 1n) return g.args[0];
    if (divisor === 2n) return ratioOf(functionOf('sqrt', [g.args[0]]));
  }
  return ratioOf(functionOf('exp', [base]));
}

/** cos x + j sin x for one base angle; those of pi by their own table. */
function turnBy(base: Ratio): Ratio {
  const isOfPi = base.num.generators.length === 1 && base.num.generators[0] === pi;
  const value = (name: string): Ratio => {
    const known = isOfPi ? applyFunction(name, [base]) : null;
    return known && !isRefusal(known) ? known : ratioOf(functionOf(name, [base]));
  };
  return addRatios(value('cos'), mulRatios(ratioOf(imaginary), value('sin')));
}

function conjugate(turn: Ratio, budget?: Budget): Ratio {
  const minusJ = ratio(negPolynomial(generatorPolynomial(imaginary)), onePolynomial);
  const turned = substituteRatio(turn, new Map([[imaginary, minusJ]]), budget);
  return isRefusal(turned) ? turn : turned;
}

/** sin or cos of a sum of multiples: the imaginary or the real part of a product of turns. */
function angular(
  g: Generator,
  multiples: ReturnType<Measures['multiple']>[],
  budget?: Budget,
): Ratio {
  const product = multiples.reduce((whole, { base, count }) => {
    const turn = count < 0 ? conjugate(turnBy(base), budget) : turnBy(base);
    return mulRatios(whole, powRatio(turn, Math.abs(count), budget), budget);
  }, oneRatio);
  const other = conjugate(product, budget);
  const two = ratioFromRational(rational(2n));
  if (g.name === 'cos') return divRatios(addRatios(product, other), two);
  return divRatios(subRatios(product, other), mulRatios(two, ratioOf(imaginary)));
}

function rewritten(g: Generator, measures: Measures, budget?: Budget): Ratio | null {
  const multiples = partsOf((g.args as readonly Ratio[])[0]).map((part) =>
    measures.multiple(g, part),
  );
  if (multiples.some(({ count }) => Math.abs(count) > LARGEST_MULTIPLE)) return null;
  if (ANGULAR.has(g.name)) return angular(g, multiples, budget);
  return multiples.reduce(
    (product, { base, count }) =>
      mulRatios(product, powRatio(exponential(base), count, budget), budget),
    oneRatio,
  );
}

/**
 * The ratios with exp, sin and cos of sums and multiples written in those of angles and exponents that all of them have
 * in common (exp(x) as exp(x/2)², sin(2 x) as 2 sin x cos x). Equal to what they were wherever these have a value.
 */
export function overCommonAngles(ratios: readonly Ratio[], budget?: Budget): readonly Ratio[] {
  const generators = [...new Set(ratios.flatMap(generatorsOfRatio))].filter(
    (g) => g.args !== undefined && (g.name === 'exp' || ANGULAR.has(g.name)),
  );
  const measures = new Measures(generators);
  const values = new Map<Generator, Ratio>();
  for (const g of generators) {
    const value = rewritten(g, measures, budget);
    if (value) values.set(g, value);
  }
  return ratios.map((r) => {
    const changed = substituteRatio(r, values, budget);
    return isRefusal(changed) ? r : changed;
  });
}

/** p with sin² replaced by 1 − cos². */
export function withoutSquaredSines(p: Polynomial, budget?: Budget): Polynomial {
  let rest = p;
  for (;;) {
    const sine = rest.generators.find((g, k) => g.name === 'sin' && g.args && rest.degrees[k] > 1);
    if (!sine) return rest;
    const cosine = generatorPolynomial(functionOf('cos', sine.args as readonly Ratio[]));
    const square = subPolynomials(constantPolynomial(1n), mulPolynomials(cosine, cosine));
    rest = sumPolynomials(
      coefficientsIn(rest, sine).map((c, k) => {
        const even = mulPolynomials(c, powPolynomial(square, k >> 1, budget), budget);
        return k % 2 === 0 ? even : mulPolynomials(even, generatorPolynomial(sine));
      }),
    );
  }
}
