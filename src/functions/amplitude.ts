import { amplitudeOf } from '../control/index.ts';
import { ratioOfArgument, signalOf } from './answer.ts';
import { frequencySlot, one, type WorksheetFunction } from './spec.ts';

export const amplitude: WorksheetFunction = {
  name: 'amplitude',
  summary: 'The amplitude of the sines of one frequency in a signal, once it is steady.',
  source:
    'K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, section 7-1 (steady-state sinusoidal response).',
  example:
    "K is 2 1/s\nf1 is 3 Hz\nloop a driven by w\n  y' = w - K y\ncase shake of a\n  w = sine(1 1/s, f1)\namplitude(shake.y, f1)",
  parameters: [one('x', 'signal'), frequencySlot('f', 'frequency')],
  unit: 'signal',
  availability: 'now',
  evaluate: ([x, frequency], context) =>
    amplitudeOf(signalOf(x), ratioOfArgument(frequency), context, context.write),
};
