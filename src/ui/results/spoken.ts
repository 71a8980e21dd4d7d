import { element } from './element.ts';

/** A sentence as nodes: what stands between backticks is set as code. */
export function spoken(sentence: string): (Node | string)[] {
  return sentence
    .split('`')
    .map((piece, index) => (index % 2 === 1 ? element('code', '', piece) : piece))
    .filter((piece) => piece !== '');
}
