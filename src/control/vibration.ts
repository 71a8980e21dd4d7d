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
import { allOf, compare, FALSE, TRUE } from './conditions.ts';
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

/** One turn, 2 π rad. */
export const TURN: Ratio = mulRatios(ratioFromRational(rational(2n)), ratioOf(pi));

/** What is known of the symbols in a signal. */
export interface Knowledge {
  readonly signOf: SignOf;
  /** A formula with every derived parameter opened: `w1 = 2 pi f1` is then the same frequency as f1. */
  readonly open: (r: Ratio) => Ratio;
  readonly budget?: Budget;
}

/** The sines of one frequency that act on a signal. */
export interface Line {
  readonly frequency: Ratio;
  readonly terms: readonly SignalTerm[];
}

/** The periodic shares of a signal by the frequency of their line. */
export function linesOf(x: SignalValue, { open }: Knowledge): readonly Line[] {
  const lines: { frequency: Ratio; terms: SignalTerm[] }[] = [];
  for (const term of x.terms) {
    if (!term.frequency) continue;
    const line = lines.find(({ frequency }) => areSame(frequency, term.frequency!, open));
    if (line) line.terms.push(term);
    else lines.push({ frequency: term.frequency, terms: [term] });
  }
  return lines;
}

function areSame(a: Ratio, b: Ratio, open: Knowledge['open']): boolean {
  return equalRatios(a, b) || equalRatios(open(a), open(b));
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

/** The squared amplitude of a line; refused as `resonance` where the line falls on a mode that does not decay. */
export function squaredAmplitude({ frequency, terms }: Line, { open }: Knowledge): Ratio | Refusal {
  const [first] = terms;
  const isTogether = terms.every((term) => equalRatios(term.after, first.after));
  let sum = ZERO_POINT;
  for (const term of terms) {
    const phasor = phasorOf(isTogether ? { ...term, after: zeroRatio } : term, frequency);
    if (isRefusal(phasor)) return phasor.code === 'pole' ? resonance(term) : phasor;
    sum = addPoints(sum, phasor);
  }
  const square = squaredSize(sum);
  return isZeroRatio(square) || isZeroRatio(open(square)) ? zeroRatio : square;
}

function resonance({ input }: SignalTerm): Refusal {
  return refuse(
    'resonance',
    `the line at ${input} falls on a mode that does not decay: the amplitude grows without bound`,
  );
}

/** That two frequencies differ, where only their values can tell; false if they are the same. */
export function apart(a: Ratio, b: Ratio, { open }: Knowledge): Condition {
  const [one, other] = [open(a), open(b)];
  if (equalRatios(one, other)) return FALSE;
  const isNumeric = symbolsOfRatio(subRatios(one, other)).length === 0;
  return isNumeric ? TRUE : compare(divRatios(a, TURN), '!=', divRatios(b, TURN));
}

/** What must decay for the lines of a signal to be steady, or why they never are. */
export function steadyUnder(
  x: SignalValue,
  terms: readonly SignalTerm[],
  { signOf, budget }: Knowledge,
): Condition | { readonly reason: string } {
  const paths = terms.map((term): SignalTerm =>
    term.frequency
      ? {
          ...term,
          source: 'impulsive',
          transform: divRatios(term.transform, lineTransform(term.frequency)),
        }
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
  known: Knowledge,
  write: Write,
): FormulaValue | NoValue | Refusal {
  const lines = linesOf(withFormulaLine(x, frequency), known);
  const line = lines.find((one) => areSame(one.frequency, frequency, known.open));
  const others = allOf(
    lines.filter((one) => one !== line).map((one) => apart(one.frequency, frequency, known)),
  );
  if (!line) return withoutLine(x, lines, others, write);
  const steady = steadyUnder(x, line.terms, known);
  if ('reason' in steady) return noValue(x, steady.reason);
  const square = squaredAmplitude(line, known);
  if (isRefusal(square)) return square.code === 'resonance' ? noValue(x, square.reason) : square;
  const base = { when: allOf([x.when, steady, others]), notes: x.notes };
  return plainValue(base, rootOfSquare(square, known.signOf, known.budget));
}

/** No sine has this frequency for certain: 0 if all others surely have another one. */
function withoutLine(
  x: SignalValue,
  lines: readonly Line[],
  others: Condition,
  write: Write,
): FormulaValue | Refusal {
  const places = listed(lines.map((line) => frequencyText(line.frequency, write)));
  if (others.kind !== 'truth') {
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

/** `f1` or `2 Hz` where that is short, otherwise the angular frequency. */
function frequencyText(frequency: Ratio, write: Write): string {
  const cyclic = divRatios(frequency, TURN);
  if (dependsOn(cyclic, pi)) return `${write(frequency)} rad/s`;
  return symbolsOfRatio(cyclic).length > 0 ? write(cyclic) : `${write(cyclic)} Hz`;
}
