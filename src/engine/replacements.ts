import type { Ratio } from '../algebra/index.ts';
import type { Span } from '../base/index.ts';
import type { Value } from '../control/index.ts';
import type { Expression, With } from '../language/index.ts';
import { kindInWords } from './arithmetic.ts';
import type { Point } from './at-point.ts';
import type { Meanings } from './meanings.ts';
import { narrowScope, replacementKey, type ReplacementValue, type Scope } from './scope.ts';
import { stopAt } from './stop.ts';

/** The scope inside a `with`, and the values given to s and t in it. */
export function replacementsOf(
  expression: With,
  scope: Scope,
  meanings: Meanings,
): { inside: Scope; point: Point } {
  const replacements = new Map<string, ReplacementValue>();
  const point = new Map<'s' | 't', Ratio>();
  for (const replacement of expression.replacements) {
    if (replacement.name === 's' || replacement.name === 't') {
      point.set(
        replacement.name,
        parameterOf(meanings.evaluate(replacement.value, scope), replacement.value.span),
      );
      continue;
    }
    meanings.requireReplaceable(replacement.name, replacement.nameSpan);
    replacements.set(replacement.name, replacementValue(replacement.value, scope, meanings));
  }
  return { inside: replacements.size === 0 ? scope : narrowScope(scope, replacements), point };
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
  stopAt(span, 'not-a-formula', `A formula is needed here, not ${kindInWords(value)}.`);
}
