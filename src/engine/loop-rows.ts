import type { PlacedStatement } from '../language/index.ts';
import { expressionLatex } from '../present/index.ts';
import type { Derivations } from './derivations.ts';
import type { LoopContent, Placed } from './report.ts';
import { BASE_SCOPE } from './scope.ts';

/** The loops of a worksheet, for the page and the memo. */
export function loopRows(
  statements: readonly PlacedStatement[],
  derivations: Derivations,
  lineOf: (offset: number) => number,
): Placed<LoopContent>[] {
  return statements.flatMap(({ node, from, to }) => {
    if (node.kind !== 'loop') return [];
    const loop =
      derivations.kindOf(node.name) === 'loop' ? derivations.loop(node.name, BASE_SCOPE) : null;
    const content: LoopContent = {
      name: node.name,
      inputs: node.inputs.map((input) => input.name),
      unknowns: loop?.ok ? loop.value.unknowns : [],
      equationsLatex: node.equations.map(
        ({ left, right }) => `${expressionLatex(left)} = ${expressionLatex(right)}`,
      ),
    };
    return [{ from, to, line: lineOf(from), content }];
  });
}
