import { dependsOnLaplace, laplace, symbol, type Generator, type Sign } from '../algebra/index.ts';

/** What the worksheet knows about its symbols that decides in which order and shape a formula is written. */
export interface Writing {
  /** Place at which the worksheet introduces a symbol; symbols are written in this order. */
  readonly order: (g: Generator) => number;
  /** Gains to be chosen: conditions are solved for them first. */
  readonly tuned: readonly Generator[];
  readonly signOf: (g: Generator) => Sign;
}

/** The same, with the time t written behind all other symbols. */
export function timeLast(writing: Writing): Writing {
  const last = symbol('t');
  return { ...writing, order: (g) => (g === last ? Number.MAX_SAFE_INTEGER : writing.order(g)) };
}

/**
 * How much of a formula's structure is shown: `readable` pulls out what makes it shorter, `expanded` multiplies out,
 * `factored` shows every factor found; the last two are the normal forms of transfer functions.
 */
export type Shape = 'readable' | 'expanded' | 'factored' | 'time constants' | 'poles and zeros';

/** Everything that decides how a formula is written. Sums are collected by descending powers of `main`. */
export interface Layout {
  readonly writing: Writing;
  readonly shape: Shape;
  readonly main: Generator;
}

/** The layout of a formula: readable and collected by s, unless something else is asked for. */
export function layoutOf(
  writing: Writing,
  shape: Shape = 'readable',
  main: Generator = laplace,
): Layout {
  return { writing, shape, main };
}

/**
 * The order of factors in a product: π, parameters as the worksheet introduces them, j, functions of parameters, then
 * s, then functions of s (dead time).
 */
export function compareFactors(a: Generator, b: Generator, writing: Writing): number {
  const ranks = factorRank(a) - factorRank(b);
  if (ranks !== 0) return ranks;
  const orders = writing.order(a) - writing.order(b);
  if (orders !== 0 && !Number.isNaN(orders)) return orders;
  return a.key < b.key ? -1 : a.key > b.key ? 1 : 0;
}

function factorRank(g: Generator): number {
  switch (g.kind) {
    case 'constant':
      return 0;
    case 'symbol':
      return 1;
    case 'imaginary':
      return 2;
    case 'laplace':
      return 4;
    case 'function':
      return dependsOnLaplace(g) ? 5 : 3;
  }
}
