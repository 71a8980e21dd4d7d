import { generatorDependsOn } from './generator.ts';
import {
  coefficientsIn,
  generatorPolynomial,
  isZeroPolynomial,
  mulPolynomials,
  onePolynomial,
  powPolynomial,
  subPolynomials,
  sumPolynomials,
} from './polynomial.ts';
import type { Budget } from '../base/index.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

/** A quotient of polynomials that is not canonical yet. */
export interface Quotient {
  readonly num: Polynomial;
  readonly den: Polynomial;
}

/** Whether a polynomial contains j or a square root. */
export function hasRelations(p: Polynomial): boolean {
  return p.generators.some((g) => g.square);
}

/**
 * p with j² and the squares of square roots replaced by their values until each of them stands at most in the first
 * power; the denominators of the values come out as `den`, which has no such generator of its own from this step.
 */
export function reduceRelations(p: Polynomial, budget?: Budget): Quotient {
  let num = p;
  let den = onePolynomial;
  for (;;) {
    const place = num.generators.findIndex((g, k) => g.square && num.degrees[k] > 1);
    if (place < 0) return { num, den };
    const g = num.generators[place];
    const step = replaceSquares(num, g, g.square as Ratio, budget);
    num = step.num;
    den = mulPolynomials(den, step.den, budget);
  }
}

/** Σ c[k] g^k with g² = u/v, as an expression linear in g over a power of v. */
function replaceSquares(p: Polynomial, g: Generator, square: Ratio, budget?: Budget): Quotient {
  const coefficients = coefficientsIn(p, g);
  const highest = (coefficients.length - 1) >> 1;
  const root = generatorPolynomial(g);
  const terms = coefficients.map((c, k) => {
    const power = k >> 1;
    const scale = mulPolynomials(
      powPolynomial(square.num, power, budget),
      powPolynomial(square.den, highest - power, budget),
    );
    const even = mulPolynomials(c, scale, budget);
    return k % 2 === 0 ? even : mulPolynomials(even, root);
  });
  return { num: sumPolynomials(terms), den: powPolynomial(square.den, highest, budget) };
}

/** The generator with a relation that no other one in the list is nested around: it can be removed first. */
function outermost(generators: readonly Generator[]): Generator | undefined {
  const related = generators.filter((g) => g.square);
  return related.find((g) => !related.some((other) => other !== g && generatorDependsOn(other, g)));
}

/**
 * The quotient with j and square roots moved out of the denominator, by multiplying both with the conjugate. A
 * root stays where its conjugate product vanishes (for example sqrt(a^2) − a): nothing may be said about it then.
 */
export function rationalise(quotient: Quotient, budget?: Budget): Quotient {
  let { num, den } = quotient;
  for (let g = outermost(den.generators); g; g = outermost(den.generators)) {
    const [a, b] = coefficientsIn(den, g);
    const { num: u, den: v } = g.square as Ratio;
    const conjugate = subPolynomials(a, mulPolynomials(b, generatorPolynomial(g)));
    const norm = subPolynomials(
      mulPolynomials(mulPolynomials(a, a, budget), v, budget),
      mulPolynomials(mulPolynomials(b, b, budget), u, budget),
    );
    const bottom = reduceRelations(norm, budget);
    if (isZeroPolynomial(bottom.num)) return { num, den };
    const product = mulPolynomials(mulPolynomials(num, conjugate, budget), v, budget);
    const top = reduceRelations(product, budget);
    num = mulPolynomials(top.num, bottom.den, budget);
    den = mulPolynomials(bottom.num, top.den, budget);
  }
  return { num, den };
}
