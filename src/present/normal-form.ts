import {
  coefficientsIn,
  degreeIn,
  divRatios,
  factorPolynomial,
  generatorsOf,
  dependsOnLaplace,
  isZeroPolynomial,
  isZeroRatio,
  laplace,
  mulRatios,
  oneRatio,
  powRatio,
  ratioFromPolynomial,
  ratioFromRational,
  rational,
  type Polynomial,
  type PowerFactor,
  type Ratio,
} from '../algebra/index.ts';
import { Budget, BudgetExceeded } from '../base/index.ts';
import { arrangePolynomial, arrangeRatio } from './arrangement.ts';
import {
  fractionOf,
  isOne,
  productOf,
  raised,
  signed,
  sumOf,
  timesForms,
  ZERO,
  type SignedTerm,
  type Written,
} from './written.ts';
import type { Layout } from './writing.ts';

/**
 * The trade's normal forms of a transfer function: a gain, powers of s, and factors 1 + T s (`time constants`) or
 * s + a (`poles and zeros`).
 */
export type NormalForm = 'time constants' | 'poles and zeros';

/** Work spent on finding factors; where it is not enough a polynomial is one factor. */
const FACTOR_BUDGET = 300_000;

function factorsOf(p: Polynomial): {
  readonly unit: bigint;
  readonly factors: readonly PowerFactor[];
} {
  try {
    return factorPolynomial(p, new Budget(FACTOR_BUDGET));
  } catch (error) {
    if (error instanceof BudgetExceeded)
      return { unit: 1n, factors: [{ factor: p, multiplicity: 1 }] };
    throw error;
  }
}

/** One side of the fraction: what is free of s, and the written factors in s. */
interface Side {
  readonly gain: Ratio;
  readonly factors: readonly Written[];
}

function sideOf(p: Polynomial, form: NormalForm, layout: Layout): Side {
  const { unit, factors } = factorsOf(p);
  let gain = ratioFromRational(rational(unit));
  const powers: Written[] = [];
  const sums: Written[] = [];
  for (const { factor, multiplicity } of factors) {
    const scale = scaleOf(factor, form);
    gain = mulRatios(gain, powRatio(scale, multiplicity));
    const base = factorForm(factor, scale, form, layout);
    if (isOne(base)) continue;
    (base.kind === 'sum' ? sums : powers).push(raised(base, multiplicity));
  }
  return { gain, factors: [...powers, ...sums] };
}

/** What a factor is divided by: all of it where it is free of s, its constant term, or its leading coefficient. */
function scaleOf(factor: Polynomial, form: NormalForm): Ratio {
  const moving = generatorsOf(factor).filter(dependsOnLaplace);
  if (moving.length === 0) return ratioFromPolynomial(factor);
  if (moving.some((g) => g !== laplace)) return oneRatio;
  const coefficients = coefficientsIn(factor, laplace);
  const [constant] = coefficients;
  const lead = coefficients[degreeIn(factor, laplace)];
  const isLed = form === 'poles and zeros' || isZeroPolynomial(constant);
  return ratioFromPolynomial(isLed ? lead : constant);
}

function factorForm(factor: Polynomial, scale: Ratio, form: NormalForm, layout: Layout): Written {
  if (generatorsOf(factor).some((g) => g !== laplace && dependsOnLaplace(g)))
    return arrangePolynomial(factor, layout);
  const terms = coefficientsIn(factor, laplace).map((c, power) => ({
    coefficient: divRatios(ratioFromPolynomial(c), scale),
    power,
  }));
  const ordered = form === 'poles and zeros' ? terms.reverse() : terms;
  const present = ordered.filter(({ coefficient }) => !isZeroRatio(coefficient));
  return sumOf(present.map(({ coefficient, power }) => termForm(coefficient, power, layout)));
}

function termForm(coefficient: Ratio, power: number, layout: Layout): SignedTerm {
  const written = arrangeRatio(coefficient, layout);
  const negative = written.kind === 'negative';
  const of = negative ? written.of : written;
  if (power === 0) return { negative, of };
  return { negative, of: timesForms(of, [raised({ kind: 'name', name: laplace.name }, power)]) };
}

/** The factors of a written form behind which others are to stand. */
function behind(form: Written, factors: readonly Written[]): Written {
  return form.kind === 'product'
    ? productOf([...form.factors, ...factors])
    : productOf([form, ...factors]);
}

/** A transfer function in a normal form: one fraction, its constants in front. */
export function arrangeNormalForm(r: Ratio, form: NormalForm, layout: Layout): Written {
  if (isZeroRatio(r)) return ZERO;
  const [top, bottom] = [r.num, r.den].map((p) => sideOf(p, form, layout));
  const gain = arrangeRatio(divRatios(top.gain, bottom.gain), layout);
  const negative = gain.kind === 'negative';
  const size = negative ? gain.of : gain;
  const [above, below] = size.kind === 'fraction' ? [size.num, size.den] : [size, productOf([])];
  return signed(negative, fractionOf(behind(above, top.factors), behind(below, bottom.factors)));
}
