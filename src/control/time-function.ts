import {
  addRatios,
  divRatios,
  isZeroRatio,
  mulRatios,
  negRatio,
  ratioFromRational,
  ratioKey,
  rational,
} from '../algebra/index.ts';
import type { Ratio } from '../algebra/index.ts';

/** What a term of a response oscillates with. */
export type Wave = 'none' | 'cos' | 'sin';

/**
 * One term of a time response: coefficient · t^power · e^(rate t) · wave(frequency t), counted from t = after on and
 * zero before. Amounts are exact ratios, or numbers where the exact form needs roots of degree above 2.
 */
export interface ResponseTerm<Amount> {
  readonly coefficient: Amount;
  readonly power: number;
  readonly rate: Amount;
  readonly frequency: Amount;
  readonly wave: Wave;
  readonly after: Ratio;
}

/** An impulse of some order in a response: coefficient · δ^(order)(t − after). */
export interface ResponseImpulse {
  readonly coefficient: Ratio;
  readonly order: number;
  readonly after: Ratio;
}

/** A term of the family below, before damping and delay: coefficient · t^power · wave. */
export interface PlainTerm {
  readonly coefficient: Ratio;
  readonly power: number;
  readonly wave: 'cos' | 'sin' | 'rising' | 'falling';
}

const number = (n: number): Ratio => ratioFromRational(rational(n));

function scaled(terms: readonly PlainTerm[], factor: Ratio): PlainTerm[] {
  return terms.map((t) => ({ ...t, coefficient: mulRatios(t.coefficient, factor) }));
}

/** Equal powers and waves added up, zeros dropped. */
export function gathered(terms: readonly PlainTerm[]): PlainTerm[] {
  const sums = new Map<string, PlainTerm>();
  for (const term of terms) {
    const key = `${term.power} ${term.wave}`;
    const known = sums.get(key);
    const coefficient = known ? addRatios(known.coefficient, term.coefficient) : term.coefficient;
    sums.set(key, { ...term, coefficient });
  }
  return [...sums.values()].filter((t) => !isZeroRatio(t.coefficient));
}

/** The derivative of a wave of frequency (or of rise e^(±frequency t)). */
function waveDerivative(term: PlainTerm, frequency: Ratio): PlainTerm {
  const up = mulRatios(term.coefficient, frequency);
  switch (term.wave) {
    case 'cos':
      return { ...term, wave: 'sin', coefficient: negRatio(up) };
    case 'sin':
      return { ...term, wave: 'cos', coefficient: up };
    case 'rising':
      return { ...term, coefficient: up };
    case 'falling':
      return { ...term, coefficient: negRatio(up) };
  }
}

function derivative(terms: readonly PlainTerm[], frequency: Ratio): PlainTerm[] {
  return gathered(
    terms.flatMap((term) => {
      const wave = waveDerivative(term, frequency);
      if (term.power === 0) return [wave];
      const coefficient = mulRatios(term.coefficient, number(term.power));
      return [wave, { ...term, power: term.power - 1, coefficient }];
    }),
  );
}

/** Originals of 1/(x² + q)^k (`still`) and x/(x² + q)^k (`moving`). */
interface Originals {
  readonly still: readonly PlainTerm[];
  readonly moving: readonly PlainTerm[];
}

function firstOriginals(frequency: Ratio, oscillating: boolean): Originals {
  if (oscillating) {
    const inverse = divRatios(number(1), frequency);
    return {
      still: [{ coefficient: inverse, power: 0, wave: 'sin' }],
      moving: [{ coefficient: number(1), power: 0, wave: 'cos' }],
    };
  }
  const half = divRatios(number(1), mulRatios(number(2), frequency));
  const pair = (rising: Ratio, falling: Ratio): PlainTerm[] => [
    { coefficient: rising, power: 0, wave: 'rising' },
    { coefficient: falling, power: 0, wave: 'falling' },
  ];
  return {
    still: pair(half, negRatio(half)),
    moving: pair(number(1), number(1)).map((t) => ({
      ...t,
      coefficient: divRatios(t.coefficient, number(2)),
    })),
  };
}

/**
 * The originals of 1/(x² + q)ᵏ and x/(x² + q)ᵏ, where q = frequency² (oscillating) or −frequency².
 *
 * From x/(x² + q)ᵏ⁺¹ ⟷ t gₖ/(2k), and gₖ₊₁ = (gₖ − (t gₖ/(2k))′)/q; M. Abramowitz, I. A. Stegun (eds.), Handbook of
 * Mathematical Functions, NBS, 1964, section 29.2 (rules of differentiation).
 */
export function originalsOfPower(frequency: Ratio, oscillating: boolean, power: number): Originals {
  const square = mulRatios(frequency, frequency);
  const q = oscillating ? square : negRatio(square);
  let { still, moving } = firstOriginals(frequency, oscillating);
  for (let k = 1; k < power; k++) {
    const next = scaled(still, divRatios(number(1), number(2 * k))).map((t) => ({
      ...t,
      power: t.power + 1,
    }));
    const rest = gathered([...still, ...scaled(derivative(next, frequency), number(-1))]);
    still = scaled(rest, divRatios(number(1), q));
    moving = next;
  }
  return { still, moving };
}

/** Equal terms of a response added up, zeros dropped, in the order of their first appearance. */
export function gatheredResponse(
  terms: readonly ResponseTerm<Ratio>[],
): readonly ResponseTerm<Ratio>[] {
  const sums = new Map<string, ResponseTerm<Ratio>>();
  for (const term of terms) {
    const key = [
      term.power,
      term.wave,
      ...[term.rate, term.frequency, term.after].map(ratioKey),
    ].join(' ');
    const known = sums.get(key);
    const coefficient = known ? addRatios(known.coefficient, term.coefficient) : term.coefficient;
    sums.set(key, { ...term, coefficient });
  }
  return [...sums.values()].filter((t) => !isZeroRatio(t.coefficient));
}
