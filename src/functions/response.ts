import { isRefusal } from '../base/index.ts';
import { responseOf } from '../control/index.ts';
import { responseLatex, responseText } from '../present/index.ts';
import { signalOf } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const response: WorksheetFunction = {
  name: 'response',
  summary: 'The time response of a signal in closed form.',
  source:
    'M. Abramowitz, I. A. Stegun (eds.), Handbook of Mathematical Functions, NBS AMS 55, 1964, section 29.3.',
  example: 'a is 2 1/s\nresponse(1/(s (s + a)))',
  parameters: [one('x', 'signal')],
  unit: 'signal',
  availability: 'now',
  evaluate: ([x], { signOf, budget, writing }) => {
    const signal = signalOf(x);
    const closed = responseOf(signal, signOf, budget);
    if (isRefusal(closed)) return closed;
    return {
      kind: 'text',
      response: closed,
      text: responseText(closed, writing),
      latex: responseLatex(closed, writing),
      when: signal.when,
      notes: closed.exact ? [] : ['Amounts marked ≈ are rounded.'],
    };
  },
};
