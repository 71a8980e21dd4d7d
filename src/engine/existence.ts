import { ALWAYS, allOf, type Condition } from '../control/index.ts';
import { childrenOf, type Expression } from '../language/index.ts';
import type { Meanings } from './meanings.ts';
import { memberPath } from './paths.ts';
import type { Scope } from './scope.ts';

/**
 * What must hold for the coefficients of a formula to have a value: a final value of another loop that is used as a
 * gain exists only where that loop is stable. `isSignal` tells names that are signals, which have no value here.
 */
export function existenceOf(
  expression: Expression,
  scope: Scope,
  meanings: Meanings,
  isSignal: (name: string) => boolean,
): Condition {
  if (isSource(expression, isSignal)) return meanings.evaluate(expression, scope).when;
  if (expression.kind === 'member' && isSignal(memberPath(expression) ?? '')) return ALWAYS;
  const parts = childrenOf(expression).filter((part) => part.kind !== 'arrow');
  if (parts.length === 0) return ALWAYS;
  return allOf(parts.map((part) => existenceOf(part, scope, meanings, isSignal)));
}

/** Whether conditions can come from this part itself: it names something, or calls for it. */
function isSource(expression: Expression, isSignal: (name: string) => boolean): boolean {
  switch (expression.kind) {
    case 'name':
      return !isSignal(expression.name);
    case 'evaluation':
      return !isSignal(expression.name);
    case 'member':
      return !isSignal(memberPath(expression) ?? '');
    case 'call':
    case 'with':
      return true;
    default:
      return false;
  }
}
