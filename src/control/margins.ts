import { isHurwitz, positiveRoots } from '../numeric/index.ts';
import { isDelayStable } from './dead-time.ts';
import { found, notFound, type Crossing, type Finding } from './finding.ts';
import { phaseCrossingsWithDelay } from './phase-curve.ts';
import {
  addScaled,
  delayedRational,
  imaginaryPart,
  squaredMagnitude,
  transferAt,
  type DelayedRational,
  type NumericTransfer,
} from './frequency-polynomials.ts';

/** With dead time there is no end of phase crossings; so many are looked at. */
const MOST_CROSSINGS = 20;

const MANY_DELAYS =
  'the dead times stand in several terms of the transfer function, and margins are found for one dead time in the loop';

function asTransfer({ num, den, delay }: DelayedRational): NumericTransfer {
  return { num: [{ coefficients: num, delay }], den: [{ coefficients: den, delay: 0 }] };
}

/** Whether 1 + L has all its zeros in the open left half plane; null where that cannot be told. */
function isClosedStable({ num, den, delay }: DelayedRational): boolean | null {
  if (delay === 0) {
    const sum = Float64Array.from(addScaled(den, num));
    return isHurwitz(sum, 0, sum.length - 1);
  }
  return isDelayStable([
    { coefficients: den, delay: 0 },
    { coefficients: num, delay },
  ]);
}

/** What all margins need: one dead time at most, and a stable closed loop. */
function marginsOf(loopGain: NumericTransfer, find: (loop: DelayedRational) => Finding): Finding {
  const loop = delayedRational(loopGain);
  if (!loop) return notFound(MANY_DELAYS);
  if (loop.num.length === 0) return notFound('the loop gain is 0', Infinity);
  if (![...loop.num, ...loop.den, loop.delay].every(Number.isFinite))
    return notFound('the loop gain has no value');
  const stable = isClosedStable(loop);
  if (stable === null) return notFound('the stability of the closed loop cannot be told');
  if (!stable)
    return notFound('the closed loop (1 + L = 0) is not stable, so that there is no margin');
  return find(loop);
}

/** The angular frequencies at which |L(jω)| = 1, ascending. */
function gainCrossings({ num, den }: DelayedRational): readonly number[] {
  const difference = addScaled(squaredMagnitude(num), squaredMagnitude(den), -1);
  return positiveRoots(difference).map(Math.sqrt);
}

/** The angular frequencies at which L(jω) is real, ascending; 0 where it has a value there. */
function realPlaces(loop: DelayedRational): readonly number[] {
  const start = loop.den.at(-1) === 0 ? [] : [0];
  if (loop.delay !== 0) return [...start, ...phaseCrossingsWithDelay(loop, MOST_CROSSINGS)];
  return [...start, ...positiveRoots(imaginaryPart(loop.num, loop.den)).map(Math.sqrt)];
}

/** The factors of the gain at which the closed loop reaches its limit, with their frequencies. */
function gainLimits(loop: DelayedRational): readonly Omit<Crossing, 'binding'>[] {
  const transfer = asTransfer(loop);
  const limits = realPlaces(loop).flatMap((frequency) => {
    const value = transferAt(transfer, frequency);
    return value && value.re < -LARGEST_ANGLE * Math.abs(value.im) && 1 / value.re > -Infinity
      ? [{ frequency, margin: -1 / value.re }]
      : [];
  });
  const [top, bottom] = [loop.num[0], loop.den[0]];
  const isBiproper = loop.num.length === loop.den.length;
  if (isBiproper && loop.delay === 0 && top / bottom < 0)
    limits.push({ frequency: Infinity, margin: -bottom / top });
  return limits;
}

/** A value counts as real where its real part is so many times its imaginary part, which rounding has left. */
const LARGEST_ANGLE = 1e3;

/** Crossings with the binding one marked, and the value it gives. */
function bound(
  crossings: readonly Omit<Crossing, 'binding'>[],
  weight: (margin: number) => number,
  notes: (margin: number) => readonly string[],
): Finding {
  const least = crossings.reduce((a, b) => (weight(b.margin) < weight(a.margin) ? b : a));
  return {
    ...found(least.margin, notes(least.margin)),
    crossings: crossings.map((c) => ({ ...c, binding: c === least })),
  };
}

