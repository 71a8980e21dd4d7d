import { typesetName } from '../language/index.ts';
import { element, escape, type Svg } from './svg.ts';

/** Size of a subscript against its letter, and how far below it stands, in heights of the letter. */
const SUBSCRIPT = { size: 0.75, drop: 0.22 };

const WORD = /(\p{L}[\p{L}\p{M}\d]*(?:_[\p{L}\p{M}\d]+)*)/u;

/**
 * A label with names of the worksheet set as names are: `Kp` as an italic K with the subscript p, a word upright. The
 * characters stay those of the name, but for the marks between subscripts.
 *
 * @param isName which words of the label are names; other words, such as units, stay as they are
 * @param size of the letters, in pixels
 */
export function labelText(label: string, isName: (word: string) => boolean, size: number): Svg {
  const pieces = label.split(WORD);
  return pieces
    .map((piece, i) => {
      if (i % 2 === 1) return isName(piece) ? nameText(piece, size) : escape(piece);
      const before = pieces[i - 1] ?? '';
      if (piece === '' || !isName(before) || !hasSubscript(before)) return escape(piece);
      return element('tspan', { dy: -SUBSCRIPT.drop * size }, escape(piece));
    })
    .join('');
}

/** A name; what follows its subscript has to be lifted to the line again. */
function nameText(name: string, size: number): Svg {
  const { base, subscripts } = typesetName(name);
  const letter = isLetter(base) ? element('tspan', { 'font-style': 'italic' }, base) : escape(base);
  if (subscripts.length === 0) return letter;
  const below = { dy: SUBSCRIPT.drop * size, 'font-size': SUBSCRIPT.size * size };
  return letter + element('tspan', below, escape(subscripts.join(',')));
}

function hasSubscript(name: string): boolean {
  return typesetName(name).subscripts.length > 0;
}

function isLetter(base: string): boolean {
  return /^\p{L}\p{M}*$/u.test(base);
}
