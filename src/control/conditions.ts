import { equalRatios, polynomialKey, ratioKey } from '../algebra/index.ts';
import type { Ratio, Sign } from '../algebra/index.ts';
import { ALWAYS, type Comparison, type Condition } from './values.ts';

/** The one true condition, so that it is known by identity. */
export const TRUE: Condition = ALWAYS;
export const FALSE: Condition = Object.freeze({ kind: 'truth', value: false });

/** The truth value as a condition. */
export function truth(value: boolean): Condition {
  return value ? TRUE : FALSE;
}

/** The condition `left operator right`, undecided as it stands. */
export function compare(left: Ratio, operator: Comparison, right: Ratio): Condition {
  return Object.freeze({ kind: 'compare', left, operator, right });
}

/** What cannot be told, with the reason in words. */
export function undecided(reason: string): Condition {
  return Object.freeze({ kind: 'undecided', reason });
}

const MIRRORED: Readonly<Record<Comparison, Comparison>> = {
  '>': '<',
  '>=': '<=',
  '=': '=',
  '!=': '!=',
  '<': '>',
  '<=': '>=',
};

const OPPOSITE: Readonly<Record<Comparison, Comparison>> = {
  '>': '<=',
  '>=': '<',
  '=': '!=',
  '!=': '=',
  '<': '>=',
  '<=': '>',
};

/** The comparison read from right to left: `>` becomes `<`. */
export function mirrored(operator: Comparison): Comparison {
  return MIRRORED[operator];
}

const HOLDS: Readonly<Record<Comparison, readonly Sign[]>> = {
  '>': ['positive'],
  '>=': ['positive', 'zero', 'nonnegative'],
  '=': ['zero'],
  '!=': ['positive', 'negative'],
  '<': ['negative'],
  '<=': ['negative', 'zero', 'nonpositive'],
};

/** Whether `x operator 0` holds for every x of this sign (true), for none (false), or cannot be told (null). */
export function decideBySign(sign: Sign, operator: Comparison): boolean | null {
  if (HOLDS[operator].includes(sign)) return true;
  return HOLDS[OPPOSITE[operator]].includes(sign) ? false : null;
}

/** A text that two conditions share exactly when they are written alike. */
export function conditionKey(condition: Condition): string {
  switch (condition.kind) {
    case 'truth':
      return String(condition.value);
    case 'compare':
      return `${ratioKey(condition.left)}${condition.operator}${ratioKey(condition.right)}`;
    case 'stable':
      return `stable(${condition.blocks.map((b) => polynomialKey(b.polynomial)).join(',')})`;
    case 'not':
      return `not(${conditionKey(condition.of)})`;
    case 'undecided':
      return `undecided(${condition.reason})`;
    default:
      return `${condition.kind}(${condition.of.map(conditionKey).join(',')})`;
  }
}

function joined(kind: 'all' | 'any', conditions: readonly Condition[]): Condition {
  const absorbing = kind === 'any';
  const parts = new Map<string, Condition>();
  for (const condition of conditions) {
    for (const part of condition.kind === kind ? condition.of : [condition]) {
      if (part.kind === 'truth' && part.value === absorbing) return part;
      if (part.kind !== 'truth') parts.set(conditionKey(part), part);
    }
  }
  const distinct = [...parts.values()];
  if (distinct.length === 0) return truth(!absorbing);
  return distinct.length === 1 ? distinct[0] : Object.freeze({ kind, of: Object.freeze(distinct) });
}

/** All of these hold: flattened, without duplicates; true if there are none. */
export function allOf(conditions: readonly Condition[]): Condition {
  return joined('all', conditions);
}

/** Any of these holds: flattened, without duplicates; false if there are none. */
export function anyOf(conditions: readonly Condition[]): Condition {
  return joined('any', conditions);
}

/** The opposite of a condition, pushed inwards as far as it goes. */
export function negation(condition: Condition): Condition {
  switch (condition.kind) {
    case 'truth':
      return truth(!condition.value);
    case 'compare':
      return compare(condition.left, OPPOSITE[condition.operator], condition.right);
    case 'all':
      return anyOf(condition.of.map(negation));
    case 'any':
      return allOf(condition.of.map(negation));
    case 'not':
      return condition.of;
    case 'undecided':
      return condition;
    case 'stable':
      return Object.freeze({ kind: 'not', of: condition });
  }
}

/** Whether two conditions are written alike. */
export function equalConditions(a: Condition, b: Condition): boolean {
  if (a === b) return true;
  if (a.kind === 'compare' && b.kind === 'compare') {
    return (
      a.operator === b.operator && equalRatios(a.left, b.left) && equalRatios(a.right, b.right)
    );
  }
  return conditionKey(a) === conditionKey(b);
}
