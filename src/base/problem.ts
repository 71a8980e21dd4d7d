import type { Span } from './span.ts';

/** A replacement of the text in `span` by `insert`. */
export interface TextEdit {
  readonly span: Span;
  readonly insert: string;
}

/** A way out of a problem that one click applies; all edits refer to the text as it stands. */
export interface Fix {
  readonly title: string;
  readonly edits: readonly TextEdit[];
}

/**
 * A user's mistake, as a value: where, what, and how to mend it. `code` is stable and kebab-case, for tests and
 * styling; `message` is one sentence with the actual names and numbers.
 */
export interface Problem {
  readonly code: string;
  readonly severity: 'error' | 'warning';
  readonly span: Span;
  readonly message: string;
  readonly fixes: readonly Fix[];
}

/** An error at a place, with its fixes. */
export function errorAt(
  span: Span,
  code: string,
  message: string,
  fixes: readonly Fix[] = [],
): Problem {
  return { code, severity: 'error', span, message, fixes };
}

/** A warning at a place, with its fixes. */
export function warningAt(
  span: Span,
  code: string,
  message: string,
  fixes: readonly Fix[] = [],
): Problem {
  return { code, severity: 'warning', span, message, fixes };
}
