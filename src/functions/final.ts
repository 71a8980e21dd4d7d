import { finalValue } from '../control/index.ts';
import { signalOf } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const final: WorksheetFunction = {
  name: 'final',
  summary: 'The final value of a signal, after settling whether it exists; if it does not, why.',
  source:
    'Final value theorem: G. F. Franklin, J. D. Powell, A. Emami-Naeini, Feedback Control of Dynamic Systems, 6th ed., Pearson, 2010, section 3.1.6.',
  example: 'a is 2 1/s\na is positive\nfinal(1/(s (s + a)))',
  parameters: [one('x', 'signal')],
  unit: 'signal',
  availability: 'now',
  evaluate: ([x], { signOf, budget }) => finalValue(signalOf(x), signOf, budget),
};
