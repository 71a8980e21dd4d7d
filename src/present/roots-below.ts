import {
  coefficientsIn,
  divideExactly,
  generatorPolynomial,
  isConstantPolynomial,
  isZeroPolynomial,
  mulPolynomials,
  type Generator,
  type Polynomial,
  type Ratio,
} from '../algebra/index.ts';

/** A fraction as it is to be written: of the same value as a canonical one, but not canonical itself. */
interface Fraction {
  readonly num: Polynomial;
  readonly den: Polynomial;
}

/**
 * A fraction with its square roots below the line where they are shorter there: c √(k m)/(2 k m), which is the canonical
 * form, is read as c/(2 √(k m)). Roots of numbers stay above.
 */
export function withRootsBelow(r: Ratio): Fraction {
  return r.num.generators.reduce<Fraction>((fraction, g) => lowered(fraction, g) ?? fraction, r);
}

/** √(p/q) n/d = (n/q) p/(d √(p/q)) with both divisions exact; null where they are not, or the root is in part of n only. */
function lowered({ num, den }: Fraction, root: Generator): Fraction | null {
  if (root.kind !== 'function' || root.name !== 'sqrt') return null;
  const argument = root.args![0];
  if (isConstantPolynomial(argument.num) && isConstantPolynomial(argument.den)) return null;
  const [without, factor, ...higher] = coefficientsIn(num, root);
  if (!isZeroPolynomial(without) || higher.length > 0) return null;
  const above = divideExactly(factor, argument.den);
  const below = divideExactly(den, argument.num);
  if (above === null || below === null) return null;
  return { num: above, den: mulPolynomials(below, generatorPolynomial(root)) };
}
