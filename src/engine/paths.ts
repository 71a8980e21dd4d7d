import { childrenOf, type Expression } from '../language/index.ts';

/** `x.theta` as a path of names, or null where the root is not a name. */
export function memberPath(expression: Expression): string | null {
  if (expression.kind === 'name') return expression.name;
  if (expression.kind !== 'member') return null;
  const inner = memberPath(expression.of);
  return inner === null ? null : `${inner}.${expression.name}`;
}

/**
 * The names that stand for values in a formula, members as whole paths, in order. Functions, signals in `->` and the
 * names that a `with` replaces are not among them.
 */
export function pathsIn(expression: Expression): string[] {
  const path = memberPath(expression);
  if (path !== null) return [path];
  if (expression.kind === 'arrow') return [];
  const own = expression.kind === 'evaluation' ? [expression.name] : [];
  return [...own, ...childrenOf(expression).flatMap(pathsIn)];
}
