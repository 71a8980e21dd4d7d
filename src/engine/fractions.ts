import {
  addFractions,
  divFractions,
  fractionOfRatio,
  mulFractions,
  negFraction,
  powFraction,
  asRational,
  isZeroPolynomial,
  type Fraction,
} from '../algebra/index.ts';
import type { Expression, Power, Product, Sum } from '../language/index.ts';
import { parameterOf, replacementsOf } from './replacements.ts';
import type { Meanings } from './meanings.ts';
import type { Scope } from './scope.ts';
import { stopAt } from './stop.ts';

/**
 * The value of a formula as an uncancelled fraction in s. Loop equations are read with it: a pole that cancels against
 * a zero in `G C` is still a mode of the loop, and its characteristic polynomial must keep it.
 */
export function evaluateFraction(
  expression: Expression,
  scope: Scope,
  meanings: Meanings,
): Fraction {
  const inner = (part: Expression) => evaluateFraction(part, scope, meanings);
  switch (expression.kind) {
    case 'name':
      return meanings.fractionOf(expression.name, expression.wordSpan ?? expression.span, scope);
    case 'evaluation':
      if (expression.at.kind === 'name' && expression.at.name === 's') {
        return meanings.fractionOf(expression.name, expression.nameSpan, scope);
      }
      break;
    case 'sum':
      return sumFraction(expression, inner);
    case 'product':
      return productFraction(expression, inner);
    case 'negation':
      return negFraction(inner(expression.of));
    case 'power':
      return powerFraction(expression, inner, scope, meanings);
    case 'in-unit':
      return inner(expression.of);
    case 'with': {
      const { inside, point } = replacementsOf(expression, scope, meanings);
      if (point.size === 0) return evaluateFraction(expression.of, inside, meanings);
      break;
    }
  }
  return fractionOfRatio(parameterOf(meanings.evaluate(expression, scope), expression.span));
}

function sumFraction(sum: Sum, inner: (part: Expression) => Fraction): Fraction {
  return sum.terms
    .map((term, index) => (sum.signs[index] < 0 ? negFraction(inner(term)) : inner(term)))
    .reduce((total, term) => addFractions(total, term));
}

function productFraction(product: Product, inner: (part: Expression) => Fraction): Fraction {
  return product.factors.map(inner).reduce((total, factor, index) => {
    if (!product.inverted[index]) return mulFractions(total, factor);
    if (isZeroFraction(factor)) {
      stopAt(
        product.factors[index].span,
        'division-by-zero',
        'This divides by an expression that is identically 0.',
      );
    }
    return divFractions(total, factor);
  });
}

function isZeroFraction(fraction: Fraction): boolean {
  return isZeroPolynomial(fraction.num);
}

function powerFraction(
  power: Power,
  inner: (part: Expression) => Fraction,
  scope: Scope,
  meanings: Meanings,
): Fraction {
  const exponent = asRational(
    parameterOf(meanings.evaluate(power.exponent, scope), power.exponent.span),
  );
  if (exponent?.d === 1n && exponent.n > 0n && exponent.n <= 100n) {
    return powFraction(inner(power.base), Number(exponent.n));
  }
  return fractionOfRatio(parameterOf(meanings.evaluate(power, scope), power.span));
}
