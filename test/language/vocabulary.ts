import type { Vocabulary } from '../../src/language/index.ts';

const UNITS = new Set(
  'kg m N s ms rad mrad µrad Hz kHz kN mm inch K °C ° deg % dB t J W V A g l min h 1 Ω sr'.split(
    ' ',
  ),
);

const FUNCTIONS = new Set(
  (
    'sqrt exp log sin cos tan atan abs min max rows transpose inverse determinant identity diagonal entry ' +
    'nominal in_full opened characteristic stable routh final initial constant drifting periodic random due ' +
    'delay rational_delay step ramp parabola impulse sine noise shaped measured mask limit derivative expand factor ' +
    'collect partial_fractions solve match response peak settling_time gain phase gain_margin phase_margin amplitude ' +
    'density rms budget same coefficient poles dc_gain'
  ).split(' '),
);

const SLOTS: Readonly<Record<string, readonly number[]>> = {
  gain: [1],
  phase: [1],
  amplitude: [1],
  density: [1],
  rms: [1, 2],
  settling_time: [1],
  delay: [0],
  rational_delay: [0],
  step: [0],
  ramp: [0],
  parabola: [0],
  impulse: [0],
  sine: [0, 1],
  noise: [0],
  shaped: [1],
};

/** A vocabulary for tests of the language alone; units and functions have layers of their own. */
export const VOCABULARY: Vocabulary = {
  isUnit: (text) => UNITS.has(text),
  functions: FUNCTIONS,
  slotArguments: (callee, index) => SLOTS[callee]?.includes(index) ?? false,
};
