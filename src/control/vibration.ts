import {
  addRatios,
  dependsOn,
  divRatios,
  equalRatios,
  isZeroRatio,
  laplace,
  mulRatios,
  pi,
  powRatio,
  ratioFromRational,
  ratioOf,
  rational,
  subRatios,
  symbolsOfRatio,
  zeroRatio,
} from '../algebra/index.ts';
import type { Ratio, SignOf } from '../algebra/index.ts';
import { isRefusal, refuse, type Budget, type Refusal } from '../base/index.ts';
import { allOf, compare } from './conditions.ts';
import { listed, noValue, plainValue, settledUnder } from './final-value.ts';
import {
  addPoints,
  atFrequency,
  delayPoint,
  mulPoints,
  squaredSize,
  ZERO_POINT,
  type ComplexRatio,
} from './frequency-point.ts';
import { rootOfSquare } from './magnitude.ts';
import { stable } from './stability.ts';
import type { Condition, FormulaValue, NoValue, SignalTerm, SignalValue } from './values.ts';

/** The sines of one frequency that act on a signal. */
export interface Line {
  readonly frequency: Ratio;
  readonly terms: readonly SignalTerm[];
}

/** The periodic shares of a signal by the frequency of their line. */
export function linesOf(x: SignalValue): readonly Line[] {
  const lines: { frequency: Ratio; terms: SignalTerm[] }[] = [];
  for (const term of x.terms) {
    if (!term.frequency) continue;
    const line = lines.find(({ frequency }) => equalRatios(frequency, term.frequency!));
    if (line) line.terms.push(term);
    else lines.push({ frequency: term.frequency, terms: [term] });
  }
  return lines;
}

/** A formula taken as a transform has no sources: whatever line it holds at this frequency is in its poles. */
function withFormulaLine(x: SignalValue, frequency: Ratio): SignalValue {
  const terms = x.terms.map((term) => (term.input === '' ? { ...term, frequency } : term));
  return { ...x, terms };
}

/** The transform of a line of unit amplitude: ω/(s² + ω²). */
export function lineTransform(frequency: Ratio): Ratio {
  const square = (r: Ratio): Ratio => powRatio(r, 2);
  return divRatios(frequency, addRatios(square(ratioOf(laplace)), square(frequency)));
}

/** The phasor of a share at its line's frequency: what is left of its transform without the line, at s = jω. */
function phasorOf(term: SignalTerm, frequency: Ratio): ComplexRatio | Refusal {
  const path = divRatios(term.transform, lineTransform(frequency));
  const phasor = atFrequency(path, frequency);
  if (isRefusal(phasor) || isZeroRatio(term.after)) return phasor;
  const turn = delayPoint(frequency, term.after);
  return isRefusal(turn) ? turn : mulPoints(phasor, turn);
}

/** The squared amplitude of a line; refused where the line falls on a mode that does not decay. */
export function squaredAmplitude({ frequency, terms }: Line): Ratio | Refusal {
  const active = terms.filter((term) => !isZeroRatio(term.transform));
  const [first] = active;
  const isTogether = active.every((term) => equalRatios(term.after, first.after));
  let sum = ZERO_POINT;
  for (const term of active) {
    const phasor = phasorOf(isTogether ? { ...term, after: zeroRatio } : term, frequency);
    if (isRefusal(phasor)) return phasor.code === 'pole' ? resonance(term) : phasor;
    sum = addPoints(sum, phasor);
  }
  return squaredSize(sum);
}

function resonance({ input }: SignalTerm): Refusal {
  return refuse(
    'resonance',
    `the line at ${input} falls on a mode that does not decay: the amplitude grows without bound`,
  );
}

/** Two frequencies with symbols in them differ only where their values do; null where they are equal. */
export function distinct(a: Ratio, b: Ratio): Condition | null {
  if (equalRatios(a, b)) return null;
  const isNumeric = symbolsOfRatio(subRatios(a, b)).length === 0;
  return isNumeric ? allOf([]) : compare(a, '!=', b);
}

/** What must decay for the lines of a signal to be steady, or why they never are. */
export function steadyUnder(
  x: SignalValue,
  terms: readonly SignalTerm[],
  signOf: SignOf,
  budget?: Budget,
): Condition | { readonly reason: string } {
  const paths = terms.map((term): SignalTerm =>
    term.frequency
      ? { ...term, transform: divRatios(term.transform, lineTransform(term.frequency)) }
      : term,
  );
  const settled = settledUnder({ ...x, terms: paths }, signOf, budget);
  return 'reason' in settled ? settled : stable(settled.open);
}

/** Words for frequencies, as they are written. */
type Write = (r: Ratio) => string;

/**
 * The amplitude of the sines of one frequency in a signal, once what starts it has decayed.
 *
 * `frequency`: ω in rad/s. In symbols, with the magnitudes of what has no known sign; a controller that holds the line's
 * poles gives exactly 0. No value where a mode does not decay. Refused as `which-line` where it is not certain which of
 * the lines is meant.
 * Source: K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, section 7-1 (from memory).
 */
export function amplitudeOf(
  x: SignalValue,
  frequency: Ratio,
  { signOf, write, budget }: { signOf: SignOf; write: Write; budget?: Budget },
): FormulaValue | NoValue | Refusal {
  const lines = linesOf(withFormulaLine(x, frequency));
  const line = lines.find((one) => equalRatios(one.frequency, frequency));
  const others = lines.filter((one) => one !== line);
  const apart = others.map((one) => distinct(one.frequency, frequency)!);
  if (!line) return withoutLine(x, lines, allOf(apart), write);
  const steady = steadyUnder(x, line.terms, signOf, budget);
  if ('reason' in steady) return noValue(x, steady.reason);
  const square = squaredAmplitude(line);
  if (isRefusal(square)) return square.code === 'resonance' ? noValue(x, square.reason) : square;
  const base = { when: allOf([x.when, steady, ...apart]), notes: x.notes };
  return plainValue(base, rootOfSquare(square, signOf, budget));
}

/** No sine has this frequency for certain: 0 if all others surely have another one. */
function withoutLine(
  x: SignalValue,
  lines: readonly Line[],
  apart: Condition,
  write: Write,
): FormulaValue | Refusal {
  const places = listed(lines.map((line) => frequencyText(line.frequency, write)));
  if (apart.kind !== 'truth') {
    return refuse(
      'which-line',
      `${x.name} has lines at ${places}; write the frequency as the source does, so that it is certain which one is meant`,
    );
  }
  const note =
    lines.length === 0
      ? `No sine acts on ${x.name}.`
      : `No sine at this frequency acts on ${x.name}; its lines are at ${places}.`;
  return plainValue({ when: x.when, notes: [...x.notes, note] }, zeroRatio);
}

const TURN = mulRatios(ratioFromRational(rational(2n)), ratioOf(pi));

/** `f1` or `2 Hz` where that is short, otherwise the angular frequency. */
function frequencyText(frequency: Ratio, write: Write): string {
  const cyclic = divRatios(frequency, TURN);
  if (dependsOn(cyclic, pi)) return `${write(frequency)} rad/s`;
  return symbolsOfRatio(cyclic).length > 0 ? write(cyclic) : `${write(cyclic)} Hz`;
}
