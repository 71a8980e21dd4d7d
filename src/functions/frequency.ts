import { ALWAYS, stable, type FormulaValue } from '../control/index.ts';
import { ratioOfArgument, valueOf } from './answer.ts';
import { foundAnswer } from './found-answer.ts';
import { frequencySlot, one, type UnitRule, type WorksheetFunction } from './spec.ts';

const MARGINS =
  'K. J. Åström, R. M. Murray, Feedback Systems, Princeton University Press, 2008, section 9.3.';
const LOOP = 'L = 6/((s^2 + 2 s + 2) (s + 2))\n';
const TRANSFER = 'H = 1/(s^2 + s + 1)\n';

/** A figure over frequency: found from the numbers of a transfer function, wherever these stand. */
function frequencyFigure(
  name: string,
  summary: string,
  unit: UnitRule,
  more: Partial<WorksheetFunction> = {},
): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example: `${TRANSFER}${name}(H)`,
    parameters: [one('H', 'formula')],
    unit,
    availability: 'now',
    evaluate: (args) => foundAnswer(name, args.map(ratioOfArgument)),
    ...more,
  };
}

function ofLoopGain(
  name: string,
  summary: string,
  unit: UnitRule,
  more: Partial<WorksheetFunction> = {},
): WorksheetFunction {
  return frequencyFigure(name, summary, unit, {
    source: MARGINS,
    example: `${LOOP}${name}(L)`,
    parameters: [one('L', 'formula')],
    ...more,
  });
}

/** A margin exists where the closed loop is stable, the modes that cancelled in the loop gain included. */
function margin(name: string, summary: string, unit: UnitRule): WorksheetFunction {
  return ofLoopGain(name, summary, unit, {
    evaluate: ([loopGain]) => {
      const { ratio, hidden } = valueOf(loopGain) as FormulaValue;
      const when = hidden ? stable([{ signals: [], polynomial: hidden }]) : ALWAYS;
      return foundAnswer(name, [ratio], { when });
    },
  });
}

const atFrequency = {
  parameters: [one('H', 'formula'), frequencySlot('w', 'angular frequency')],
};

/** Figures of transfer functions and loop gains over frequency. */
export const FREQUENCY: readonly WorksheetFunction[] = [
  frequencyFigure('gain', 'The gain of a transfer function at a frequency.', 'first', {
    ...atFrequency,
    example: `${TRANSFER}gain(H, 2 rad/s)`,
  }),
  frequencyFigure(
    'phase',
    'The phase of a transfer function at a frequency, unwrapped from low frequency.',
    'angle',
    { ...atFrequency, example: `${TRANSFER}phase(H, 2 rad/s)` },
  ),
  margin(
    'gain_margin',
    'The factor of the gain, nearest 1, that brings the closed loop to its limit; every crossing is listed.',
    'number',
  ),
  margin(
    'phase_margin',
    'The smallest angle between the loop gain and −1 where its magnitude is 1; every crossing is listed.',
    'angle',
  ),
  margin(
    'delay_margin',
    'The smallest further dead time that brings the closed loop to its limit.',
    'time',
  ),
  ofLoopGain(
    'crossover',
    'The highest angular frequency at which the magnitude of the loop gain is 1.',
    'angular frequency',
  ),
  frequencyFigure(
    'bandwidth',
    'The angular frequency at which the gain first falls to 1/√2 of that at 0.',
    'angular frequency',
  ),
  frequencyFigure('peak_gain', 'The largest gain over all frequencies.', 'first'),
];
