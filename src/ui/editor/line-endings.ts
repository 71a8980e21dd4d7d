/**
 * A worksheet's text is edited with `\n` between its lines; what stood in the file (`\r\n`, a lone `\r`, a byte
 * order mark) is kept beside it, so that saving writes the very bytes that were read where nothing was changed.
 */
export type LineEnding = '\n' | '\r\n' | '\r';

/** A file's text taken apart: `plain` is what is edited. */
export interface SplitText {
  readonly plain: string;
  readonly mark: '' | '\uFEFF';
  /** The ending that most lines have, and that new lines get. */
  readonly usual: LineEnding;
  /** Offsets in `plain` of the line ends that are not the usual one. */
  readonly unusual: ReadonlyMap<number, LineEnding>;
}

/** Takes a file's text apart. */
export function splitText(text: string): SplitText {
  const mark = text.startsWith('\uFEFF') ? '\uFEFF' : '';
  const endings: LineEnding[] = [];
  const plain = text.slice(mark.length).replace(/\r\n?|\n/gu, (ending) => {
    endings.push(ending as LineEnding);
    return '\n';
  });
  const usual = mostFrequent(endings);
  const unusual = new Map<number, LineEnding>();
  let place = -1;
  for (const ending of endings) {
    place = plain.indexOf('\n', place + 1);
    if (ending !== usual) unusual.set(place, ending);
  }
  return { plain, mark, usual, unusual };
}

/** Puts a file's text together again: the inverse of {@link splitText}. */
export function joinText({ plain, mark, usual, unusual }: SplitText): string {
  if (usual === '\n' && unusual.size === 0) return mark + plain;
  let place = -1;
  return (
    mark +
    plain.replace(/\n/gu, () => {
      place = plain.indexOf('\n', place + 1);
      return unusual.get(place) ?? usual;
    })
  );
}

function mostFrequent(endings: readonly LineEnding[]): LineEnding {
  const count = (kind: LineEnding) => endings.filter((ending) => ending === kind).length;
  const kinds: LineEnding[] = ['\n', '\r\n', '\r'];
  return kinds.reduce((best, kind) => (count(kind) > count(best) ? kind : best), '\n');
}
