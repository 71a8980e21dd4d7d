import { ExternalTokenizer, type InputStream } from '@lezer/lr';
import { Name, Stray } from './loop.grammar.terms';

const LETTER = /\p{L}/u;
const NAME_CHARACTER = /[\p{L}\p{M}\d_]/u;
const NEWLINE = 10;

function characterAt(input: InputStream, offset: number): string {
  const first = input.peek(offset);
  if (first < 0) return '';
  const isPair = first >= 0xd800 && first < 0xdc00;
  const second = isPair ? input.peek(offset + 1) : -1;
  const isWhole = second >= 0xdc00 && second < 0xe000;
  return isWhole ? String.fromCharCode(first, second) : String.fromCharCode(first);
}

/** A name: a Unicode letter followed by letters, combining marks, digits and `_`. */
export const names = new ExternalTokenizer((input) => {
  let character = characterAt(input, 0);
  if (!LETTER.test(character)) return;
  let length = 0;
  while (character !== '' && NAME_CHARACTER.test(character)) {
    length += character.length;
    character = characterAt(input, length);
  }
  input.acceptToken(Name, length);
});

/** Any character that belongs to no other token, so that every text has tokens. */
export const strays = new ExternalTokenizer(
  (input) => {
    if (input.next < 0 || input.next === NEWLINE) return;
    input.acceptToken(Stray, characterAt(input, 0).length);
  },
  { fallback: true },
);
