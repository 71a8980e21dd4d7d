import { isZeroRatio, zeroRatio, type Ratio } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { motionTransform } from '../control/index.ts';
import { ratioOfArgument, signalOf } from './answer.ts';
import { foundAnswer } from './found-answer.ts';
import { one, optional, type Argument, type UnitRule, type WorksheetFunction } from './spec.ts';

const STEP = 'K is 4 1/s^2\na is 2 1/s\nK, a are positive\n';
const SIGNAL = 'K/(s (s^2 + a s + K))';

/** A figure of a signal that settles, its random part left out. */
function timeFigure(
  name: string,
  summary: string,
  unit: UnitRule,
  more: Partial<WorksheetFunction> = {},
): WorksheetFunction {
  return {
    name,
    summary,
    source:
      'K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, section 5-3 (definitions of transient-response specifications).',
    example: `${STEP}${name}(${SIGNAL})`,
    parameters: [one('x', 'signal')],
    unit,
    availability: 'now',
    evaluate: (args, { signOf, budget }) => {
      const moved = motionTransform(signalOf(args[0]), signOf, budget);
      if (isRefusal(moved) || 'kind' in moved) return moved;
      const { transform, when, notes } = moved;
      return foundAnswer(name, [transform, ...bandIn(args)], { when, notes });
    },
    ...more,
  };
}

/** The band, and a 0 where it is not relative to the final value: as typed, or said by its unit. */
function bandIn([, band, relative]: readonly Argument[]): readonly Ratio[] {
  if (band?.kind !== 'band') return [];
  const isRelative = relative ? !isZeroRatio(ratioOfArgument(relative)) : band.isRelative;
  return isRelative ? [band.value.ratio] : [band.value.ratio, zeroRatio];
}

/** Figures of signals over time. */
export const TIME_FIGURES: readonly WorksheetFunction[] = [
  timeFigure('peak', 'The largest magnitude of a signal.', 'signal'),
  timeFigure('peak_time', 'The time of the largest magnitude.', 'time'),
  timeFigure(
    'overshoot',
    'How far a signal goes beyond its final value, relative to it.',
    'number',
  ),
  timeFigure('rise_time', 'The time from 10 % to 90 % of the final value.', 'time'),
  timeFigure(
    'settling_time',
    'The last entry into a band about the final value, in % of it or as a quantity (a number without a unit is one where 0 follows it).',
    'time',
    {
      parameters: [
        one('x', 'signal'),
        { ...one('band', 'band'), slot: true },
        optional('relative', 'parameter'),
      ],
      example: `${STEP}settling_time(${SIGNAL}, 2 %)`,
    },
  ),
];
