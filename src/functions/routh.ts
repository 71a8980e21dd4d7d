import { ALWAYS, routhArray, type RouthArray } from '../control/index.ts';
import { isRefusal, type Refusal } from '../base/index.ts';
import { loopOf, polynomialOf, ratioOfArgument } from './answer.ts';
import { recordSigns } from './used-signs.ts';
import { one, type Argument, type FunctionContext, type WorksheetFunction } from './spec.ts';

export const routh: WorksheetFunction = {
  name: 'routh',
  summary:
    'The Routh array of a loop or of a polynomial in s, its special cases resolved, and the conditions that keep its first column positive.',
  source:
    'E. J. Routh, A Treatise on the Stability of a Given State of Motion, Macmillan, 1877; F. R. Gantmacher, The Theory of Matrices, vol. 2, Chelsea, 1959, ch. XV.',
  example: 'a, b, c are positive\nrouth(a s^2 + b s + c)',
  parameters: [one('loop', 'loop or polynomial')],
  unit: 'unchecked',
  availability: 'now',
  evaluate: ([subject], context) => {
    const signs = recordSigns(context.signOf);
    const routhOf = arrayOf(subject, { ...context, signOf: signs.signOf });
    if (isRefusal(routhOf)) return routhOf;
    const conditions = routhOf.conditions
      .map(context.readable)
      .filter((c) => c.kind !== 'truth' || !c.value);
    const notes = [...routhOf.notes, ...signs.notes()];
    return { kind: 'array', routh: { ...routhOf, conditions }, when: ALWAYS, notes };
  },
};

function arrayOf(subject: Argument, { signOf, budget }: FunctionContext): RouthArray | Refusal {
  if (subject.kind === 'loop')
    return routhArray(loopOf(subject).closed.characteristic, signOf, budget);
  const polynomial = polynomialOf(ratioOfArgument(subject), 'routh');
  return isRefusal(polynomial) ? polynomial : routhArray(polynomial, signOf, budget);
}
