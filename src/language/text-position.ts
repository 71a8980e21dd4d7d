/** A place in a text as people count: lines and columns from 1, columns in UTF-16 units. */
export interface TextPosition {
  readonly line: number;
  readonly column: number;
}

/** Offsets at which the lines of a text start; lines end with `\n` or `\r\n`. */
export function lineStarts(text: string): readonly number[] {
  const starts = [0];
  for (let end = text.indexOf('\n'); end >= 0; end = text.indexOf('\n', end + 1))
    starts.push(end + 1);
  return starts;
}

/** The line and column of an offset, given the {@link lineStarts} of its text. */
export function positionAt(starts: readonly number[], offset: number): TextPosition {
  let low = 0;
  let high = starts.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (starts[middle]! <= offset) low = middle;
    else high = middle - 1;
  }
  return { line: low + 1, column: offset - starts[low]! + 1 };
}
