import { warningAt, type Problem } from '../base/index.ts';
import { nearestName, type Reference } from '../language/index.ts';
import type { Derivations } from './derivations.ts';
import type { Placed, Report, ResultContent } from './report.ts';
import type { Statements } from './statements.ts';

/** The present values of the names that prose refers to, `{e_ss}`. */
export function referenceRows(
  references: readonly Reference[],
  results: readonly Placed<ResultContent>[],
  statements: Statements,
): Report['references'] {
  const shown = new Map(
    results.map(({ content }) => [content.name, content.shown ?? content.formula] as const),
  );
  return references.map(({ from, to, name }) => ({
    from,
    to,
    name,
    shown: shown.get(name) ?? statements.shownAssumption(name),
  }));
}

/** A name in prose that nothing introduces stays as typed, which is said. */
export function referenceProblems(
  references: readonly Reference[],
  derivations: Derivations,
): readonly Problem[] {
  return references.flatMap(({ from, to, name }) => {
    const [root] = name.split('.');
    if (derivations.kindOf(root) !== null) return [];
    const near = nearestName(root, derivations.knownNames());
    const message = `Nothing introduces ${root}, so this stays as typed.${near ? ` Is ${near} meant?` : ''}`;
    const fixes = near
      ? [
          {
            title: `Write ${near}`,
            edits: [
              {
                span: { from: from + 1, to: to - 1 },
                insert: [near, ...name.split('.').slice(1)].join('.'),
              },
            ],
          },
        ]
      : [];
    return [warningAt({ from, to }, 'unknown-reference', message, fixes)];
  });
}
