import type { Finding } from './finding.ts';
import { bandwidthOf, gainAt, peakGain, phaseAt } from './frequency-figures.ts';
import type { NumericTransfer } from './frequency-polynomials.ts';
import { overshootOf, peakOf, peakTimeOf, riseTimeOf, settlingTimeOf } from './time-figures.ts';
import { delayMargin, gainCrossover, gainMargin, phaseMargin } from './margins.ts';
import { noiseBandwidthIn } from './noise-integral.ts';

/**
 * A function of a worksheet whose value is found from the numbers of its arguments, which may be functions of s. In
 * formulas it stands as a generator that binds s.
 */
export interface FoundNumber {
  /** Whether it is never negative. */
  readonly isMagnitude: boolean;
  find(...args: readonly NumericTransfer[]): Finding;
}

/** All such functions by name. This is their one list. */
export const FOUND_NUMBERS: ReadonlyMap<string, FoundNumber> = new Map<string, FoundNumber>([
  ['gain', { isMagnitude: true, find: gainAt }],
  ['phase', { isMagnitude: false, find: phaseAt }],
  ['gain_margin', { isMagnitude: true, find: gainMargin }],
  ['phase_margin', { isMagnitude: false, find: phaseMargin }],
  ['delay_margin', { isMagnitude: true, find: delayMargin }],
  ['crossover', { isMagnitude: true, find: gainCrossover }],
  ['bandwidth', { isMagnitude: true, find: bandwidthOf }],
  ['peak_gain', { isMagnitude: true, find: peakGain }],
  ['noise_bandwidth', { isMagnitude: true, find: noiseBandwidthIn }],
  ['peak', { isMagnitude: true, find: peakOf }],
  ['peak_time', { isMagnitude: true, find: peakTimeOf }],
  ['overshoot', { isMagnitude: true, find: overshootOf }],
  ['rise_time', { isMagnitude: true, find: riseTimeOf }],
  ['settling_time', { isMagnitude: true, find: settlingTimeOf }],
]);
