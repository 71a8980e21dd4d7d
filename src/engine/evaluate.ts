import { parseRational, ratioFromRational, type Rational } from '../algebra/index.ts';
import type { Span } from '../base/index.ts';
import {
  allOf,
  compare,
  differentiateSignal,
  type Comparison,
  type Condition,
  type MatrixValue,
  type Value,
} from '../control/index.ts';
import type {
  Arrow,
  Call,
  Derivative,
  Expression,
  Member,
  NumberLiteral,
  Product,
  Sum,
  With,
} from '../language/index.ts';
import {
  addValues,
  divValues,
  formulaValue,
  kindInWords,
  mulValues,
  negateValue,
  powValues,
} from './arithmetic.ts';
import { atLaplacePoint, valueAt } from './at-point.ts';
import { callFunction } from './calls.ts';
import type { Meanings } from './meanings.ts';
import { quantityRatio, requireUnit } from './quantities.ts';
import { replacementsOf } from './replacements.ts';
import type { Scope } from './scope.ts';
import { stopAt, waitFor } from './stop.ts';
import { signalPath, transferOf } from './signals.ts';

/** The value of a formula in a scope; stops with a problem at its place where it has none. */
export function evaluate(expression: Expression, scope: Scope, meanings: Meanings): Value {
  const inner = (part: Expression) => evaluate(part, scope, meanings);
  switch (expression.kind) {
    case 'number':
      return formulaValue(ratioFromRational(numberOf(expression)));
    case 'quantity':
      return formulaValue(quantityRatio(expression, meanings));
    case 'name':
      return meanings.valueOf(expression.name, expression.wordSpan ?? expression.span, scope);
    case 'member':
      return memberValue(expression, scope, meanings);
    case 'derivative':
      return derivativeValue(expression, inner(expression.of));
    case 'call':
      return callValue(expression, scope, meanings);
    case 'evaluation':
      return evaluateAt(expression.name, expression.nameSpan, expression.at, scope, meanings);
    case 'sum':
      return sumValue(expression, inner);
    case 'product':
      return productValue(expression, inner);
    case 'negation':
      return negateValue(inner(expression.of), expression.span);
    case 'power':
      return powValues(inner(expression.base), inner(expression.exponent), expression.span);
    case 'relation':
      return conditionValue(expression.sides.map(inner), expression.operators, expression.span);
    case 'logical':
      return logicalValue(expression.operator, expression.operands.map(inner), expression.span);
    case 'not':
      return notValue(inner(expression.of), expression.span);
    case 'with':
      return withValue(expression, scope, meanings);
    case 'in-unit':
      requireUnit(expression, meanings);
      return inner(expression.of);
    case 'arrow':
    case 'limit':
    case 'rows':
    case 'text':
      return misplaced(expression);
  }
}

/** A number is refused where a double cannot hold it. */
function numberOf({ text, span }: NumberLiteral): Rational {
  const size = Math.abs(Number(text));
  const isTooSmall = size < 1e-300 && /[1-9]/.test(text.split(/e/i)[0]);
  if (size > 1e300 || isTooSmall)
    stopAt(span, 'number-range', `\`${text}\` is not a number within 1e±300.`);
  return parseRational(text);
}

function misplaced(expression: Expression): never {
  const where = {
    arrow: 'An arrow stands between an input and a signal in the brackets of a loop, `az(w -> e)`.',
    limit: '`x as s to 0` stands in the brackets of `limit`.',
    rows: 'Rows stand in the brackets of `rows`.',
    text: 'Text in quotes is the name of a file, and no function here takes one.',
  }[expression.kind as 'arrow'];
  stopAt(expression.span, 'misplaced', where);
}

function sumValue(sum: Sum, inner: (part: Expression) => Value): Value {
  return sum.terms
    .map((term, index) =>
      sum.signs[index] < 0 ? negateValue(inner(term), term.span) : inner(term),
    )
    .reduce((total, term) => addValues(total, term, sum.span));
}

function productValue(product: Product, inner: (part: Expression) => Value): Value {
  return product.factors
    .map(inner)
    .reduce((total, factor, index) =>
      product.inverted[index]
        ? divValues(total, factor, product.span)
        : mulValues(total, factor, product.span),
    );
}

function memberValue(member: Member, scope: Scope, meanings: Meanings): Value {
  const { root, path, rootScope } = signalPath(member, scope, meanings);
  const kind = meanings.kindOf(root.name);
  if (kind === 'case') return meanings.signalOf(root.name, path, member.span, rootScope);
  if (kind === 'definition')
    return partOf(meanings.valueOf(root.name, root.span, rootScope), path, member);
  if (kind === 'loop') {
    stopAt(
      member.span,
      'signal-without-case',
      `${root.name} is a loop; its signals have values only in a load case. ` +
        `Write a \`case … of ${root.name}\` and name the signal with it, or ask for \`${root.name}(input -> ${path})\`.`,
    );
  }
  meanings.valueOf(root.name, root.span, rootScope);
  stopAt(
    member.span,
    'no-member',
    `${root.name} has no parts; only load cases and lists of results have.`,
  );
}

