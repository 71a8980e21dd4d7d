import { ratioKey } from './key.ts';
import type { Generator, GeneratorKind, Polynomial, Ratio } from './ring.ts';

const interned = new Map<string, Generator>();

function intern(generator: Generator): Generator {
  const known = interned.get(generator.key);
  if (known) return known;
  const frozen = Object.freeze(generator);
  interned.set(frozen.key, frozen);
  return frozen;
}

function plain(kind: GeneratorKind, name: string, square?: Ratio): Generator {
  const key = `${kind}:${name}`;
  return intern(square ? { kind, key, name, square } : { kind, key, name });
}

function constant(value: bigint): Polynomial {
  const coefficients = Object.freeze([value]);
  return Object.freeze({
    kind: 'polynomial',
    generators: Object.freeze([]),
    exponents: new Int32Array(0),
    coefficients,
    degrees: Object.freeze([]),
  });
}

const minusOne: Ratio = Object.freeze({ kind: 'ratio', num: constant(-1n), den: constant(1n) });

/** The Laplace variable s, first in the order of generators. */
export const laplace: Generator = plain('laplace', 's');

/** The imaginary unit j, with j² = −1. */
export const imaginary: Generator = plain('imaginary', 'j', minusOne);

/** The number pi, exact. */
export const pi: Generator = plain('constant', 'pi');

/** The symbol of a name; the same name gives the same generator. */
export function symbol(name: string): Generator {
  return plain('symbol', name);
}

/**
 * The opaque function of exact arguments, such as exp(−s Td), as a generator. It does not simplify; see
 * `applyFunction`. For `sqrt` the relation sqrt(a)² = a is kept on it. What depends on s only through arguments in which
 * `binds` is s does not depend on s.
 */
export function functionOf(name: string, args: readonly Ratio[], binds?: Generator): Generator {
  const key = `function:${name}(${args.map(ratioKey).join(',')})`;
  const known = interned.get(key);
  if (known) return known;
  const generator = { kind: 'function' as const, key, name, args: Object.freeze([...args]) };
  if (binds) return intern({ ...generator, binds });
  return intern(name === 'sqrt' ? { ...generator, square: args[0] } : generator);
}

const KIND_ORDER: Readonly<Record<GeneratorKind, number>> = {
  laplace: 0,
  imaginary: 1,
  constant: 2,
  symbol: 3,
  function: 4,
};

/** The canonical order: s first, then by kind and name, whatever was created first. */
export function compareGenerators(a: Generator, b: Generator): number {
  if (a === b) return 0;
  const kinds = KIND_ORDER[a.kind] - KIND_ORDER[b.kind];
  if (kinds !== 0) return kinds;
  if (a.name !== b.name) return a.name < b.name ? -1 : 1;
  return a.key < b.key ? -1 : 1;
}

function argumentPolynomials(g: Generator): Polynomial[] {
  return (g.args ?? []).flatMap((r) => [r.num, r.den]);
}

/** All generators that occur in these, those inside the arguments of functions included, in canonical order. */
export function generatorsWithin(generators: Iterable<Generator>): readonly Generator[] {
  const found = new Set<Generator>();
  const visit = (g: Generator): void => {
    if (found.has(g)) return;
    found.add(g);
    for (const p of argumentPolynomials(g)) p.generators.forEach(visit);
  };
  for (const g of generators) visit(g);
  return [...found].sort(compareGenerators);
}

/** Whether a generator is `other`, or a function whose arguments contain it. */
export function generatorDependsOn(g: Generator, other: Generator): boolean {
  if (g === other) return true;
  if (g.binds === other) return false;
  return argumentPolynomials(g).some((p) =>
    p.generators.some((inner) => generatorDependsOn(inner, other)),
  );
}

/** Whether a generator is s, or a function whose arguments contain s. */
export function dependsOnLaplace(g: Generator): boolean {
  return generatorDependsOn(g, laplace);
}
