import {
  compareRational,
  dependsOn,
  generatorsOf,
  generatorsOfRatio,
  numberToRational,
  ratioFromRational,
  signOfPolynomial,
  signOverBox,
  substitutePolynomial,
  substituteRatio,
  subRatios,
  symbol,
  type Generator,
  type Polynomial,
  type Range,
  type Ratio,
  type Sign,
} from '../algebra/index.ts';
import { Budget, BudgetExceeded, isRefusal } from '../base/index.ts';
import { negation, type Condition } from '../control/index.ts';
import { seededRandom } from '../numeric/index.ts';
import type { Derivations } from './derivations.ts';
import { asMagnitude, type Numbers, type Points } from './numbers.ts';

/** How the values over the tolerances were found. */
export type Method = 'proved' | 'corners' | 'sampled';

/** The points of a tolerance box that are looked at, the first being the nominal. */
export interface ToleranceSample extends Points {
  readonly names: readonly string[];
  readonly method: Method;
  /** Points besides the nominal; null where nothing is toleranced. */
  readonly n: number | null;
}

/** All corners are visited up to this many; of more, as many are drawn at random. */
const MOST_CORNERS = 1024;
const SAMPLES = 2000;
const SEED = 20260101;
/** Work that may be spent on proving that a formula is monotone. */
const PROOF_BUDGET = 50_000;
/** Work that may be spent on one sign over the box, where the signs of the symbols leave it open. */
const BOX_BUDGET = 10_000;

/**
 * The points at which a quantity is judged over its tolerances: the corners alone where it is proved monotone in every
 * toleranced name, otherwise the corners and a seeded Latin hypercube.
 */
export function sampleBox(
  names: readonly string[],
  monotone: boolean,
  numbers: Numbers,
): ToleranceSample {
  if (names.length === 0) return { names, count: 1, columns: new Map(), method: 'proved', n: null };
  const random = seededRandom(SEED);
  const levels = names.map((name) => levelsOf(numbers.bounds(name)!));
  const all = levels.reduce((product, { length }) => product * length, 1);
  const corners = Math.min(all, MOST_CORNERS);
  const method: Method = monotone && all <= MOST_CORNERS ? 'corners' : 'sampled';
  const samples = method === 'corners' ? 0 : SAMPLES;
  const count = 1 + corners + samples;
  const cube = numbers.cube(names.length, samples);
  const columns = new Map<string, Float64Array>();
  let stride = 1;
  names.forEach((name, k) => {
    const [low, high] = numbers.bounds(name)!;
    const { length } = levels[k];
    const column = new Float64Array(count);
    column[0] = numbers.nominal(name)!;
    for (let i = 0; i < corners; i++) {
      const level = all <= MOST_CORNERS ? Math.floor(i / stride) : Math.floor(random() * length);
      column[1 + i] = levels[k][level % length];
    }
    for (let i = 0; i < samples; i++) column[1 + corners + i] = low + (high - low) * cube[k][i];
    columns.set(name, column);
    stride *= length;
  });
  return { names, count, columns, method, n: count - 1 };
}

/** The values of a name at corners: both bounds, and 0 between them, where a derivation may change. */
function levelsOf([low, high]: readonly [number, number]): readonly number[] {
  return low < 0 && high > 0 ? [low, high, 0] : [low, high];
}

/** The sign of a symbol over the whole tolerance box. */
function signsOverBox(numbers: Numbers, derivations: Derivations): (g: Generator) => Sign {
  return (g) => {
    if (g.kind !== 'symbol') return derivations.signOf(g);
    const nominal = numbers.nominal(g.name);
    if (nominal === null) return derivations.signOf(g);
    const [low, high] = numbers.bounds(g.name) ?? [nominal, nominal];
    if (low > 0) return 'positive';
    if (high < 0) return 'negative';
    if (low === 0) return high === 0 ? 'zero' : 'nonnegative';
    return high === 0 ? 'nonpositive' : 'unknown';
  };
}

/**
 * Some points of a sample, as indices from 1 (0 is the nominal), spread so that no name keeps to one of its ends:
 * multiples of a stride near the golden section that shares no factor with their number. All, if no more than `most`.
 */
export function spreadPoints({ count }: Points, most: number): readonly number[] {
  const points = count - 1;
  if (points <= most) return Array.from({ length: points }, (_, i) => i + 1);
  let stride = Math.floor(points * 0.618);
  while (shareFactor(stride, points)) stride++;
  return Array.from({ length: most }, (_, i) => 1 + ((i * stride) % points));
}

function shareFactor(a: number, b: number): boolean {
  return b === 0 ? a > 1 : shareFactor(b, a % b);
}

/** What may be spent on proving one formula monotone, in all its names together. */
interface Effort {
  readonly signs: Budget;
  readonly box: Budget;
}

