import type { Ratio } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { ALWAYS, matchCoefficients } from '../control/index.ts';
import { formulaAnswer, nameOf, polynomialOf, ratioOfArgument } from './answer.ts';
import { one, rest, type WorksheetFunction } from './spec.ts';

export const match: WorksheetFunction = {
  name: 'match',
  summary:
    'The gains that make one polynomial in s equal another up to a factor: pole placement by coefficient matching.',
  source: 'K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, section 10-2.',
  example: 'J is 2 kg m^2\nw is 3 rad/s\nmatch(J s^2 + Kd s + Kp, s^2 + 2 w s + w^2, Kp, Kd)',
  parameters: [
    one('p', 'formula'),
    one('q', 'formula'),
    one('gain', 'unknown'),
    rest('gain', 'unknown'),
  ],
  unit: 'unchecked',
  availability: 'now',
  evaluate: ([p, q, ...gains], { budget, openFor }) => {
    const opened = (ratio: Ratio) =>
      gains.reduce((whole, gain) => openFor(whole, nameOf(gain).generator), ratio);
    const from = polynomialOf(opened(ratioOfArgument(p)), 'match');
    if (isRefusal(from)) return from;
    const to = polynomialOf(opened(ratioOfArgument(q)), 'match');
    if (isRefusal(to)) return to;
    const matched = matchCoefficients(
      from,
      to,
      gains.map((gain) => nameOf(gain).generator),
      budget,
    );
    if (isRefusal(matched)) return matched;
    const parts = matched.map(({ gain, value }) => ({
      name: gain.name,
      value: formulaAnswer(value),
    }));
    return { kind: 'parts', parts, joined: 'list', when: ALWAYS, notes: [] };
  },
};
