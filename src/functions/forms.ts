import type { WrittenForm } from '../control/index.ts';
import { formulaAnswer, nameOf, onFormula } from './answer.ts';
import { one, type Parameter, type Argument, type WorksheetFunction } from './spec.ts';

/** A formula in a form asked for; the formula itself does not change. */
function written(
  name: string,
  summary: string,
  example: string,
  more: readonly Parameter[],
  form: (args: readonly Argument[]) => WrittenForm,
): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example,
    parameters: [one('x', 'formula'), ...more],
    unit: 'first',
    availability: 'now',
    evaluate: (args, { openFor }) =>
      onFormula(args[0], (ratio) => {
        const asked = form(args);
        const shown = asked.kind === 'collected' ? openFor(ratio, asked.by) : ratio;
        return formulaAnswer(shown, { form: asked });
      }),
  };
}

/** The forms a formula can be written in. */
export const FORMS: readonly WorksheetFunction[] = [
  written(
    'expand',
    'A formula with its products multiplied out.',
    'a is 2\nexpand((s + a)^2)',
    [],
    () => ({
      kind: 'expanded',
    }),
  ),
  written(
    'factor',
    'A formula as a product of its factors.',
    'a is 2\nfactor(s^2 + a s)',
    [],
    () => ({
      kind: 'factored',
    }),
  ),
  written(
    'collect',
    'A formula ordered by the powers of s, or of another symbol.',
    'a, b are positive\ncollect(a s + b s + a, s)',
    [one('s', 'name')],
    ([, by]) => ({ kind: 'collected', by: nameOf(by).generator }),
  ),
  written(
    'time_constant_form',
    'A transfer function as a gain, powers of s and factors 1 + T s.',
    'J, b, K are positive\ntime_constant_form(K/(s (J s + b)))',
    [],
    () => ({ kind: 'time constants' }),
  ),
  written(
    'pole_zero_form',
    'A transfer function as a gain, powers of s and factors s + a.',
    'J, b, K are positive\npole_zero_form(K/(s (J s + b)))',
    [],
    () => ({ kind: 'poles and zeros' }),
  ),
];
