import { isRefusal } from '../base/index.ts';
import { ALWAYS, errorConstants as constantsOf } from '../control/index.ts';
import { ratioOfArgument } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const errorConstants: WorksheetFunction = {
  name: 'error_constants',
  summary: 'The position, velocity and acceleration error constants of a loop gain.',
  source:
    'G. F. Franklin, J. D. Powell, A. Emami-Naeini, Feedback Control of Dynamic Systems, 6th ed., Pearson, 2010, section 4.2.',
  example: 'K is 2 1/s\nT is 0.5 s\nerror_constants(K/(s (T s + 1)))',
  parameters: [one('L', 'formula')],
  unit: 'unchecked',
  availability: 'now',
  evaluate: ([loopGain]) => {
    const constants = constantsOf(ratioOfArgument(loopGain));
    if (isRefusal(constants)) return constants;
    const names = ['position', 'velocity', 'acceleration'] as const;
    const parts = names.map((name) => ({ name, value: constants[name] }));
    return { kind: 'parts', parts, joined: 'list', when: ALWAYS, notes: [] };
  },
};
