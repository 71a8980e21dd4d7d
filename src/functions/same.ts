import { equalRatios } from '../algebra/index.ts';
import { truth } from '../control/index.ts';
import { conditionAnswer, ratioOfArgument } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const same: WorksheetFunction = {
  name: 'same',
  summary: 'Whether two formulas are identically equal, derived parameters opened.',
  source: null,
  example: 'same((s + 1)^2, s^2 + 2 s + 1)',
  parameters: [one('a', 'formula'), one('b', 'formula')],
  unit: 'number',
  availability: 'now',
  evaluate: ([a, b], { open }) =>
    conditionAnswer(truth(equalRatios(open(ratioOfArgument(a)), open(ratioOfArgument(b))))),
};
