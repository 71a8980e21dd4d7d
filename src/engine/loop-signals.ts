import type { LoopStatement } from '../language/index.ts';
import type { Entry } from './catalogue.ts';
import { pathsIn } from './paths.ts';

/**
 * The names that stand for signals in a loop's text: its inputs, and the names in its equations, and in those of the loops
 * it uses, that nothing else defines. Read from the text alone, for hints.
 */
export function signalsInText(
  loop: LoopStatement,
  entries: ReadonlyMap<string, Entry>,
  seen: ReadonlySet<LoopStatement> = new Set(),
): ReadonlySet<string> {
  if (seen.has(loop)) return new Set();
  const names = loop.equations
    .flatMap(({ left, right }) => [...pathsIn(left), ...pathsIn(right)])
    .filter((name) => !entries.has(name.split('.')[0]));
  const used = loop.uses.flatMap((use) => {
    const inner = entries.get(use.loop.name);
    if (inner?.kind !== 'loop') return [];
    const prefix = use.prefix ? `${use.prefix.name}.` : '';
    const signals = signalsInText(inner.node, entries, new Set([...seen, loop]));
    return [...signals].map((name) => prefix + name);
  });
  return new Set([...loop.inputs.map((input) => input.name), ...names, ...used]);
}
