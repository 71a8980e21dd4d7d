/** A half-open range of character offsets in a worksheet's text. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

/** The smallest span that holds both. */
export function coverSpans(a: Span, b: Span): Span {
  return { from: Math.min(a.from, b.from), to: Math.max(a.to, b.to) };
}
