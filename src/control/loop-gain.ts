import { isZeroRatio, ratioOf, laplace, mulRatios, powRatio } from '../algebra/index.ts';
import type { Polynomial, Ratio } from '../algebra/index.ts';
import { isRefusal, refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import { certifyAtOrigin } from './certificate.ts';
import { ALWAYS } from './values.ts';
import type { FormulaValue, NoValue, RootsValue } from './values.ts';
import { noValue, plainValue } from './final-value.ts';
import { functionsOfS } from './s-polynomial.ts';
import { laurentAtZero, laurentCoefficient } from './series.ts';

const BASE = { when: ALWAYS, notes: [] };

/** The value of a ratio at s = 0; infinite where it has a pole there. */
export function dcGain(h: Ratio): FormulaValue | NoValue | Refusal {
  const lead = laurentAtZero(h, 1);
  if (isRefusal(lead)) return lead;
  if (lead && lead.order < 0) return noValue(BASE, 'infinite: a pole at s = 0');
  const value = laurentCoefficient(lead, 0);
  certifyAtOrigin(h, value);
  return plainValue(BASE, value);
}

/** The system type of a loop gain: the number of its poles at s = 0, in lowest terms. Refuses L = 0. */
export function systemType(loopGain: Ratio): { readonly type: number } | Refusal {
  if (isZeroRatio(loopGain))
    return refuse('zero-loop-gain', 'the loop gain is zero: it has no type');
  const lead = laurentAtZero(loopGain, 1);
  if (isRefusal(lead)) return lead;
  return { type: Math.max(0, -(lead?.order ?? 0)) };
}

export interface ErrorConstants {
  /** lim L(s) for s → 0. */
  readonly position: FormulaValue | NoValue;
  /** lim s L(s). */
  readonly velocity: FormulaValue | NoValue;
  /** lim s² L(s). */
  readonly acceleration: FormulaValue | NoValue;
}

/**
 * The error constants of a loop gain.
 * Source: G. F. Franklin, J. D. Powell, A. Emami-Naeini, Feedback Control of Dynamic Systems, 6th ed., Pearson, 2010,
 * section 4.2.
 */
export function errorConstants(loopGain: Ratio): ErrorConstants | Refusal {
  const constant = (power: number): FormulaValue | NoValue | Refusal =>
    dcGain(mulRatios(powRatio(ratioOf(laplace), power), loopGain));
  const [position, velocity, acceleration] = [constant(0), constant(1), constant(2)];
  if (isRefusal(position)) return position;
  if (isRefusal(velocity)) return velocity;
  if (isRefusal(acceleration)) return acceleration;
  return { position, velocity, acceleration };
}

function rootsOf(p: Polynomial, of: RootsValue['of'], other: Polynomial): RootsValue | Refusal {
  if (functionsOfS(p).length > 0 || functionsOfS(other).length > 0) {
    return refuse(
      'dead-time',
      `with dead time there are infinitely many ${of}; use rational_delay(Td, n)`,
    );
  }
  return Object.freeze({ kind: 'roots', when: ALWAYS, notes: [], of, polynomial: p });
}

/** The poles of a transfer function in lowest terms. Refuses dead time. */
export function polesOf(h: Ratio): RootsValue | Refusal {
  return rootsOf(h.den, 'poles', h.num);
}

/** The zeros of a transfer function in lowest terms. Refuses dead time and the zero function. */
export function zerosOf(h: Ratio): RootsValue | Refusal {
  if (isZeroRatio(h)) return refuse('zero-polynomial', 'the transfer function is zero everywhere');
  return rootsOf(h.num, 'zeros', h.den);
}
