import type { LoopStatement, PlacedStatement } from '../language/index.ts';
import { expressionLatex } from '../present/index.ts';
import type { Derivations } from './derivations.ts';
import type { Queries } from './queries.ts';
import type { LoopContent, Placed } from './report.ts';
import { BASE_SCOPE } from './scope.ts';

/** The loops of a worksheet, for the page and the memo. */
export function loopRows(
  statements: readonly PlacedStatement[],
  queries: Queries,
  derivations: Derivations,
  lineOf: (offset: number) => number,
): Placed<LoopContent>[] {
  // A name that is given to two loops is an error, but each still shows its own equations.
  const seen = new Map<string, number>();
  return statements.flatMap(({ node, from, to }) => {
    if (node.kind !== 'loop') return [];
    const count = seen.get(node.name) ?? 0;
    seen.set(node.name, count + 1);
    const content = queries.get(
      `loop-row:${node.name}:${count}`,
      () => {
        queries.input('statements');
        return loopContent(node, derivations);
      },
      (a, b) => JSON.stringify(a) === JSON.stringify(b),
    );
    return [{ from, to, line: lineOf(from), content }];
  });
}

function loopContent(node: LoopStatement, derivations: Derivations): LoopContent {
  const { name } = node;
  const loop = derivations.kindOf(name) === 'loop' ? derivations.loop(name, BASE_SCOPE) : null;
  return {
    name,
    inputs: node.inputs.map((input) => input.name),
    unknowns: loop?.ok ? loop.value.unknowns : [],
    equationsLatex: node.equations.map(
      ({ left, right }) => `${expressionLatex(left)} = ${expressionLatex(right)}`,
    ),
  };
}
