import { element } from './element.ts';
import { withMinus } from './minus.ts';

/** A sentence as nodes: what stands between backticks is set as code. */
export function spoken(sentence: string): (Node | string)[] {
  return sentence
    .split('`')
    .map((piece, index) => (index % 2 === 1 ? element('code', '', piece) : withMinus(piece)))
    .filter((piece) => piece !== '');
}
