import { ratioFromRational, rational } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { systemType as typeOf } from '../control/index.ts';
import { onFormula } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const systemType: WorksheetFunction = {
  name: 'system_type',
  summary: 'The type of a loop gain: the number of its poles at s = 0.',
  source:
    'G. F. Franklin, J. D. Powell, A. Emami-Naeini, Feedback Control of Dynamic Systems, 6th ed., Pearson, 2010, section 4.2.',
  example: 'K is 2 1/s\nsystem_type(K/s)',
  parameters: [one('L', 'formula')],
  unit: 'number',
  availability: 'now',
  evaluate: ([loopGain]) =>
    onFormula(loopGain, (ratio) => {
      const answer = typeOf(ratio);
      return isRefusal(answer) ? answer : ratioFromRational(rational(answer.type));
    }),
};
