import { hoverTooltip } from '@codemirror/view';
import { element } from '../results/element.ts';
import { isInCell } from './cells.ts';
import { vocabularyWord } from './completion.ts';

/** Help on the function under the pointer. */
export const functionHelp = hoverTooltip((view, place) => {
  const word = view.state.wordAt(place);
  if (!word || !isInCell(view.state, place)) return null;
  const entry = vocabularyWord(view.state, view.state.sliceDoc(word.from, word.to));
  if (!entry) return null;
  const create = () => ({
    dom: element(
      'div',
      'function-help',
      element('code', '', entry.name + entry.signature),
      element('p', '', entry.help),
    ),
  });
  return { pos: word.from, end: word.to, above: true, create };
});
