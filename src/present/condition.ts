import { Budget, BudgetExceeded } from '../base/index.ts';
import { equalRatios, termsOf, type Polynomial } from '../algebra/index.ts';
import {
  mirrored,
  readable,
  stabilityConditions,
  type Comparison,
  type Condition,
  type StabilityBlock,
} from '../control/index.ts';
import { isUnitSymbol } from '../units/index.ts';
import { formulaLatex, formulaText, polynomialLatex, polynomialText } from './formula.ts';
import { wordsLatex } from './words.ts';
import type { Writing } from './writing.ts';

/**
 * A condition as text that the worksheet language reads back: `Kp > J Ki/Kd`, joined by `and` and `or`. Stability is
 * opened into the conditions on the parameters, where they can be given. Always and never are `1 > 0` and `1 < 0`.
 */
export function conditionText(c: Condition, writing: Writing): string {
  switch (c.kind) {
    case 'truth':
      return c.value ? '1 > 0' : '1 < 0';
    case 'compare':
      return compareText(c, writing);
    case 'stable':
      return joined(stableParts(c.blocks, writing), 'and', writing);
    case 'all':
      return joined(flattened(c.of, 'all'), 'and', writing);
    case 'any':
      return joined(flattened(c.of, 'any'), 'or', writing);
    case 'not':
      return `not (${conditionText(c.of, writing)})`;
    case 'undecided':
      return `undecided: ${c.reason}`;
  }
}

/** The same condition as {@link conditionText}, as LaTeX: `and` is a comma, always and never are words. */
export function conditionLatex(c: Condition, writing: Writing): string {
  switch (c.kind) {
    case 'truth':
      return c.value ? '\\text{always}' : '\\text{never}';
    case 'compare':
      return compareLatex(c, writing);
    case 'stable':
      return `\\text{stable: }${joinedLatex(stableParts(c.blocks, writing), 'all', writing)}`;
    case 'all':
    case 'any':
      return joinedLatex(flattened(c.of, c.kind), c.kind, writing);
    case 'not':
      return `\\text{not }\\left(${conditionLatex(c.of, writing)}\\right)`;
    case 'undecided':
      return wordsLatex(`undecided: ${c.reason}`);
  }
}

type Compare = Extract<Condition, { kind: 'compare' }>;

function compareText(c: Compare, writing: Writing): string {
  const left = formulaText(c.left, writing);
  const right = formulaText(c.right, writing);
  const guarded = looksLikeQuantity(right) ? `(${right})` : right;
  return c.operator === '!=' ? `not (${left} = ${guarded})` : `${left} ${c.operator} ${guarded}`;
}

/** A number before names that are all units, `2 m`: on the right of a relation it would be read as a quantity. */
function looksLikeQuantity(text: string): boolean {
  const words = /^[\d.e-]+ (.+)$/.exec(text)?.[1].match(/[\p{L}][\p{L}\p{N}_]*/gu);
  return words !== undefined && words !== null && words.every((word) => isUnitSymbol(word));
}

const OPERATOR_LATEX: Readonly<Record<Comparison, string>> = {
  '>': '>',
  '>=': '\\ge ',
  '=': '=',
  '!=': '\\ne ',
  '<': '<',
  '<=': '\\le ',
};

function compareLatex(c: Compare, writing: Writing): string {
  const left = formulaLatex(c.left, writing);
  return `${left}${OPERATOR_LATEX[c.operator]}${formulaLatex(c.right, writing)}`;
}

/** What lies between two bounds, written as a chain: 0 < K < 6. */
interface Bounds {
  readonly kind: 'bounds';
  readonly lower: Compare;
  readonly upper: Compare;
}

const isLower = (c: StablePart): c is Compare =>
  c.kind === 'compare' && (c.operator === '>' || c.operator === '>=');
const isUpper = (c: StablePart): c is Compare =>
  c.kind === 'compare' && (c.operator === '<' || c.operator === '<=');

/** The parts with each lower bound joined to the upper bound of the same quantity, where there is just one of each. */
function betweenBounds(parts: readonly StablePart[]): readonly (StablePart | Bounds)[] {
  const partner = (
    c: Compare,
    isPartner: (other: StablePart) => other is Compare,
  ): Compare | null => {
    const found = parts.filter(isPartner).filter((other) => equalRatios(other.left, c.left));
    return found.length === 1 ? found[0] : null;
  };
  return parts.flatMap((part): readonly (StablePart | Bounds)[] => {
    if (!isLower(part) && !isUpper(part)) return [part];
    const lower = partner(part, isLower);
    const upper = partner(part, isUpper);
    if (!lower || !upper) return [part];
    return part === lower ? [{ kind: 'bounds', lower, upper }] : [];
  });
}