function partOf(value: Value, path: string, member: Member): Value {
  if (value.kind !== 'parts')
    stopAt(member.span, 'no-member', `${kindInWords(value)} has no part ${path}.`);
  const part = value.parts.find((candidate) => candidate.name === path);
  if (part) return part.value;
  const names = value.parts.map((candidate) => candidate.name).join(', ');
  stopAt(member.nameSpan, 'no-member', `There is no part ${path}; the parts are ${names}.`);
}

function derivativeValue(derivative: Derivative, of: Value): Value {
  if (of.kind !== 'signal') {
    stopAt(
      derivative.span,
      'not-a-signal',
      `\`'\` is the time derivative of a signal, not of ${kindInWords(of)}.`,
    );
  }
  return differentiateSignal(of, derivative.order);
}

function callValue(call: Call, scope: Scope, meanings: Meanings): Value {
  const kind = meanings.kindOf(call.callee);
  if (kind === 'unavailable') waitFor(call.callee);
  if (kind === 'loop') return loopCall(call, scope, meanings);
  return callFunction(call, scope, meanings);
}

function loopCall(call: Call, scope: Scope, meanings: Meanings): Value {
  const arrow =
    call.args.length === 1 && call.args[0].kind === 'arrow' ? (call.args[0] as Arrow) : null;
  if (!arrow) {
    stopAt(
      call.span,
      'no-arrow',
      `${call.callee} is a loop: ask for a transfer function with \`${call.callee}(input -> signal)\`.`,
    );
  }
  const loop = meanings.loopOf(call.callee, call.calleeSpan, scope);
  const transfers = arrow.to.map((target) =>
    transferOf(loop, arrow.from, target, meanings.functionContext(scope).write),
  );
  if (transfers.length === 1) return transfers[0];
  const matrix: MatrixValue = {
    kind: 'matrix',
    rows: transfers.map((transfer) => [transfer.ratio]),
    when: transfers[0].when,
    notes: [...new Set(transfers.flatMap((transfer) => transfer.notes))],
  };
  return matrix;
}

function evaluateAt(
  name: string,
  nameSpan: Span,
  at: Expression,
  scope: Scope,
  meanings: Meanings,
): Value {
  const value = meanings.valueOf(name, nameSpan, scope);
  if (at.kind === 'name' && at.name === 's') return value;
  const place = evaluate(at, scope, meanings);
  if (place.kind !== 'formula')
    stopAt(at.span, 'not-a-point', `A point of s is a number, not ${kindInWords(place)}.`);
  return atLaplacePoint(value, place.ratio, { kind: 'name', name, span: nameSpan }, meanings);
}

/** `a < b <= c` is (a < b) and (b <= c). */
function conditionValue(
  sides: readonly Value[],
  operators: readonly Comparison[],
  span: Span,
): Value {
  const absent = sides.find((side) => side.kind === 'none');
  if (absent) return absent;
  const conditions = operators.map((operator, index) => {
    const [left, right] = [sides[index], sides[index + 1]];
    if (left.kind === 'formula' && right.kind === 'formula')
      return compare(left.ratio, operator, right.ratio);
    const odd = left.kind === 'formula' ? right : left;
    stopAt(
      span,
      'not-comparable',
      `${kindInWords(odd)} cannot be compared; compare a number that is read from it.`,
    );
  });
  return condition(allOf(conditions), sides);
}

function condition(of: Condition, from: readonly Value[]): Value {
  return {
    kind: 'condition',
    condition: of,
    when: allOf(from.map((value) => value.when)),
    notes: [...new Set(from.flatMap((value) => value.notes))],
  };
}

function conditionIn(value: Value, span: Span): Condition {
  if (value.kind === 'condition') return value.condition;
  stopAt(
    span,
    'not-a-condition',
    `\`and\`, \`or\` and \`not\` join conditions, not ${kindInWords(value)}.`,
  );
}

function logicalValue(operator: 'and' | 'or', operands: readonly Value[], span: Span): Value {
  const absent = operands.find((operand) => operand.kind === 'none');
  if (absent) return absent;
  const conditions = operands.map((operand) => conditionIn(operand, span));
  return condition(
    operator === 'and' ? allOf(conditions) : { kind: 'any', of: conditions },
    operands,
  );
}

function notValue(of: Value, span: Span): Value {
  if (of.kind === 'none') return of;
  return condition({ kind: 'not', of: conditionIn(of, span) }, [of]);
}

function withValue(expression: With, scope: Scope, meanings: Meanings): Value {
  const { inside, point } = replacementsOf(expression, scope, meanings);
  const value = evaluate(expression.of, inside, meanings);
  return point.size === 0 ? value : valueAt(value, point, expression.of, inside, meanings);
}
