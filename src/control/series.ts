import {
  addRatios,
  coefficientsIn,
  divRatios,
  isZeroRatio,
  laplace,
  mulRatios,
  oneRatio,
  ratioFromPolynomial,
  ratioFromRational,
  rational,
  subRatios,
  zeroRatio,
} from '../algebra/index.ts';
import type { Generator, Polynomial, Ratio } from '../algebra/index.ts';
import { isRefusal, refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import { functionsOfS } from './s-polynomial.ts';

/** A power series in s at 0, cut: coefficients of s⁰, s¹, …; all series of one computation have the same length. */
type Series = readonly Ratio[];

/** A Laurent series at s = 0: Σ coefficients[k] · s^(order + k), the first coefficient not zero. */
export interface Laurent {
  readonly order: number;
  readonly coefficients: Series;
}

const number = (n: number): Ratio => ratioFromRational(rational(n));

function padded(coefficients: Series, length: number): Series {
  return Array.from({ length }, (_, k) => coefficients[k] ?? zeroRatio);
}

function addSeries(a: Series, b: Series): Series {
  return a.map((c, k) => addRatios(c, b[k]));
}

function mulSeries(a: Series, b: Series): Series {
  return a.map((_, k) => {
    let sum = zeroRatio;
    for (let i = 0; i <= k; i++) {
      if (!isZeroRatio(a[i]) && !isZeroRatio(b[k - i]))
        sum = addRatios(sum, mulRatios(a[i], b[k - i]));
    }
    return sum;
  });
}

/** a/b for a series b whose first coefficient is not zero. */
function divSeries(a: Series, b: Series): Series {
  const quotient: Ratio[] = [];
  a.forEach((c, k) => {
    let rest = c;
    for (let i = 1; i <= k; i++) rest = subRatios(rest, mulRatios(b[i], quotient[k - i]));
    quotient.push(divRatios(rest, b[0]));
  });
  return quotient;
}

/** exp(x) for a series x that vanishes at 0, from E′ = x′ E: k Eₖ = Σ i xᵢ Eₖ₋ᵢ. */
function expSeries(x: Series): Series {
  const result: Ratio[] = [oneRatio];
  for (let k = 1; k < x.length; k++) {
    let sum = zeroRatio;
    for (let i = 1; i <= k; i++) {
      sum = addRatios(sum, mulRatios(mulRatios(number(i), x[i]), result[k - i]));
    }
    result.push(divRatios(sum, number(k)));
  }
  return result;
}

function seriesOfFunction(g: Generator, length: number): Series | Refusal {
  const argument = g.name === 'exp' && g.args ? g.args[0] : null;
  if (argument) {
    const numerator = seriesOfPolynomial(argument.num, length);
    const denominator = seriesOfPolynomial(argument.den, length);
    if (isRefusal(numerator)) return numerator;
    if (isRefusal(denominator)) return denominator;
    if (!isZeroRatio(denominator[0]) && isZeroRatio(numerator[0])) {
      return expSeries(divSeries(numerator, denominator));
    }
  }
  return refuse('no-series', `${g.name}(…) of s has no power series at s = 0 that is known here`);
}

function seriesOfPolynomial(p: Polynomial, length: number): Series | Refusal {
  const [g] = functionsOfS(p);
  if (!g)
    return padded(
      coefficientsIn(p, laplace).map((c) => ratioFromPolynomial(c)),
      length,
    );
  const base = seriesOfFunction(g, length);
  if (isRefusal(base)) return base;
  let sum: Series = padded([], length);
  for (const coefficient of [...coefficientsIn(p, g)].reverse()) {
    const part = seriesOfPolynomial(coefficient, length);
    if (isRefusal(part)) return part;
    sum = addSeries(mulSeries(sum, base), part);
  }
  return sum;
}

interface Expansion {
  readonly lowest: number;
  readonly series: Series;
}

/** Lengths tried until the leading coefficient shows: 1 − e^(−s T) begins at s, its difference to s T at s². */
const LENGTHS = [2, 6, 16, 40];

function expand(p: Polynomial, terms: number): Expansion | Refusal {
  for (const extra of LENGTHS) {
    const series = seriesOfPolynomial(p, terms + extra);
    if (isRefusal(series)) return series;
    const lowest = series.findIndex((c) => !isZeroRatio(c));
    if (lowest >= 0 && lowest + terms <= series.length) {
      return { lowest, series: series.slice(lowest, lowest + terms) };
    }
  }
  return refuse('no-series', 'the leading term at s = 0 was not found');
}

/**
 * The Laurent series of a ratio at s = 0 with `terms` coefficients; dead time e^(−s T) is expanded too.
 *
 * Returns null for zero. Refuses other functions of s.
 */
export function laurentAtZero(r: Ratio, terms: number): Laurent | null | Refusal {
  if (isZeroRatio(r)) return null;
  const numerator = expand(r.num, terms);
  if (isRefusal(numerator)) return numerator;
  const denominator = expand(r.den, terms);
  if (isRefusal(denominator)) return denominator;
  return {
    order: numerator.lowest - denominator.lowest,
    coefficients: divSeries(numerator.series, denominator.series),
  };
}

/** The coefficient of s^power in a Laurent series that reaches that far. */
export function laurentCoefficient(series: Laurent | null, power: number): Ratio {
  return series?.coefficients[power - series.order] ?? zeroRatio;
}

/** The series of e^(−s after) with `length` terms: (−after)ᵏ/k!. */
export function delaySeries(after: Ratio, length: number): readonly Ratio[] {
  const linear = padded([zeroRatio, subRatios(zeroRatio, after)], Math.max(length, 2));
  return expSeries(linear).slice(0, length);
}
