import { applyFunction, laplace, mulRatios, negRatio, ratioOf } from '../algebra/index.ts';
import { onFormula } from './answer.ts';
import { slot, type WorksheetFunction } from './spec.ts';

export const delay: WorksheetFunction = {
  name: 'delay',
  summary: 'A dead time, e^(−s Td), exactly.',
  source: null,
  example: 'Td is 0.1 s\ndelay(Td)',
  parameters: [slot('Td')],
  unit: 'number',
  availability: 'now',
  evaluate: ([time]) =>
    onFormula(time, (ratio) =>
      applyFunction('exp', [negRatio(mulRatios(ratio, ratioOf(laplace)))]),
    ),
};
