import {
  applyFunction,
  constantPolynomial,
  divRatios,
  factorPolynomial,
  isConstantPolynomial,
  isZeroRatio,
  mulRatios,
  negRatio,
  oneRatio,
  powRatio,
  productOfPolynomials,
  ratio,
  ratioFromPolynomial,
  signOfPolynomial,
  sqrtOf,
} from '../algebra/index.ts';
import type { Polynomial, Ratio, SignOf } from '../algebra/index.ts';
import { invariant, isRefusal } from '../base/index.ts';
import type { Budget } from '../base/index.ts';

/** |p|, without bars where the sign is known. */
function sizeOf(p: Polynomial, signOf: SignOf): Ratio {
  const plain = ratioFromPolynomial(p);
  const sign = signOfPolynomial(p, signOf);
  if (sign === 'positive' || sign === 'nonnegative') return plain;
  if (sign === 'negative' || sign === 'nonpositive') return negRatio(plain);
  const size = applyFunction('abs', [plain]);
  invariant(!isRefusal(size), 'a magnitude that does not exist');
  return size;
}

/** √p = outside · √inside. */
interface RootParts {
  readonly outside: Ratio;
  readonly inside: Polynomial;
}

function rootParts(p: Polynomial, signOf: SignOf, budget?: Budget): RootParts {
  const { unit, factors } = factorPolynomial(p, budget);
  const outside = factors.map(({ factor, multiplicity }) =>
    multiplicity < 2
      ? oneRatio
      : powRatio(sizeOf(factor, signOf), Math.floor(multiplicity / 2), budget),
  );
  const inside = factors
    .filter(({ multiplicity }) => multiplicity % 2 === 1)
    .map(({ factor }) => factor);
  return {
    outside: outside.reduce((a, b) => mulRatios(a, b, budget), oneRatio),
    inside: productOfPolynomials([constantPolynomial(unit), ...inside], budget),
  };
}

/**
 * The root of what is not negative, with the squares in it taken out as magnitudes: √(A² b) is |A| √b.
 *
 * Unlike `sqrtOf`, it asks for the signs of what it takes out.
 */
export function rootOfSquare(square: Ratio, signOf: SignOf, budget?: Budget): Ratio {
  if (isZeroRatio(square)) return square;
  const [top, bottom] = [square.num, square.den].map((p) => rootParts(p, signOf, budget));
  const root = (p: Polynomial): Ratio => sqrtOf(ratioFromPolynomial(p), budget);
  const inside = isConstantPolynomial(top.inside)
    ? divRatios(root(top.inside), root(bottom.inside), budget)
    : sqrtOf(ratio(top.inside, bottom.inside, budget), budget);
  return mulRatios(divRatios(top.outside, bottom.outside), inside, budget);
}
