import { coefficientsIn, divRatios, ratioFromPolynomial, zeroRatio } from '../algebra/index.ts';
import { isRefusal, refuse } from '../base/index.ts';
import { integerOf, nameOf, onFormula, ratioOfArgument } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const coefficient: WorksheetFunction = {
  name: 'coefficient',
  summary: 'The coefficient of the k-th power of s, or of another symbol, in a polynomial.',
  source: null,
  example: 'a, b are positive\ncoefficient(a s^2 + b s + 1, s, 1)',
  parameters: [one('p', 'formula'), one('s', 'name'), one('k', 'parameter')],
  unit: 'unchecked',
  availability: 'now',
  evaluate: ([p, variable, power], { openFor }) => {
    const k = integerOf(ratioOfArgument(power), 0, 'the power in coefficient');
    if (isRefusal(k)) return k;
    const { generator, name } = nameOf(variable);
    return onFormula(p, (formula) => {
      const ratio = openFor(formula, generator);
      if (ratio.den.generators.includes(generator)) {
        return refuse(
          'not-a-polynomial',
          `coefficient takes a polynomial in ${name}, and this has ${name} in its denominator`,
        );
      }
      const found = coefficientsIn(ratio.num, generator)[k];
      return found
        ? divRatios(ratioFromPolynomial(found), ratioFromPolynomial(ratio.den))
        : zeroRatio;
    });
  },
};
