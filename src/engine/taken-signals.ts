import { errorAt, type Problem, type Span } from '../base/index.ts';
import {
  nameToText,
  offsetSpan,
  walk,
  type Expression,
  type LoopStatement,
  type PlacedStatement,
} from '../language/index.ts';

/** A loop whose equations use a name as a signal that is given a value elsewhere, and is a coefficient therefore. */
export interface TakenSignal {
  readonly loop: string;
  readonly problem: Problem;
}

/**
 * Finds the names that a loop uses as only a signal can be used (as an input, with a `'`, alone on the left of an
 * equation) although a statement outside gives them a value.
 */
export function takenSignals(
  node: LoopStatement,
  placed: PlacedStatement,
  givenAt: (name: string) => number | null,
  lineOf: (offset: number) => number,
): TakenSignal[] {
  const seen = new Set<string>();
  return signalUses(node).flatMap(({ name, span, shown }) => {
    const given = givenAt(name);
    if (given === null || seen.has(name)) return [];
    seen.add(name);
    const line = lineOf(placed.from + span.from);
    const message =
      `${nameToText(name)} is given in line ${given}, so it is a coefficient of ${node.name}, ` +
      `but line ${line} uses it as a signal (${shown}); rename one of the two.`;
    const problem = errorAt(offsetSpan(span, placed.from), 'signal-taken', message);
    return [{ loop: node.name, problem }];
  });
}

interface SignalUse {
  readonly name: string;
  readonly span: Span;
  /** What shows that it is meant as a signal. */
  readonly shown: string;
}

function signalUses(node: LoopStatement): SignalUse[] {
  const inputs = node.inputs.map((input) => ({ ...input, shown: 'an input' }));
  const inEquations = node.equations.flatMap(({ left, right }) => [
    ...derivativesIn(left),
    ...derivativesIn(right),
    ...(left.kind === 'name' ? [{ ...left, shown: 'the left side of an equation' }] : []),
  ]);
  return [...inputs, ...inEquations];
}

function derivativesIn(expression: Expression): SignalUse[] {
  const uses: SignalUse[] = [];
  walk(expression, (part) => {
    if (part.kind !== 'derivative' || part.of.kind !== 'name') return;
    const shown = `\`${nameToText(part.of.name)}${"'".repeat(part.order)}\``;
    uses.push({ name: part.of.name, span: part.of.span, shown });
  });
  return uses;
}
