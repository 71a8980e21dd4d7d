import { polynomialKey } from '../algebra/index.ts';
import type { Fraction } from '../algebra/index.ts';
import type { Value } from '../control/index.ts';

/** What a name is replaced by in `x with …`. */
export interface ReplacementValue {
  readonly value: Value;
  /** Uncancelled form for use in loop equations; null where the value is not a formula. */
  readonly fraction: Fraction | null;
  /** Equal keys mean equal replacements. */
  readonly key: string;
}

/**
 * The names that are replaced while something is derived anew. The base scope replaces nothing; scopes nest, the inner
 * replacement winning. Two scopes with equal keys derive the same.
 */
export interface Scope {
  readonly key: string;
  readonly replacements: ReadonlyMap<string, ReplacementValue>;
}

export const BASE_SCOPE: Scope = Object.freeze({ key: '', replacements: new Map() });

/** The scope inside `with`: the outer replacements, then the new ones. */
export function narrowScope(
  outer: Scope,
  replacements: ReadonlyMap<string, ReplacementValue>,
): Scope {
  const merged = new Map([...outer.replacements, ...replacements]);
  const key = [...merged]
    .map(([name, replacement]) => `${name}=${replacement.key}`)
    .sort()
    .join(';');
  return { key, replacements: merged };
}

/** The outer scope, reduced to the replacements of names in `relevant`, so that equal derivations are shared. */
export function relevantScope(scope: Scope, relevant: ReadonlySet<string>): Scope {
  if (scope === BASE_SCOPE) return scope;
  const kept = new Map([...scope.replacements].filter(([name]) => relevant.has(name)));
  return kept.size === 0 ? BASE_SCOPE : narrowScope(BASE_SCOPE, kept);
}

const identities = new WeakMap<Value, number>();
let identityCount = 0;

/** The key of a replacement: of a formula its uncancelled fraction, of any other value the object itself. */
export function replacementKey(value: Value, fraction: Fraction | null): string {
  if (fraction) return `${polynomialKey(fraction.num)}/${polynomialKey(fraction.den)}`;
  const identity = identities.get(value) ?? ++identityCount;
  identities.set(value, identity);
  return `#${identity}`;
}
