import { polynomialRoots, type Complex } from '../numeric/index.ts';
import type { DelayedRational } from './frequency-polynomials.ts';

/** Poles and zeros away from 0, and what the phase starts from at low frequency. */
interface PhaseCurve {
  readonly start: number;
  readonly zeros: readonly Complex[];
  readonly poles: readonly Complex[];
  readonly delay: number;
}

const isAway = ({ re, im }: Complex): boolean => re !== 0 || im !== 0;

function lowest(coefficients: readonly number[]): { value: number; power: number } {
  const last = coefficients.findLastIndex((c) => c !== 0);
  return { value: coefficients[last], power: coefficients.length - 1 - last };
}

function phaseCurve({ num, den, delay }: DelayedRational): PhaseCurve {
  const [top, bottom] = [lowest(num), lowest(den)];
  const isNegative = top.value / bottom.value < 0;
  return {
    start: (isNegative ? -Math.PI : 0) + ((top.power - bottom.power) * Math.PI) / 2,
    zeros: polynomialRoots(num).filter(isAway),
    poles: polynomialRoots(den).filter(isAway),
    delay,
  };
}

/** How far the argument of jω − r has turned since ω = 0; a root on the axis counts as left of it. */
function turnOf({ re, im }: Complex, w: number): number {
  const side = re > 0 ? -1 : 1;
  const distance = Math.abs(re);
  if (distance === 0)
    return (w > im ? Math.PI / 2 : -Math.PI / 2) + (im > 0 ? 1 : -1) * (Math.PI / 2);
  return side * (Math.atan((w - im) / distance) + Math.atan(im / distance));
}

function phaseOn({ start, zeros, poles, delay }: PhaseCurve, w: number): number {
  const sum = (roots: readonly Complex[]): number =>
    roots.reduce((total, root) => total + turnOf(root, w), 0);
  return start + sum(zeros) - sum(poles) - w * delay;
}

/**
 * The phase of N(jω)/D(jω) e^(−jω delay) in rad, unwrapped from low frequency, where a negative gain starts at −π; poles
 * and zeros on the imaginary axis are passed as if they lay left of it.
 */
export function unwrappedPhase(transfer: DelayedRational, w: number): number {
  return phaseOn(phaseCurve(transfer), w);
}

/** Frequencies close enough that the phase between two of them is nearly straight. */
function* gridFor({ zeros, poles, delay }: PhaseCurve): Generator<number> {
  const roots = [...zeros, ...poles];
  const sizes = [...roots.map(({ re, im }) => Math.hypot(re, im)), 1 / delay];
  let w = Math.min(...sizes) * 1e-2;
  for (let k = 0; k < MOST_STEPS; k++) {
    yield w;
    const near = roots.map(
      ({ re, im }) => Math.max(Math.hypot(re, w - Math.abs(im)), 1e-9 * w) / 3,
    );
    w += Math.min(w / 10, 0.5 / delay, ...near);
  }
}

const MOST_STEPS = 100_000;

function crossingBetween(curve: PhaseCurve, level: number, from: number, to: number): number {
  let [low, high] = [from, to];
  const rises = phaseOn(curve, high) > level;
  for (let k = 0; k < 100; k++) {
    const middle = low + (high - low) / 2;
    if (middle <= low || middle >= high) break;
    if (phaseOn(curve, middle) > level === rises) high = middle;
    else low = middle;
  }
  return high;
}

/** The lowest angular frequencies at which the phase is an odd multiple of π, for a loop with dead time. */
export function phaseCrossingsWithDelay(loop: DelayedRational, most: number): readonly number[] {
  const curve = phaseCurve(loop);
  const crossings: number[] = [];
  let before: readonly [number, number] | null = null;
  for (const w of gridFor(curve)) {
    const phase = phaseOn(curve, w);
    if (before) {
      for (const level of oddMultiplesBetween(before[1], phase))
        crossings.push(crossingBetween(curve, level, before[0], w));
    }
    if (crossings.length >= most) break;
    before = [w, phase];
  }
  return crossings.slice(0, most);
}

/** The odd multiples of π in the half-open interval from one phase to another, in the order met. */
function oddMultiplesBetween(from: number, to: number): readonly number[] {
  const [low, high] = [Math.min(from, to), Math.max(from, to)];
  const levels: number[] = [];
  for (let k = 2 * Math.ceil((low / Math.PI - 1) / 2) + 1; k * Math.PI < high; k += 2)
    levels.push(k * Math.PI);
  return to < from ? levels.reverse() : levels;
}
