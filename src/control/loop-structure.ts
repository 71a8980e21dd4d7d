/**
 * Which signals feed which: a matching of equations to unknowns and the blocks of signals that feed each other.
 *
 * Source of the decomposition: A. L. Dulmage and N. S. Mendelsohn, Coverings of bipartite graphs, Canad. J. Math. 10
 * (1958), and R. E. Tarjan, Depth-first search and linear graph algorithms, SIAM J. Comput. 1 (1972).
 *
 *     equation 0 ── x      incidence[0] = [x, y]: the unknowns that occur in equation 0
 *              ╲──  y
 *     equation 1 ── y      matching: 0 → x, 1 → y;  blocks: {y}, then {x}, which depends on it
 */
export type Incidence = readonly (readonly number[])[];

export interface Matching {
  /** The unknown that an equation determines; −1 where none is left for it. */
  readonly unknownOf: readonly number[];
  /** The equation that determines an unknown; −1 if none does. */
  readonly equationOf: readonly number[];
}

function augment(
  incidence: Incidence,
  equation: number,
  equationOf: number[],
  seen: Set<number>,
): boolean {
  for (const unknown of incidence[equation]) {
    if (seen.has(unknown)) continue;
    seen.add(unknown);
    const taken = equationOf[unknown];
    if (taken < 0 || augment(incidence, taken, equationOf, seen)) {
      equationOf[unknown] = equation;
      return true;
    }
  }
  return false;
}

/** A largest matching of equations to the `count` unknowns. */
export function matchEquations(incidence: Incidence, count: number): Matching {
  const equationOf = Array<number>(count).fill(-1);
  incidence.forEach((_, equation) => augment(incidence, equation, equationOf, new Set()));
  const unknownOf = Array<number>(incidence.length).fill(-1);
  equationOf.forEach((equation, unknown) => {
    if (equation >= 0) unknownOf[equation] = unknown;
  });
  return { unknownOf, equationOf };
}

export interface Fault {
  readonly equations: readonly number[];
  readonly unknowns: readonly number[];
}

/** Unknowns for which there are too few equations, and the equations they occur in. */
export function underdetermined(incidence: Incidence, matching: Matching): Fault {
  const unknowns = new Set(
    [...matching.equationOf.keys()].filter((u) => matching.equationOf[u] < 0),
  );
  const equations = new Set<number>();
  for (const unknown of unknowns) {
    incidence.forEach((row, equation) => {
      if (!row.includes(unknown)) return;
      equations.add(equation);
      if (matching.unknownOf[equation] >= 0) unknowns.add(matching.unknownOf[equation]);
    });
  }
  return sorted(equations, unknowns);
}

/** Equations of which there are too many, and the unknowns that occur in them. */
export function overdetermined(incidence: Incidence, matching: Matching): Fault {
  const equations = new Set(
    [...matching.unknownOf.keys()].filter((e) => matching.unknownOf[e] < 0),
  );
  const unknowns = new Set<number>();
  for (const equation of equations) {
    for (const unknown of incidence[equation]) {
      unknowns.add(unknown);
      if (matching.equationOf[unknown] >= 0) equations.add(matching.equationOf[unknown]);
    }
  }
  return sorted(equations, unknowns);
}

function sorted(equations: Iterable<number>, unknowns: Iterable<number>): Fault {
  const ascending = (a: number, b: number): number => a - b;
  return {
    equations: [...equations].sort(ascending),
    unknowns: [...unknowns].sort(ascending),
  };
}

interface Search {
  readonly feeds: readonly (readonly number[])[];
  readonly index: number[];
  readonly low: number[];
  readonly stack: number[];
  readonly components: number[][];
}

function visit(search: Search, unknown: number): void {
  const { feeds, index, low, stack, components } = search;
  index[unknown] = low[unknown] = index.filter((i) => i >= 0).length;
  stack.push(unknown);
  for (const other of feeds[unknown]) {
    if (index[other] < 0) visit(search, other);
    if (stack.includes(other)) low[unknown] = Math.min(low[unknown], low[other]);
  }
  if (low[unknown] !== index[unknown]) return;
  components.push(stack.splice(stack.indexOf(unknown)));
}

/**
 * The blocks of unknowns that feed each other, every block after those it depends on, unknowns ascending.
 *
 * `matching` is perfect: the equation of an unknown says what feeds it.
 */
export function blocksOfStructure(incidence: Incidence, matching: Matching): readonly number[][] {
  const feeds = matching.equationOf.map((equation, unknown) =>
    incidence[equation].filter((other) => other !== unknown),
  );
  const unvisited = (): number[] => feeds.map(() => -1);
  const search: Search = { feeds, index: unvisited(), low: unvisited(), stack: [], components: [] };
  feeds.forEach((_, unknown) => {
    if (search.index[unknown] < 0) visit(search, unknown);
  });
  return search.components.map((block) => block.sort((a, b) => a - b));
}
