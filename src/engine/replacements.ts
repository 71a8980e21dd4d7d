import type { Ratio } from '../algebra/index.ts';
import type { Span } from '../base/index.ts';
import type { Value } from '../control/index.ts';
import type { Expression, Replacement, With } from '../language/index.ts';
import { kindInWords } from './arithmetic.ts';
import type { Point } from './at-point.ts';
import type { Meanings } from './meanings.ts';
import { narrowScope, replacementKey, type ReplacementValue, type Scope } from './scope.ts';
import { stopAt } from './stop.ts';

/**
 * The scope inside a `with`, and the values given to s and t in it. Numbers (`Ki is 0`) are put in first, so that they hold
 * in the formulas that replace others too (`C = C2`, `s = j w`).
 */
export function replacementsOf(
  expression: With,
  scope: Scope,
  meanings: Meanings,
): { inside: Scope; point: Point } {
  refuseRepetition(expression.replacements);
  const isPoint = ({ name }: Replacement) => name === 's' || name === 't';
  const named = expression.replacements.filter((replacement) => !isPoint(replacement));
  for (const { name, nameSpan } of named) meanings.requireReplaceable(name, nameSpan);
  const replaced = (of: readonly Replacement[], within: Scope): Scope =>
    of.length === 0
      ? within
      : narrowScope(
          within,
          new Map(of.map(({ name, value }) => [name, replacementValue(value, within, meanings)])),
        );
  const numbersIn = replaced(
    named.filter(({ by }) => by === 'is'),
    scope,
  );
  const inside = replaced(
    named.filter(({ by }) => by === '='),
    numbersIn,
  );
  const point = expression.replacements.filter(isPoint).map(({ name, value }) => {
    const at = parameterOf(meanings.evaluate(value, numbersIn), value.span);
    return [name as 's' | 't', at] as const;
  });
  return { inside, point: new Map(point) };
}

function refuseRepetition(replacements: readonly Replacement[]): void {
  replacements.forEach(({ name, nameSpan }, index) => {
    if (replacements.findIndex((other) => other.name === name) === index) return;
    stopAt(nameSpan, 'replaced-twice', `${name} is replaced twice here; keep one.`);
  });
}

function replacementValue(
  expression: Expression,
  scope: Scope,
  meanings: Meanings,
): ReplacementValue {
  const value = meanings.evaluate(expression, scope);
  const fraction = value.kind === 'formula' ? meanings.evaluateFraction(expression, scope) : null;
  return { value, fraction, key: replacementKey(value, fraction) };
}

/** The ratio of a formula; stops where the value is something else. */
export function parameterOf(value: Value, span: Span): Ratio {
  if (value.kind === 'formula') return value.ratio;
  if (value.kind === 'none') stopAt(span, 'no-value', `This has no value: ${value.reason}.`);
  stopAt(span, 'not-a-formula', `A formula is needed here, not ${kindInWords(value)}.`);
}
