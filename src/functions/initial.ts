import { initialValue } from '../control/index.ts';
import { signalOf } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const initial: WorksheetFunction = {
  name: 'initial',
  summary: 'The value of a signal just after t = 0.',
  source:
    'Initial value theorem: K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, appendix A.',
  example: 'a is 2 1/s\ninitial((s + 3)/(s (s + a)))',
  parameters: [one('x', 'signal')],
  unit: 'signal',
  availability: 'now',
  evaluate: ([x]) => initialValue(signalOf(x)),
};
