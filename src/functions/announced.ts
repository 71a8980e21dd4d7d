import { refuse } from '../base/index.ts';
import { one, type Parameter, type WorksheetFunction } from './spec.ts';

/** A function of the language that is not built yet: refused in words, never guessed. */
function announced(
  name: string,
  summary: string,
  ...parameters: readonly Parameter[]
): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example: '',
    parameters,
    unit: 'unchecked',
    availability: 'later',
    evaluate: () => refuse('not-available-yet', `${name} is not available yet`),
  };
}

const x = one('x', 'signal');

/** Functions that the language names and that are refused until they are built. */
export const ANNOUNCED: readonly WorksheetFunction[] = [
  announced('budget', 'The error budget of a signal.', x),
  announced('influence', 'How each assumption moves a result.', one('x', 'any')),
  announced(
    'lq_gain',
    'Linear-quadratic regulator gains.',
    one('A', 'matrix'),
    one('B', 'matrix'),
    one('Q', 'matrix'),
    one('R', 'matrix'),
  ),
  announced(
    'kalman_gain',
    'Steady-state Kalman filter gains.',
    one('A', 'matrix'),
    one('C', 'matrix'),
    one('W', 'matrix'),
    one('V', 'matrix'),
  ),
  announced('state_form', 'The state equations of a loop.', one('loop', 'loop')),
  announced('mask', 'A limit over frequency, from a file.', one('file', 'any')),
];