const MORE_CROSSINGS = `With dead time there are more phase crossings than the first ${MOST_CROSSINGS}.`;

function gainNotes(loop: DelayedRational, limits: readonly Omit<Crossing, 'binding'>[]) {
  const isConditional =
    limits.some(({ margin }) => margin < 1) && limits.some(({ margin }) => margin > 1);
  return (margin: number): readonly string[] => [
    ...(isConditional
      ? ['The loop is conditionally stable: the gain may neither rise nor fall without limit.']
      : []),
    ...(margin < 1
      ? [
          'The margin is downwards (negative in dB): the loop becomes unstable when its gain falls to this factor.',
        ]
      : []),
    ...(loop.delay > 0 ? [MORE_CROSSINGS] : []),
  ];
}

/**
 * The gain margin of a loop gain: the factor of the gain, nearest 1 in the logarithm, at which 1 + L gets a zero on the
 * imaginary axis. Infinite where there is none; none where the closed loop is not stable.
 *
 * Source: K. J. Åström, R. M. Murray, Feedback Systems, Princeton University Press, 2008, section 9.3.
 */
export function gainMargin(loopGain: NumericTransfer): Finding {
  return marginsOf(loopGain, (loop) => {
    const limits = gainLimits(loop);
    if (limits.length === 0)
      return notFound(
        'it is infinite: no factor of the gain brings the loop to its limit',
        Infinity,
      );
    return bound(limits, (margin) => Math.abs(Math.log(margin)), gainNotes(loop, limits));
  });
}

/** The angle from the negative real axis to L(jω), in (−π, π]. */
function angleToCritical(loop: DelayedRational, w: number): number {
  const value = transferAt(asTransfer(loop), w)!;
  return Math.atan2(-value.im, -value.re);
}

function angles(loop: DelayedRational): readonly Omit<Crossing, 'binding'>[] {
  return gainCrossings(loop).map((frequency) => ({
    frequency,
    margin: angleToCritical(loop, frequency),
  }));
}

const NO_CROSSING = 'its gain crosses 1 at no frequency';

/**
 * The phase margin of a loop gain in rad: of the angles between L(jω) and −1 where |L(jω)| = 1 the smallest in size;
 * negative where it is an advance that the loop does not bear. Infinite where the gain never is 1.
 *
 * Source: K. J. Åström, R. M. Murray, Feedback Systems, Princeton University Press, 2008, section 9.3.
 */
export function phaseMargin(loopGain: NumericTransfer): Finding {
  return marginsOf(loopGain, (loop) => {
    const crossings = angles(loop);
    if (crossings.length === 0) return notFound(`it is infinite: ${NO_CROSSING}`, Infinity);
    return bound(crossings, Math.abs, (margin) =>
      margin < 0
        ? ['The margin is negative in a stable loop: it is the phase advance that the loop bears.']
        : [],
    );
  });
}

/**
 * The delay margin of a loop gain in s: the smallest further dead time that brings the loop to its limit.
 *
 * Source: K. J. Åström, R. M. Murray, Feedback Systems, Princeton University Press, 2008, section 9.3.
 */
export function delayMargin(loopGain: NumericTransfer): Finding {
  return marginsOf(loopGain, (loop) => {
    const crossings = angles(loop).map(({ frequency, margin }) => ({
      frequency,
      margin: (margin < 0 ? margin + 2 * Math.PI : margin) / frequency,
    }));
    if (crossings.length === 0) return notFound(`it is infinite: ${NO_CROSSING}`, Infinity);
    return bound(
      crossings,
      (margin) => margin,
      () => [],
    );
  });
}

/** The highest angular frequency at which the gain of a loop is 1; every such frequency is a crossing. */
export function gainCrossover(loopGain: NumericTransfer): Finding {
  const loop = delayedRational(loopGain);
  if (!loop) return notFound(MANY_DELAYS);
  const frequencies = gainCrossings(loop);
  if (frequencies.length === 0) return notFound(NO_CROSSING);
  const highest = frequencies[frequencies.length - 1];
  return {
    ...found(highest),
    crossings: frequencies.map((frequency) => ({
      frequency,
      margin: loop.num.length === 0 ? NaN : angleToCritical(loop, frequency),
      binding: frequency === highest,
    })),
  };
}
