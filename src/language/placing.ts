import type { Problem, Span } from '../base/index.ts';

/** A span moved by `by` characters. */
export function offsetSpan(span: Span, by: number): Span {
  return { from: span.from + by, to: span.to + by };
}

/** A problem (and the edits of its fixes) with spans relative to `from`, as one with spans in the whole text. */
export function placeProblem(problem: Problem, from: number): Problem {
  return {
    ...problem,
    span: offsetSpan(problem.span, from),
    fixes: problem.fixes.map((fix) => ({
      ...fix,
      edits: fix.edits.map((edit) => ({ ...edit, span: offsetSpan(edit.span, from) })),
    })),
  };
}
