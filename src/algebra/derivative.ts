import { isRefusal, refuse, type Budget, type Refusal } from '../base/index.ts';
import { functionOf, generatorDependsOn } from './generator.ts';
import {
  derivativePolynomial,
  isZeroPolynomial,
  mulPolynomials,
  subPolynomials,
} from './polynomial.ts';
import { rational } from './rational.ts';
import {
  addRatios,
  dependsOn,
  divRatios,
  generatorsOfRatio,
  inverseRatio,
  mulRatios,
  negRatio,
  oneRatio,
  powRatio,
  ratio,
  ratioFromPolynomial,
  ratioFromRational,
  ratioOf,
  subRatios,
  sumRatios,
  zeroRatio,
} from './ratio.ts';
import type { Generator, Polynomial, Ratio } from './ring.ts';

/** The derivatives of the functions of one argument, at a given kernel. */
const OUTER_DERIVATIVES: ReadonlyMap<string, (argument: Ratio, self: Ratio) => Ratio> = new Map([
  ['exp', (_, self) => self],
  ['log', (argument) => inverseRatio(argument)],
  ['sin', (argument) => ratioOf(functionOf('cos', [argument]))],
  ['cos', (argument) => negRatio(ratioOf(functionOf('sin', [argument])))],
  ['tan', (_, self) => addRatios(oneRatio, powRatio(self, 2))],
  ['atan', (argument) => inverseRatio(addRatios(oneRatio, powRatio(argument, 2)))],
  ['sqrt', (_, self) => inverseRatio(mulRatios(ratioFromRational(rational(2)), self))],
]);

/** The derivative of one generator with respect to another. */
function slopeOf(g: Generator, x: Generator, budget?: Budget): Ratio | Refusal {
  if (g === x) return oneRatio;
  if (!generatorDependsOn(g, x)) return zeroRatio;
  const outer = OUTER_DERIVATIVES.get(g.name);
  const [argument] = g.args ?? [];
  if (!outer || !argument) {
    return refuse('not-differentiable', `${g.name} has no derivative in closed form`);
  }
  const inner = derivativeRatio(argument, x, budget);
  return isRefusal(inner) ? inner : mulRatios(outer(argument, ratioOf(g)), inner, budget);
}

function totalDerivative(p: Polynomial, x: Generator, budget?: Budget): Ratio | Refusal {
  const parts: Ratio[] = [];
  for (const g of p.generators) {
    const slope = slopeOf(g, x, budget);
    if (isRefusal(slope)) return slope;
    parts.push(mulRatios(ratioFromPolynomial(derivativePolynomial(p, g)), slope, budget));
  }
  return sumRatios(parts, budget);
}

/**
 * The derivative of r with respect to a generator, through functions by the chain rule. Refused
 * (`not-differentiable`) for abs, min, max and unknown functions of it.
 */
export function derivativeRatio(r: Ratio, x: Generator, budget?: Budget): Ratio | Refusal {
  if (!dependsOn(r, x)) return zeroRatio;
  const nested = generatorsOfRatio(r).some((g) => g !== x && generatorDependsOn(g, x));
  if (!nested) return rationalDerivative(r, x, budget);
  const top = totalDerivative(r.num, x, budget);
  const bottom = totalDerivative(r.den, x, budget);
  if (isRefusal(top)) return top;
  if (isRefusal(bottom)) return bottom;
  const den = ratioFromPolynomial(r.den);
  const carried = mulRatios(divRatios(ratioFromPolynomial(r.num), den, budget), bottom, budget);
  return divRatios(subRatios(top, carried, budget), den, budget);
}

function rationalDerivative(r: Ratio, x: Generator, budget?: Budget): Ratio {
  const top = derivativePolynomial(r.num, x);
  const bottom = derivativePolynomial(r.den, x);
  if (isZeroPolynomial(bottom)) return ratio(top, r.den, budget);
  const num = subPolynomials(
    mulPolynomials(top, r.den, budget),
    mulPolynomials(r.num, bottom, budget),
  );
  return ratio(num, mulPolynomials(r.den, r.den, budget), budget);
}
