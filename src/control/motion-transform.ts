import {
  addRatios,
  applyFunction,
  laplace,
  mulRatios,
  negRatio,
  ratioOf,
  zeroRatio,
  type Ratio,
  type SignOf,
} from '../algebra/index.ts';
import { isRefusal, type Budget, type Refusal } from '../base/index.ts';
import { finalValue } from './final-value.ts';
import type { Condition, NoValue, SignalValue } from './values.ts';

/** The transform of what moves a signal, its random part left out, with what must hold for it to settle. */
export interface MotionTransform {
  readonly transform: Ratio;
  readonly when: Condition;
  readonly notes: readonly string[];
}

/** Σ Xᵢ(s) e^(−s afterᵢ) of a signal that settles, its random part left out; the reason where it does not settle. */
export function motionTransform(
  x: SignalValue,
  signOf: SignOf,
  budget?: Budget,
): MotionTransform | NoValue | Refusal {
  const terms = x.terms.filter((term) => term.source !== 'random');
  const final = finalValue({ ...x, terms }, signOf, budget);
  if (final.kind === 'none') return final;
  let transform = zeroRatio;
  for (const term of terms) {
    const late = applyFunction('exp', [negRatio(mulRatios(term.after, ratioOf(laplace)))], budget);
    if (isRefusal(late)) return late;
    transform = addRatios(transform, mulRatios(term.transform, late, budget), budget);
  }
  const notes = terms.length < x.terms.length ? ['The random part is left out.'] : [];
  return { transform, when: final.when, notes };
}
