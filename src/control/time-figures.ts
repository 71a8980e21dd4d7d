import { found, notFound, type Finding } from './finding.ts';
import { numberOf, type NumericTransfer } from './frequency-polynomials.ts';
import { modesOf, motionAt, type Mode } from './modes.ts';

/** A signal that settles: its modes, its final value, and places between which it is monotone. */
interface Motion {
  readonly modes: readonly Mode[];
  readonly final: number;
  /** Ascending times from 0: beginnings of sources and the turns of the signal, with points between. */
  readonly times: readonly number[];
  readonly values: readonly number[];
}

/** A time at which an amplitude is no more than this part of its largest is beyond the interest of any figure. */
const REST = 1e-9;
const MOST_TIMES = 400_000;

/** The signal as a motion that settles, or why it has no figures. */
function motionOf({ num, den }: NumericTransfer): Motion | string {
  const below = den.filter(({ coefficients }) => coefficients.some((c) => c !== 0));
  if (below.length !== 1)
    return 'dead time in a loop leaves no closed form in time; use rational_delay(Td, n)';
  const [{ coefficients, delay }] = below;
  const bottom = coefficients.slice(coefficients.findIndex((c) => c !== 0));
  const terms = num.map((term) => ({ ...term, delay: term.delay - delay }));
  const isFinite = [...bottom, ...terms.flatMap((t) => [...t.coefficients, t.delay])];
  if (!isFinite.every(Number.isFinite)) return 'a coefficient of the signal has no value';
  const modes = modesOf(terms, bottom);
  if (!modes) return 'the signal contains an impulse';
  const lasting = modes.find((mode) => !decays(mode) && !isConstant(mode));
  if (lasting) return lastingReason(lasting);
  const final = modes.filter(isConstant).reduce((sum, { coefficient }) => sum + coefficient.re, 0);
  return withTimes(modes, final);
}

const ON_AXIS = 1e-10;

function decays({ root }: Mode): boolean {
  return root.re < -ON_AXIS * Math.hypot(root.re, root.im);
}

function isConstant({ root, power }: Mode): boolean {
  return root.re === 0 && root.im === 0 && power === 0;
}

function lastingReason({ root, power }: Mode): string {
  if (root.re === 0 && root.im === 0) return `the signal grows without bound, as t^${power}`;
  return root.re > ON_AXIS * Math.hypot(root.re, root.im)
    ? 'the signal grows without bound: a pole lies in the right half plane'
    : 'the signal keeps oscillating: a pole lies on the imaginary axis';
}

/** How long a mode matters, from its beginning: until it is a negligible part of the largest. */
function lifeOf({ coefficient, power, root }: Mode, largest: number): number {
  const size = Math.hypot(coefficient.re, coefficient.im);
  let life = 0;
  for (let k = 0; k < 8; k++) {
    const needed = (size * Math.max(life, 1e-300) ** power) / (REST * largest);
    life = Math.max(0, Math.log(Math.max(needed, Math.E ** (power + 1)))) / -root.re;
  }
  return life;
}

/** Times that follow each mode over its life, in steps of a small part of a radian and of a time constant. */
function gridOf(modes: readonly Mode[]): number[] {
  const moving = modes.filter(decays);
  const scale = Math.min(...moving.map(({ root }) => Math.hypot(root.re, root.im)));
  const size = ({ coefficient: c, power }: Mode): number => Math.hypot(c.re, c.im) / scale ** power;
  const largest = Math.max(...modes.map(size), Number.MIN_VALUE);
  const times = new Set<number>([0, ...modes.map(({ after }) => after)]);
  for (const mode of moving) {
    const step = 0.15 / Math.hypot(mode.root.re, mode.root.im);
    const life = lifeOf(mode, largest);
    const count = Math.min(Math.ceil(life / step), MOST_TIMES);
    for (let k = 1; k <= count; k++) times.add(mode.after + k * step);
  }
  return [...times].filter((t) => t >= 0).sort((a, b) => a - b);
}

/** The place between two times at which a function changes its sign, by halving. */
function changeBetween(f: (t: number) => number, from: number, to: number): number {
  let [low, high] = [from, to];
  const rises = f(high) > 0;
  for (let k = 0; k < 200; k++) {
    const middle = low + (high - low) / 2;
    if (middle <= low || middle >= high) break;
    if (f(middle) > 0 === rises) high = middle;
    else low = middle;
  }
  return high;
}

function withTimes(modes: readonly Mode[], final: number): Motion {
  const grid = gridOf(modes);
  const slope = (t: number): number => motionAt(modes, t, 1);
  const starts = new Set(modes.map(({ after }) => after));
  const times: number[] = [];
  let before = slope(grid[0]);
  grid.forEach((t, k) => {
    const here = slope(t);
    if (k > 0 && before * here < 0 && !starts.has(t))
      times.push(changeBetween(slope, grid[k - 1], t));
    times.push(t);
    before = here;
  });
  return { modes, final, times, values: times.map((t) => motionAt(modes, t)) };
}

