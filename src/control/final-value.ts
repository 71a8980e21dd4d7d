import { addRatios, isZeroRatio, mulRatios, zeroRatio } from '../algebra/index.ts';
import type { Ratio } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import type { Budget, Refusal } from '../base/index.ts';
import { certifyFinalValue } from './certificate.ts';
import { allOf } from './conditions.ts';
import type { SignOf } from '../algebra/index.ts';
import { powerOfS } from './s-polynomial.ts';
import { delaySeries, laurentAtZero, laurentCoefficient } from './series.ts';
import { stable } from './stability.ts';
import { judgeStability, settlingOf } from './steadiness.ts';
import type { Settling } from './steadiness.ts';
import type {
  Condition,
  FormulaValue,
  NoValue,
  SignalTerm,
  SignalValue,
  StabilityBlock,
} from './values.ts';

type Base = Pick<SignalValue, 'when' | 'notes'>;

/** A value that does not exist, with the reason in words. */
export function noValue(base: Base, reason: string, growth: NoValue['growth'] = null): NoValue {
  return Object.freeze({ kind: 'none', when: base.when, notes: base.notes, reason, growth });
}

/** A value without s, under the conditions given. */
export function plainValue(base: Base, ratio: Ratio): FormulaValue {
  const { when, notes } = base;
  return Object.freeze({ kind: 'formula', when, notes, ratio, hidden: null, origin: 'formula' });
}

/** Names joined as in a sentence. */
export function listed(names: readonly string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;
}

function unsettledReason(part: Settling, words: string): string {
  if (!part.term) return `the part of the loop with ${listed(part.signals)} has ${words}`;
  if (part.term.source === 'periodic') return `the sine in ${part.term.input} keeps it moving`;
  const name = part.term.input === '' ? 'the transform' : `what acts at ${part.term.input}`;
  return `${name} has ${words}`;
}

/** Why a signal can never settle, as far as that is known without numbers; else what must be stable. */
export function settledUnder(
  x: SignalValue,
  signOf: SignOf,
  budget?: Budget,
): { readonly reason: string } | { readonly open: readonly StabilityBlock[] } {
  const open: StabilityBlock[] = [];
  for (const part of settlingOf(x, budget)) {
    const verdict = judgeStability(part.polynomial, signOf, budget);
    if (verdict.kind === 'unstable') return { reason: unsettledReason(part, verdict.words) };
    if (verdict.kind === 'open') open.push({ signals: part.signals, polynomial: part.polynomial });
  }
  return { open };
}

/** Σ Xᵢ(s) e^(−s afterᵢ) at s = 0: the coefficients of 1/s, 1/s², …, index 0 for 1/s. */
function polarPart(terms: readonly SignalTerm[]): readonly Ratio[] | Refusal {
  const polar: Ratio[] = [zeroRatio];
  for (const term of terms) {
    const lead = laurentAtZero(term.transform, 1);
    if (isRefusal(lead)) return lead;
    const order = lead ? -lead.order : 0;
    if (order < 1) continue;
    const series = laurentAtZero(term.transform, order);
    if (isRefusal(series)) return series;
    const delay = delaySeries(term.after, order);
    for (let power = 1; power <= order; power++) {
      for (let k = 0; power + k <= order; k++) {
        const product = mulRatios(delay[k], laurentCoefficient(series, -power - k));
        polar[power - 1] = addRatios(polar[power - 1] ?? zeroRatio, product);
      }
    }
  }
  return polar;
}

const SOURCE_POLES: Readonly<Record<SignalTerm['source'], number>> = {
  constant: 1,
  drifting: 3,
  impulsive: 0,
  periodic: 0,
  random: 0,
  initial: 0,
};

/** How many poles at s = 0 of the loop show in a term: those beyond its source's own. */
function visibleAtOrigin(term: SignalTerm): number {
  return Math.max(0, powerOfS(term.transform.den) - SOURCE_POLES[term.source]);
}

/** The block that holds a mode at s = 0 which the signal does not show; null if there is none. */
function hiddenAtOrigin(x: SignalValue): StabilityBlock | null {
  const atOrigin = x.blocks.filter((b) => powerOfS(b.polynomial) > 0);
  const present = atOrigin.reduce((sum, b) => sum + powerOfS(b.polynomial), 0);
  const visible = x.terms.reduce((most, term) => Math.max(most, visibleAtOrigin(term)), 0);
  return present > visible ? atOrigin[atOrigin.length - 1] : null;
}

function growthReason(power: number): string {
  return `grows without bound, as t${power > 1 ? `^${power}` : ''}`;
}

function valueAtOrigin(x: SignalValue, when: Condition): FormulaValue | NoValue {
  const base = { when, notes: x.notes };
  const polar = polarPart(x.terms);
  if (isRefusal(polar)) return noValue(base, polar.reason);
  const power = polar.findLastIndex((c, i) => i > 0 && !isZeroRatio(c));
  if (power > 0) return noValue(base, growthReason(power), { rate: polar[power], power });
  const hidden = hiddenAtOrigin(x);
  if (hidden) {
    return noValue(
      base,
      `the part of the loop with ${listed(hidden.signals)} hides a mode at s = 0, which does not decay`,
    );
  }
  certifyFinalValue(x.terms, polar[0]);
  return plainValue(base, polar[0]);
}

/**
 * The final value of a signal, after the question whether it exists.
 *
 * Every block that the signal depends on is judged uncancelled, and so are poles that only the sources bring. What
 * numbers and signs leave open becomes the condition `when` of the value. Poles at s = 0 are counted in s X(s), with
 * e^(−s after) expanded as far as they need: more than one means growth, `rate · t^power / power!`.
 * Source: G. F. Franklin, J. D. Powell, A. Emami-Naeini, Feedback Control of Dynamic Systems, 6th ed., Pearson, 2010,
 * section 3.1.6 (from memory).
 */
export function finalValue(
  x: SignalValue,
  signOf: SignOf,
  budget?: Budget,
): FormulaValue | NoValue {
  const active = x.terms.filter((term) => !isZeroRatio(term.transform));
  const random = active.find((term) => term.source === 'random');
  if (random) {
    return noValue(x, `the noise in ${random.input} keeps it moving; constant(…) leaves it out`);
  }
  const signal = { ...x, terms: active };
  const settled = settledUnder(signal, signOf, budget);
  if ('reason' in settled) return noValue(x, settled.reason);
  return valueAtOrigin(signal, allOf([x.when, stable(settled.open)]));
}
