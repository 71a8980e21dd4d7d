import { areSame } from '../algebra/index.ts';
import { truth, undecided } from '../control/index.ts';
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
  evaluate: ([a, b], { open, signOf, budget }) => {
    const sides = [a, b].map((side) => open(ratioOfArgument(side)));
    const answer = areSame(sides[0], sides[1], signOf, budget);
    return conditionAnswer(
      answer === null
        ? undecided(
            'the forms differ, and no relation that is known here makes them equal, but no values were found at which they surely differ either',
          )
        : truth(answer),
    );
  },
};
