import {
  addRatios,
  applyFunction,
  divRatios,
  isZeroRatio,
  mulRatios,
  oneRatio,
  ratioFromRational,
  rational,
  subRatios,
  zeroRatio,
} from '../algebra/index.ts';
import type { Ratio } from '../algebra/index.ts';
import { invariant, isRefusal, type Refusal } from '../base/index.ts';
import { allOf } from './conditions.ts';
import { finalValue, noValue, plainValue } from './final-value.ts';
import { rootOfSquare } from './magnitude.ts';
import { varianceOf, type Band } from './random-part.ts';
import type { Condition, FormulaValue, NoValue, SignalValue } from './values.ts';
import {
  apart,
  linesOf,
  squaredAmplitude,
  steadyUnder,
  TURN,
  type Knowledge,
} from './vibration.ts';

const HALF = ratioFromRational(rational(1n, 2n));

/** The mean square of the sines in a signal, under the conditions that they are steady and of different frequencies. */
function periodicSquare(
  x: SignalValue,
  known: Knowledge,
  band?: Band,
): FormulaValue | NoValue | Refusal {
  const lines = linesOf(x, known);
  const conditions: Condition[] = [x.when];
  let sum = zeroRatio;
  for (const [index, line] of lines.entries()) {
    const steady = steadyUnder(x, line.terms, known);
    if ('reason' in steady) return noValue(x, steady.reason);
    const square = squaredAmplitude(line, known);
    if (isRefusal(square)) return square.code === 'resonance' ? noValue(x, square.reason) : square;
    const share = band ? mulRatios(square, insideBand(line.frequency, band, known)) : square;
    sum = addRatios(sum, mulRatios(HALF, share), known.budget);
    const before = lines.slice(0, index);
    conditions.push(steady, ...before.map((one) => apart(one.frequency, line.frequency, known)));
  }
  return plainValue({ when: allOf(conditions), notes: x.notes }, sum);
}

/** 1 for a frequency (in rad/s) inside a band, 0 outside; without a value on an edge that only numbers put it on. */
function insideBand(frequency: Ratio, { from, to }: Band, { open }: Knowledge): Ratio {
  const cyclic = divRatios(frequency, TURN);
  return [subRatios(cyclic, from), subRatios(to, cyclic)]
    .map((above) => stepOf(open(above), above))
    .reduce((a, b) => mulRatios(a, b));
}

/** (1 + x/|x|)/2, or 1 where x is 0 for all values. */
function stepOf(opened: Ratio, x: Ratio): Ratio {
  if (isZeroRatio(opened)) return oneRatio;
  const size = applyFunction('abs', [x]);
  invariant(!isRefusal(size), 'a magnitude that does not exist');
  return mulRatios(HALF, addRatios(oneRatio, divRatios(x, size)));
}

/** The shares of a signal that are neither random nor periodic. */
function steadyPart(x: SignalValue): SignalValue {
  return { ...x, terms: x.terms.filter((term) => !term.noise && !term.frequency) };
}

/**
 * The root mean square of the random and periodic parts of a signal, in the long run.
 *
 * Constant parts do not count, which is said. No value where the signal drifts, or where `varianceOf` or `amplitudeOf` has
 * none. Within a `band` only the noise and the sines in it count.
 */
export function rmsOf(
  x: SignalValue,
  known: Knowledge,
  band?: Band,
): FormulaValue | NoValue | Refusal {
  const rest = finalValue(steadyPart(x), known.signOf, known.budget);
  if (rest.kind === 'none') return noValue(x, `${x.name} drifts: ${rest.reason}`);
  const variance = varianceOf(x, known, band);
  if (variance.kind === 'none') return variance;
  const periodic = periodicSquare(x, known, band);
  if (isRefusal(periodic) || periodic.kind === 'none') return periodic;
  const square = addRatios(variance.ratio, periodic.ratio, known.budget);
  const left = isZeroRatio(rest.ratio) ? [] : ['The constant part is not counted.'];
  const isSilent = !x.terms.some((term) => term.noise) && !isZeroRatio(periodic.ratio);
  const notes = [...(isSilent ? x.notes : variance.notes), ...left];
  const when = allOf([variance.when, periodic.when, rest.when]);
  return plainValue({ when, notes }, rootOfSquare(square, known.signOf, known.budget));
}
