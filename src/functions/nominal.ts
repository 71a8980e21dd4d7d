import { functionOf, ratioOf, symbolsOfRatio } from '../algebra/index.ts';
import { formulaAnswer, onFormula } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const nominal: WorksheetFunction = {
  name: 'nominal',
  summary:
    'A formula with every toleranced name held at its nominal, as a gain that is computed once is.',
  source: null,
  example: 'J is 2 kg m^2 ± 10 %\nwc is 3 rad/s\nKp = nominal(J wc^2)',
  parameters: [one('x', 'parameter')],
  unit: 'first',
  availability: 'now',
  evaluate: ([x]) =>
    onFormula(x, (ratio) =>
      formulaAnswer(
        symbolsOfRatio(ratio).length === 0 ? ratio : ratioOf(functionOf('nominal', [ratio])),
      ),
    ),
};
