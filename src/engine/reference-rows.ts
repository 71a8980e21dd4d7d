import type { Reference } from '../language/index.ts';
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
