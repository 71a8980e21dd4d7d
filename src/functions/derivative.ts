import { derivativeRatio } from '../algebra/index.ts';
import { nameOf, onFormula } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const derivative: WorksheetFunction = {
  name: 'derivative',
  summary: 'The derivative of a formula with respect to a symbol.',
  source: null,
  example: 'K is 2\nderivative(K^2 + 1, K)',
  parameters: [one('x', 'formula'), one('K', 'name')],
  unit: 'quotient',
  availability: 'now',
  evaluate: ([x, by], { budget, openFor }) => {
    const { generator } = nameOf(by);
    return onFormula(x, (ratio) => derivativeRatio(openFor(ratio, generator), generator, budget));
  },
};
