import { ratioFromPolynomial } from '../algebra/index.ts';
import { formulaAnswer, loopOf } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const characteristic: WorksheetFunction = {
  name: 'characteristic',
  summary: 'The characteristic polynomial of a loop, before any cancellation.',
  source: null,
  example: "K is 2 1/s\nloop a driven by r\n  y' = K (r - y)\ncharacteristic(a)",
  parameters: [one('loop', 'loop')],
  unit: 'unchecked',
  availability: 'now',
  evaluate: ([loop]) => formulaAnswer(ratioFromPolynomial(loopOf(loop).closed.characteristic)),
};