function boundsText({ lower, upper }: Bounds, writing: Writing): string {
  const below = formulaText(lower.right, writing);
  return `${below} ${mirrored(lower.operator)} ${compareText(upper, writing)}`;
}

function boundsLatex({ lower, upper }: Bounds, writing: Writing): string {
  const below = formulaLatex(lower.right, writing);
  return `${below}${OPERATOR_LATEX[mirrored(lower.operator)]}${compareLatex(upper, writing)}`;
}

function flattened(of: readonly Condition[], kind: 'all' | 'any'): readonly Condition[] {
  return of.flatMap((c) => (c.kind === kind ? flattened(c.of, kind) : [c]));
}

/** A stability condition opened: conditions on the parameters, or the polynomial where they cannot be given. */
type StablePart = Condition | { readonly kind: 'hurwitz'; readonly polynomial: Polynomial };

/** Work spent on opening one block's stability into conditions; a dearer one is left closed. */
const OPENING_BUDGET = 2_000_000;

/** Terms of the conditions of one block that a reader can take in; with more, its polynomial says it better. */
const MOST_TERMS = 80;

function sizeOf(conditions: readonly Condition[]): number {
  return conditions
    .flatMap((c) =>
      c.kind === 'compare' ? [c.left.num, c.left.den, c.right.num, c.right.den] : [],
    )
    .reduce((sum, polynomial) => sum + termsOf(polynomial).length, 0);
}

function stableParts(blocks: readonly StabilityBlock[], writing: Writing): readonly StablePart[] {
  const parts = blocks.flatMap(({ polynomial }): readonly StablePart[] => {
    const conditions = openedConditions(polynomial, writing);
    if (conditions === null) return [{ kind: 'hurwitz', polynomial }];
    const whole = readable({ kind: 'all', of: conditions }, writing.signOf, writing.tuned);
    const opened = flattened([whole], 'all');
    return sizeOf(opened) > MOST_TERMS ? [{ kind: 'hurwitz', polynomial }] : opened;
  });
  const never = parts.find((part) => part.kind === 'truth' && !part.value);
  return never ? [never] : parts.filter((part) => part.kind !== 'truth');
}

function openedConditions(p: Polynomial, writing: Writing): readonly Condition[] | null {
  try {
    const conditions = stabilityConditions(p, writing.signOf, new Budget(OPENING_BUDGET));
    return conditions.some(({ kind }) => kind === 'undecided') ? null : conditions;
  } catch (error) {
    if (error instanceof BudgetExceeded) return null;
    throw error;
  }
}

function partText(part: StablePart | Bounds, writing: Writing): string {
  if (part.kind === 'bounds') return boundsText(part, writing);
  return part.kind === 'hurwitz'
    ? `stable(${polynomialText(part.polynomial, writing)})`
    : conditionText(part, writing);
}

function partLatex(part: StablePart | Bounds, writing: Writing): string {
  if (part.kind === 'bounds') return boundsLatex(part, writing);
  return part.kind === 'hurwitz'
    ? `${polynomialLatex(part.polynomial, writing)}\\text{ has its roots left of the axis}`
    : conditionLatex(part, writing);
}

function joined(parts: readonly StablePart[], word: 'and' | 'or', writing: Writing): string {
  if (parts.length === 0) return word === 'and' ? '1 > 0' : '1 < 0';
  if (parts.length === 1) return partText(parts[0], writing);
  const texts = (word === 'and' ? betweenBounds(parts) : parts).map((part) => {
    const text = partText(part, writing);
    return word === 'and' && part.kind === 'any' ? `(${text})` : text;
  });
  return [...new Set(texts)].join(` ${word} `);
}

function joinedLatex(parts: readonly StablePart[], kind: 'all' | 'any', writing: Writing): string {
  if (parts.length === 0) return kind === 'all' ? '\\text{always}' : '\\text{never}';
  const mixed = parts.length > 1;
  return (kind === 'all' ? betweenBounds(parts) : parts)
    .map((part) => {
      const latex = partLatex(part, writing);
      return mixed && (part.kind === 'any' || part.kind === 'all')
        ? `\\left(${latex}\\right)`
        : latex;
    })
    .join(kind === 'all' ? ',\\quad ' : '\\ \\text{or}\\ ');
}
