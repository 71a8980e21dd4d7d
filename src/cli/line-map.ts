/** 1-based line and column; a column counts characters as editors do, in UTF-16 units. */
export interface Position {
  readonly line: number;
  readonly column: number;
}

/** Translates offsets in a text into lines and columns. */
export interface LineMap {
  position(offset: number): Position;
  /** The offset just after the last character of a 1-based line, before its line end. */
  lineEnd(line: number): number;
}

/** Makes the map of a text; a line ends at CR LF, LF or CR. Looking up is logarithmic in the number of lines. */
export function lineMap(text: string): LineMap {
  const ends = [...text.matchAll(/\r\n|\n|\r/g)];
  const starts = [0, ...ends.map((end) => end.index + end[0].length)];
  return {
    position(offset) {
      const line = countUpTo(starts, offset);
      return { line, column: offset - starts[line - 1] + 1 };
    },
    lineEnd: (line) => ends[line - 1]?.index ?? text.length,
  };
}

/** How many of the ascending numbers are at most `bound`. */
function countUpTo(ascending: readonly number[], bound: number): number {
  let [low, high] = [0, ascending.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ascending[middle] <= bound) low = middle + 1;
    else high = middle;
  }
  return low;
}
