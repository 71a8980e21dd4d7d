import {
  mulRatios,
  pi,
  ratioFromRational,
  ratioOf,
  rational,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import type { Call, Expression, Product, Quantity } from '../language/index.ts';
import { parseUnit } from '../units/index.ts';
import { constantOf } from './constants.ts';
import type { Meanings } from './meanings.ts';

const TURN: Ratio = mulRatios(ratioFromRational(rational(2n)), ratioOf(pi));

/** f in cycles per second as an angular frequency, 2 π f. */
export function angularOf(frequency: Ratio): Ratio {
  return mulRatios(TURN, frequency);
}

/**
 * The power of hertz that the units in a formula make, read from the text: 1 for a frequency f, 0 for an angular
 * frequency, −1 for a density per Hz, −1/2 for an amplitude density; null where no unit is typed in it.
 *
 * `2 pi f1` is an angular frequency, and `omega/(2 pi)` a frequency (ISO 80000-3, items 3-17 and 3-18).
 */
export function cyclesIn(expression: Expression, meanings: Meanings): number | null {
  const inner = (part: Expression) => cyclesIn(part, meanings);
  switch (expression.kind) {
    case 'quantity':
      return cyclesOfUnit(expression.unit, meanings);
    case 'name':
      return cyclesOfName(expression.name, meanings);
    case 'negation':
    case 'with':
    case 'in-unit':
      return inner(expression.of);
    case 'sum':
      return expression.terms.map(inner).find((cycles) => cycles !== null) ?? null;
    case 'product':
      return cyclesOfProduct(expression, inner);
    case 'power': {
      const cycles = inner(expression.base);
      return cycles === null ? null : cycles * exponentIn(expression.exponent);
    }
    case 'call':
      return cyclesOfCall(expression, inner, meanings);
    default:
      return null;
  }
}

function cyclesOfUnit(text: Quantity['unit'], meanings: Meanings): number | null {
  if (text === '') return null;
  const unit = parseUnit(text, meanings.customUnits());
  return isRefusal(unit) ? null : unit.cycles;
}

function cyclesOfName(name: string, meanings: Meanings): number | null {
  const formula = meanings.formulaOf(name);
  if (formula) return cyclesIn(formula, meanings);
  return cyclesOfUnit(meanings.unitTextOf(name) ?? '', meanings);
}

function cyclesOfProduct(
  product: Product,
  inner: (part: Expression) => number | null,
): number | null {
  const known = product.factors.flatMap((factor, index) => {
    const cycles = inner(factor);
    return cycles === null ? [] : [product.inverted[index] ? -cycles : cycles];
  });
  if (known.length === 0) return null;
  const sum = known.reduce((a, b) => a + b, 0);
  const turns = powerOfPi(product);
  if (turns > 0 && sum === 1) return 0;
  return turns === -1 && sum === 0 ? 1 : sum;
}

/** How often π is a factor; negative where it divides. */
function powerOfPi(e: Expression): number {
  if (e.kind === 'name') return constantOf(e.name) && /^(pi|π)$/.test(e.name) ? 1 : 0;
  if (e.kind !== 'product') return 0;
  return e.factors.reduce(
    (sum, factor, index) => sum + (e.inverted[index] ? -1 : 1) * powerOfPi(factor),
    0,
  );
}

/** An exponent that is a number or a half; 1 where it is anything else, which is refused elsewhere. */
function exponentIn(e: Expression): number {
  if (e.kind === 'number') return Number(e.text);
  if (e.kind === 'negation') return -exponentIn(e.of);
  return e.kind === 'product' && e.inverted[1]
    ? exponentIn(e.factors[0]) / exponentIn(e.factors[1])
    : 1;
}

/** What a function returns is angular, but for those that keep the unit of their argument. */
function cyclesOfCall(
  call: Call,
  inner: (part: Expression) => number | null,
  meanings: Meanings,
): number | null {
  const rule = meanings.functionNamed(call.callee)?.unit;
  const first = call.args.length > 0 ? inner(call.args[0]) : null;
  if (rule === 'first' || rule === 'common') return first;
  if (rule === 'root') return first === null ? null : first / 2;
  return 0;
}
