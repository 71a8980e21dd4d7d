import {
  addComplex,
  complex,
  divideComplex,
  multiplyComplex,
  polynomialRoots,
  subtractComplex,
  type Complex,
} from '../numeric/index.ts';
import type { NumericTerms } from './frequency-polynomials.ts';

/** c t^power e^(root t) from t = after on, taken with its conjugate where the root is complex. */
export interface Mode {
  readonly coefficient: Complex;
  readonly power: number;
  readonly root: Complex;
  readonly after: number;
}

interface Pole {
  readonly root: Complex;
  readonly multiplicity: number;
}

function polesOf(den: readonly number[]): readonly Pole[] {
  const poles: { root: Complex; multiplicity: number }[] = [];
  for (const root of polynomialRoots(den)) {
    const same = poles.find((p) => p.root.re === root.re && p.root.im === root.im);
    if (same) same.multiplicity += 1;
    else poles.push({ root, multiplicity: 1 });
  }
  return poles;
}

/** p(r + ε) as a polynomial in ε, lowest power first, cut to a length: by repeated synthetic division. */
function shifted(descending: readonly number[], r: Complex, length: number): Complex[] {
  let rest: Complex[] = descending.map((c) => complex(c));
  const series: Complex[] = [];
  while (rest.length > 0 && series.length < length) {
    const sums: Complex[] = [];
    for (const c of rest) {
      const before = sums.at(-1);
      sums.push(before ? addComplex(c, multiplyComplex(before, r)) : c);
    }
    series.push(sums[sums.length - 1]);
    rest = sums.slice(0, -1);
  }
  return series;
}

/** A power series divided by (gap + ε). */
function dividedBy(series: readonly Complex[], gap: Complex): Complex[] {
  const quotient: Complex[] = [];
  series.forEach((c, k) => {
    quotient.push(divideComplex(k === 0 ? c : subtractComplex(c, quotient[k - 1]), gap));
  });
  return quotient;
}

function modesAt(
  num: readonly number[],
  lead: number,
  pole: Pole,
  poles: readonly Pole[],
  after: number,
): readonly Mode[] {
  const { root, multiplicity } = pole;
  let series = shifted(num, root, multiplicity);
  while (series.length < multiplicity) series.push(complex(0));
  for (const other of poles) {
    const gap = subtractComplex(root, other.root);
    for (let k = 0; other !== pole && k < other.multiplicity; k++) series = dividedBy(series, gap);
  }
  let factorial = 1;
  return series
    .reverse()
    .map((c, power) => {
      factorial *= Math.max(1, power);
      const scale = lead * factorial;
      return { coefficient: complex(c.re / scale, c.im / scale), power, root, after };
    })
    .filter(({ coefficient: c }) => c.re !== 0 || c.im !== 0);
}

/**
 * A signal Σ Nᵢ(s) e^(−s afterᵢ)/D(s) as a sum of modes, by partial fractions at numeric roots; roots that rounding alone
 * keeps apart count as one multiple root. Null where a term is not strictly proper.
 */
export function modesOf(num: NumericTerms, den: readonly number[]): readonly Mode[] | null {
  const poles = polesOf(den);
  const modes: Mode[] = [];
  for (const { coefficients, delay } of num) {
    const top = coefficients.slice(
      Math.max(
        0,
        coefficients.findIndex((c) => c !== 0),
      ),
    );
    if (top.length >= den.length && top.some((c) => c !== 0)) return null;
    for (const pole of poles) {
      if (pole.root.im >= 0) modes.push(...modesAt(top, den[0], pole, poles, delay));
    }
  }
  return modes;
}

/** The signal or, for order 1, its derivative at a time, from the right. */
export function motionAt(modes: readonly Mode[], time: number, order: 0 | 1 = 0): number {
  let sum = 0;
  for (const { coefficient: c, power, root, after } of modes) {
    const t = time - after;
    if (t < 0) continue;
    const growth = Math.exp(root.re * t);
    const [cos, sin] = [Math.cos(root.im * t), Math.sin(root.im * t)];
    const [re, im] = [c.re * cos - c.im * sin, c.re * sin + c.im * cos];
    const rise = t ** power;
    const weight = root.im === 0 ? growth : 2 * growth;
    if (order === 0) sum += weight * rise * re;
    else {
      const slope = power === 0 ? 0 : power * t ** (power - 1);
      sum += weight * (slope * re + rise * (root.re * re - root.im * im));
    }
  }
  return sum;
}
