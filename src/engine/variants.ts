import { conditionKey, type Value } from '../control/index.ts';
import { ratioKey } from '../algebra/index.ts';
import type { Derivations } from './derivations.ts';
import { asMagnitude, plainName, type Compiled, type Numbers, type Subject } from './numbers.ts';
import { isMonotone, isMonotoneCondition } from './tolerance.ts';

/**
 * A subject as it is derived where certain names are exactly 0. The first variant is that of the nominal values; the
 * others belong to the faces of the tolerance box on which a name vanishes that a derivation may have divided by.
 */
export interface Variant {
  /** Toleranced names that are exactly 0 in it, besides those that are so at the nominal. */
  readonly zeros: readonly string[];
  /** Null where nothing can be derived. */
  readonly compiled: Compiled | null;
}

/** Faces are told apart for up to this many names that a tolerance can make 0. */
const MOST_VANISHING_NAMES = 4;

/** All variants of a subject that its tolerances reach. */
export function variantsOf(subject: Subject, numbers: Numbers): readonly Variant[] {
  const fixed = numbers
    .zeros(subject)
    .filter((name) => !canVanish(name, numbers) && !numbers.movesWithTolerance(name));
  const vanishing = [...subject.reach].filter((name) => canVanish(name, numbers));
  return subsetsOf(vanishing.slice(0, MOST_VANISHING_NAMES)).map((zeros) => ({
    zeros,
    compiled: numbers.compiled(subject, numbers.zeroScope([...fixed, ...zeros])),
  }));
}

/** Whether a tolerance of this name holds 0. */
function canVanish(name: string, numbers: Numbers): boolean {
  const bounds = numbers.bounds(name);
  return bounds !== null && bounds[0] <= 0 && bounds[1] >= 0;
}

function subsetsOf(names: readonly string[]): readonly (readonly string[])[] {
  return names.reduce<readonly (readonly string[])[]>(
    (subsets, name) => [...subsets, ...subsets.map((subset) => [...subset, name])],
    [[]],
  );
}

/** The toleranced names that move a subject: those in one of its variants, and those that lead from one to another. */
export function movingNames(variants: readonly Variant[], numbers: Numbers): readonly string[] {
  const names = new Set<string>();
  for (const { compiled, zeros } of variants) {
    for (const input of compiled?.inputs ?? []) {
      if (plainName(input) === input && numbers.bounds(input) !== null) names.add(input);
    }
    if (keyOf(compiled) !== keyOf(variants[0].compiled)) zeros.forEach((name) => names.add(name));
  }
  return [...names];
}

function keyOf(compiled: Compiled | null): string {
  if (!compiled) return 'nothing';
  const { value } = compiled;
  return `${valueKey(value)} when ${conditionKey(value.when)}`;
}

function valueKey(value: Value): string {
  if (value.kind === 'formula') return ratioKey(value.ratio);
  return value.kind === 'condition' ? conditionKey(value.condition) : value.kind;
}

/** Whether the corners of the box are enough: every variant is proved monotone, and so is what its existence needs. */
export function isMonotoneSubject(
  variants: readonly Variant[],
  names: readonly string[],
  numbers: Numbers,
  derivations: Derivations,
): boolean {
  return variants.every(({ compiled }) => {
    if (!compiled) return false;
    const { value } = compiled;
    return (
      isMonotoneValue(value, names, numbers, derivations) &&
      isMonotoneCondition(value.when, names, numbers, derivations)
    );
  });
}

function isMonotoneValue(
  value: Value,
  names: readonly string[],
  numbers: Numbers,
  derivations: Derivations,
): boolean {
  if (value.kind === 'condition')
    return isMonotoneCondition(value.condition, names, numbers, derivations);
  if (value.kind !== 'formula') return true;
  const opened = numbers.opened(value.ratio);
  return isMonotone(asMagnitude(opened)?.inner ?? opened, names, numbers, derivations);
}
