import { laplace, type Ratio } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import {
  allOf,
  responseAt,
  responseOf,
  type FormulaValue,
  type NoValue,
  type Value,
} from '../control/index.ts';
import { formatExpression, type Expression } from '../language/index.ts';
import { formulaValue, inherited, kindInWords } from './arithmetic.ts';
import type { Meanings } from './meanings.ts';
import type { Scope } from './scope.ts';
import { demand, stopAt } from './stop.ts';

/** What `with s = …` and `with t = …` put in. */
export type Point = ReadonlyMap<'s' | 't', Ratio>;

/** A value at a point of s or t; `of` is the formula it came from, named where it has no such value. */
export function valueAt(
  value: Value,
  point: Point,
  of: Expression,
  scope: Scope,
  meanings: Meanings,
): Value {
  const [s, t] = [point.get('s'), point.get('t')];
  const inTime = t === undefined ? value : atTime(value, t, of, scope, meanings);
  return s === undefined ? inTime : atLaplacePoint(inTime, s, of, meanings);
}

/** A formula in s, or a matrix of such, at a point of s; infinite where its denominator vanishes, which is no problem. */
export function atLaplacePoint(value: Value, s: Ratio, of: Expression, meanings: Meanings): Value {
  const at = (ratio: Ratio) => meanings.substitute(ratio, new Map([[laplace, s]]));
  switch (value.kind) {
    case 'none':
      return value;
    case 'formula': {
      const found = at(value.ratio);
      return isRefusal(found) ? infinite(value) : formulaValue(found, inherited(value, value));
    }
    case 'matrix':
      return {
        ...value,
        rows: value.rows.map((row) => row.map((entry) => demand(at(entry), of.span))),
      };
    default:
      return stopAt(
        of.span,
        'not-a-formula',
        `\`${formatExpression(of)}\` is ${kindInWords(value)}, which has no value at a point of s.`,
      );
  }
}

function infinite(value: FormulaValue): NoValue {
  return {
    kind: 'none',
    reason: 'it is infinite at this point, where its denominator is 0',
    growth: null,
    ...inherited(value, value),
  };
}

function atTime(value: Value, t: Ratio, of: Expression, scope: Scope, meanings: Meanings): Value {
  if (value.kind === 'none') return value;
  if (value.kind !== 'text' && value.kind !== 'signal') refuseTime(value, of);
  const { signOf, budget, write } = meanings.functionContext(scope);
  const response =
    value.kind === 'text' ? value.response : demand(responseOf(value, signOf, budget), of.span);
  const found = demand(responseAt(response, t, signOf, write), of.span);
  return formulaValue(found, {
    when: allOf([value.when, response.when]),
    notes: [...new Set([...value.notes, ...response.notes])],
  });
}

function refuseTime(value: Value, of: Expression): never {
  const text = formatExpression(of);
  stopAt(
    of.span,
    'not-in-time',
    `\`${text}\` is ${kindInWords(value)}, not a function of t; write \`response(${text}) with t = …\`.`,
  );
}