/** Whether a formula is proved monotone over the box in each of the names: no derivative changes sign. */
export function isMonotone(
  ratio: Ratio,
  names: readonly string[],
  numbers: Numbers,
  derivations: Derivations,
): boolean {
  try {
    const opened = holdNominals(numbers.opened(ratio), numbers);
    const signOf = signsOverBox(numbers, derivations);
    const effort = { signs: new Budget(PROOF_BUDGET), box: new Budget(BOX_BUDGET) };
    return (
      opened !== null && names.every((name) => isMonotoneIn(opened, name, signOf, numbers, effort))
    );
  } catch (error) {
    if (error instanceof BudgetExceeded) return false;
    throw error;
  }
}

/** `nominal(x)` does not move with the tolerances: its number takes its place. Null where it has none. */
function holdNominals(ratio: Ratio, numbers: Numbers): Ratio | null {
  const held = new Map<Generator, Ratio>();
  for (const g of generatorsOfRatio(ratio)) {
    if (g.kind !== 'function' || g.name !== 'nominal') continue;
    const value = numbers.valueOfRatio(g.args![0]);
    if (value === null || !Number.isFinite(value)) return null;
    held.set(g, ratioFromRational(numberToRational(value)));
  }
  if (held.size === 0) return ratio;
  const substituted = substituteRatio(ratio, held);
  return isRefusal(substituted) ? null : substituted;
}

function isMonotoneIn(
  ratio: Ratio,
  name: string,
  signOf: (g: Generator) => Sign,
  numbers: Numbers,
  effort: Effort,
): boolean {
  const g = symbol(name);
  if (!dependsOn(ratio, g)) return true;
  const denominator = signOver(ratio.den, signOf, numbers, effort);
  if (denominator !== 'positive' && denominator !== 'negative') return false;
  const derivative = numbers.derivative(ratio, g);
  if (derivative === null) return false;
  const parts = [derivative.num, derivative.den];
  return parts.every((p) => signOver(p, signOf, numbers, effort) !== 'unknown');
}

/** The sign of a polynomial over the box: from the signs of its symbols, else from its Bernstein coefficients. */
function signOver(
  p: Polynomial,
  signOf: (g: Generator) => Sign,
  numbers: Numbers,
  effort: Effort,
): Sign {
  const known = signOfPolynomial(p, signOf, effort.signs);
  if (known !== 'unknown') return known;
  const fixed = new Map<Generator, Ratio>();
  for (const g of generatorsOf(p)) {
    const range = rangeOf(g, numbers);
    if (range && isFixed(range)) fixed.set(g, ratioFromRational(range.low));
  }
  const { num } = substitutePolynomial(p, fixed);
  const sign = signOverBox(num, (g) => rangeOf(g, numbers), effort.box);
  return sign === 'mixed' || sign === 'undecided' ? 'unknown' : sign;
}

function rangeOf(g: Generator, numbers: Numbers): Range | null {
  const nominal = g.kind === 'symbol' ? numbers.nominal(g.name) : null;
  if (nominal === null) return null;
  const [low, high] = numbers.bounds(g.name) ?? [nominal, nominal];
  return { low: numberToRational(low), high: numberToRational(high) };
}

const isFixed = ({ low, high }: Range): boolean => compareRational(low, high) === 0;

/** Whether a condition's truth over the box is settled by the corners: each of its relations is monotone. */
export function isMonotoneCondition(
  condition: Condition,
  names: readonly string[],
  numbers: Numbers,
  derivations: Derivations,
): boolean {
  switch (condition.kind) {
    case 'truth':
      return true;
    case 'undecided':
      return false;
    case 'compare':
      return isMonotoneRelation(condition, names, numbers, derivations);
    case 'stable':
      return condition.blocks.every(
        (block) =>
          numbers
            .stabilityConditions(block.polynomial)
            ?.every((part) => isMonotoneCondition(part, names, numbers, derivations)) ?? false,
      );
    case 'not':
      return (
        condition.of.kind !== 'stable' &&
        isMonotoneCondition(negation(condition.of), names, numbers, derivations)
      );
    // A corner of each relation being enough does not make the corners enough for an alternative.
    case 'any':
      return (
        condition.of.length === 1 &&
        isMonotoneCondition(condition.of[0], names, numbers, derivations)
      );
    case 'all':
      return condition.of.every((part) => isMonotoneCondition(part, names, numbers, derivations));
  }
}

/** An upper bound on a magnitude holds over the box if it holds at the corners of what is inside. */
function isMonotoneRelation(
  condition: Extract<Condition, { kind: 'compare' }>,
  names: readonly string[],
  numbers: Numbers,
  derivations: Derivations,
): boolean {
  const { left, operator, right } = condition;
  // Between corners of either side a monotone quantity passes through the value that it must not have.
  if (operator === '!=') return false;
  const isUpper = operator === '<' || operator === '<=';
  const magnitude = asMagnitude(numbers.opened(left));
  const rightFixed = names.every((name) => !dependsOn(numbers.opened(right), symbol(name)));
  if (magnitude && magnitude.factor > 0 && isUpper && rightFixed) {
    return isMonotone(magnitude.inner, names, numbers, derivations);
  }
  return isMonotone(subRatios(left, right), names, numbers, derivations);
}
