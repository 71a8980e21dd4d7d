import { refuse } from '../base/index.ts';
import { one, slot, type Parameter, type WorksheetFunction } from './spec.ts';

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
const transfer = one('H', 'formula');
const loopGain = one('L', 'formula');

/** Functions that the language names and that are refused until they are built. */
export const ANNOUNCED: readonly WorksheetFunction[] = [
  announced('peak', 'The largest magnitude of a signal.', x),
  announced('peak_time', 'The time of the largest magnitude.', x),
  announced('overshoot', 'The overshoot relative to the final value.', x),
  announced('rise_time', 'The time from 10 % to 90 % of the final value.', x),
  announced('settling_time', 'The last entry into a band about the final value.', x, slot('band')),
  announced('gain', 'The gain at a frequency.', transfer, slot('w')),
  announced('phase', 'The phase at a frequency.', transfer, slot('w')),
  announced('gain_margin', 'The gain margin of a loop gain.', loopGain),
  announced('phase_margin', 'The phase margin of a loop gain.', loopGain),
  announced('delay_margin', 'The delay margin of a loop gain.', loopGain),
  announced('crossover', 'The gain crossover frequency.', loopGain),
  announced(
    'bandwidth',
    'The frequency at which the gain first falls to 1/√2 of that at 0.',
    transfer,
  ),
  announced('peak_gain', 'The largest gain over all frequencies.', transfer),
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
