import { limitRatio } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import type { FormulaValue } from '../control/index.ts';
import { absentAnswer, formulaAnswer } from './answer.ts';
import { one, type Argument, type WorksheetFunction } from './spec.ts';

export const limit: WorksheetFunction = {
  name: 'limit',
  summary: 'The limit of a formula as a symbol tends to a value, `limit(x as s to 0)`.',
  source: null,
  example: 'K is 2 1/s\nlimit(s K/(s (s + 1)) as s to 0)',
  parameters: [one('x as s to 0', 'limit')],
  unit: 'first',
  availability: 'now',
  evaluate: ([argument], { budget, openFor }) => {
    const { of, variable, to } = argument as Extract<Argument, { kind: 'limit' }>;
    if (of.kind !== 'formula')
      return of.kind === 'none' ? of : absentAnswer('only a formula has a limit');
    const opened = openFor((of as FormulaValue).ratio, variable);
    const answer = limitRatio(opened, variable, to, budget);
    if (!isRefusal(answer)) return formulaAnswer(answer, { when: of.when });
    return answer.code === 'infinite' || answer.code === 'undefined'
      ? absentAnswer(answer.reason)
      : answer;
  },
};
