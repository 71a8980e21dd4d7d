import type { Fix, Span, TextEdit } from '../base/index.ts';

/** Text put in at one place. */
export function insertion(at: number, insert: string): TextEdit {
  return { span: { from: at, to: at }, insert };
}

/** A fix that writes other text over a span. */
export function replacement(span: Span, insert: string, title = `write \`${insert}\``): Fix {
  return { title, edits: [{ span: { from: span.from, to: span.to }, insert }] };
}

/** A fix that puts brackets around a span. */
export function bracketing(span: Span, title: string): Fix {
  return { title, edits: [insertion(span.from, '('), insertion(span.to, ')')] };
}
