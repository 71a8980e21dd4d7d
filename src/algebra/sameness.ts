import type { Budget } from '../base/index.ts';
import { overCommonAngles, withoutSquaredSines } from './angle-relations.ts';
import { isSurelyNonzero, type RealPoint } from './enclosure.ts';
import { isZeroPolynomial } from './polynomial.ts';
import { generatorsOfRatio, isZeroRatio, subRatios } from './ratio.ts';
import { reduceRelations } from './relation.ts';
import { withRootsApart } from './root-relations.ts';
import type { Generator, Ratio } from './ring.ts';
import type { SignOf } from './sign.ts';

/** Whether a difference vanishes identically by the relations of roots, exponentials and angles. */
function vanishes(a: Ratio, b: Ratio, signOf: SignOf, budget?: Budget): boolean {
  const apart = [a, b].map((r) => withRootsApart(r, signOf, budget));
  const [left, right] = overCommonAngles(apart, budget).map((r) =>
    withRootsApart(r, signOf, budget),
  );
  const { num } = subRatios(left, right, budget);
  return isZeroPolynomial(reduceRelations(withoutSquaredSines(num, budget), budget).num);
}

/** Points at which two sides are compared in numbers. */
const POINTS = 12;

/** Steps of an additive sequence that fills the unit interval evenly. */
const GOLDEN = 0.6180339887498949;

/** A fixed point that fits the signs: sizes from 1/4 to 2, in steps that doubles hold exactly. */
function pointNumber(index: number, signOf: SignOf): RealPoint {
  const values = new Map<string, number>();
  return (g, isNominal) => {
    const key = `${isNominal ? 'nominal ' : ''}${g.key}`;
    const known = values.get(key);
    if (known !== undefined) return known;
    const place = ((index + 1) * (values.size + 1) * GOLDEN) % 1;
    const size = (16 + Math.floor(place * 112)) / 64;
    const sign = signOf(g);
    const isBelow = g.kind === 'symbol' && sign === 'unknown' && (index + values.size) % 2 === 1;
    const value = isBelow || sign === 'negative' || sign === 'nonpositive' ? -size : size;
    values.set(key, value);
    return value;
  };
}

const isFunction = (g: Generator): boolean => g.kind === 'function';

/**
 * Whether two formulas are identically equal for all values that fit the signs: true by canonical forms and the
 * relations of the functions in them, false where their values surely differ at some point (in interval arithmetic),
 * null where neither is shown.
 */
export function areSame(a: Ratio, b: Ratio, signOf: SignOf, budget?: Budget): boolean | null {
  const difference = subRatios(a, b, budget);
  if (isZeroRatio(difference)) return true;
  if (![a, b].some((side) => generatorsOfRatio(side).some(isFunction))) return false;
  if (vanishes(a, b, signOf, budget)) return true;
  for (let index = 0; index < POINTS; index += 1) {
    if (isSurelyNonzero(difference, pointNumber(index, signOf))) return false;
  }
  return null;
}