/** The answer from a signal that settles, or the reason why it does not. */
function ofMotion(signal: NumericTransfer, find: (motion: Motion) => Finding): Finding {
  const motion = motionOf(signal);
  return typeof motion === 'string' ? notFound(motion) : find(motion);
}

function largest({ times, values }: Motion, size: (value: number) => number) {
  let best = 0;
  values.forEach((value, k) => {
    if (size(value) > size(values[best])) best = k;
  });
  return { time: times[best], value: values[best] };
}

/** More than its final value by so little, a signal only approaches it. */
const APPROACH = 1e-8;

/** The largest magnitude of a signal; of one that only approaches its final value, that value. */
export function peakOf(signal: NumericTransfer): Finding {
  return ofMotion(signal, (motion) => {
    const peak = Math.abs(largest(motion, Math.abs).value);
    const end = Math.abs(motion.final);
    if (peak > end * (1 + APPROACH)) return found(peak);
    return found(end, end === 0 ? [] : ['The largest magnitude is that of the final value.']);
  });
}

/** The time of the largest magnitude. */
export function peakTimeOf(signal: NumericTransfer): Finding {
  return ofMotion(signal, (motion) => {
    const { time, value } = largest(motion, Math.abs);
    return Math.abs(value) > Math.abs(motion.final) * (1 + APPROACH)
      ? found(time)
      : notFound('the magnitude nowhere exceeds that of the final value, so that there is no peak');
  });
}

const NO_FINAL = 'its final value is 0, so that there is nothing to relate it to';

/** How far a signal goes beyond its final value, relative to it; 0 where it does not. */
export function overshootOf(signal: NumericTransfer): Finding {
  return ofMotion(signal, (motion) => {
    const { final } = motion;
    if (isNothing(final, motion)) return notFound(NO_FINAL);
    const { value } = largest(motion, (y) => y * Math.sign(final));
    const excess = value / final - 1;
    return found(excess > APPROACH ? excess : 0);
  });
}

/** Whether a final value is 0 beside the motion. */
function isNothing(final: number, motion: Motion): boolean {
  return Math.abs(final) <= 1e-12 * Math.abs(largest(motion, Math.abs).value);
}

/** The first time at which a signal reaches a value. */
function firstTimeAt({ modes, times, values }: Motion, level: number): number {
  const distance = (t: number): number => motionAt(modes, t) / level - 1;
  const index = values.findIndex((value) => value / level >= 1);
  if (index <= 0) return index < 0 ? Infinity : 0;
  const isJump = distance(times[index - 1]) < 0 && modes.some((m) => m.after === times[index]);
  return isJump
    ? justBefore(distance, times, index)
    : changeBetween(distance, times[index - 1], times[index]);
}

/** At a time at which a source begins the signal may jump; until then it is what it was. */
function justBefore(f: (t: number) => number, times: readonly number[], index: number): number {
  const [from, to] = [times[index - 1], times[index]];
  const earlier = to - (to - from) * 1e-12;
  return f(earlier) > 0 ? changeBetween(f, from, earlier) : to;
}

/** The time from 10 % to 90 % of the final value, each when first reached. */
export function riseTimeOf(signal: NumericTransfer): Finding {
  return ofMotion(signal, (motion) => {
    const { final } = motion;
    if (isNothing(final, motion)) return notFound(NO_FINAL);
    return found(firstTimeAt(motion, 0.9 * final) - firstTimeAt(motion, 0.1 * final));
  });
}

/**
 * The last entry into a band about the final value: `band` is relative to it, or (where `isRelative` is given as 0) a distance in
 * the unit of the signal.
 */
export function settlingTimeOf(
  signal: NumericTransfer,
  band: NumericTransfer,
  isRelative?: NumericTransfer,
): Finding {
  return ofMotion(signal, (motion) => {
    const { final, modes, times, values } = motion;
    const relative = !isRelative || numberOf(isRelative) !== 0;
    if (relative && isNothing(final, motion))
      return notFound('its final value is 0; give the band as a quantity, such as 0.1 mrad');
    const width = numberOf(band) * (relative ? Math.abs(final) : 1);
    if (!(width > 0)) return notFound('the band must be above 0');
    const outside = (t: number): number => Math.abs(motionAt(modes, t) - final) - width;
    const last = values.findLastIndex((value) => Math.abs(value - final) > width);
    if (last < 0) return found(0);
    if (last === times.length - 1)
      return notFound('the band is too narrow to tell when it is entered');
    const next = times[last + 1];
    return modes.some(({ after }) => after === next)
      ? found(justBefore((t) => -outside(t), times, last + 1))
      : found(changeBetween(outside, times[last], next));
  });
}
