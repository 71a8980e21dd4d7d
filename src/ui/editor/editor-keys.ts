import { defaultKeymap, historyKeymap } from '@codemirror/commands';
import { search, searchKeymap } from '@codemirror/search';
import { EditorSelection, type Extension } from '@codemirror/state';
import { keymap, type Command, type EditorView } from '@codemirror/view';
import { sheetOf } from './sheet-field.ts';
import { undoSteps } from './undo-steps.ts';

/** The keys of the worksheet text. Tab is left to move between parts of the page. */
export function editorKeys(save: () => void): Extension {
  return [
    undoSteps,
    search({ top: true }),
    keymap.of([
      { key: 'Mod-s', run: () => (save(), true), preventDefault: true },
      { key: 'F8', run: goToNextProblem, preventDefault: true },
      { key: 'Alt-Enter', run: focusFix, preventDefault: true },
      ...searchKeymap,
      ...historyKeymap,
      { key: 'Escape', run: returnToReading },
      ...defaultKeymap,
    ]),
  ];
}

/** Enter, while reading, goes into the text: the column around it, not the text, has the focus then. */
export function enterFromReading(view: EditorView): void {
  const { scrollDOM } = view;
  scrollDOM.tabIndex = 0;
  scrollDOM.addEventListener('keydown', (event) => {
    if (event.target !== scrollDOM || event.key !== 'Enter') return;
    event.preventDefault();
    view.focus();
  });
}

/** Leaves the text for the column around it, which scrolls with the arrow keys. */
const returnToReading: Command = (view) => {
  view.scrollDOM.focus({ preventScroll: true });
  return true;
};

const goToNextProblem: Command = (view) => {
  const problems = sheetOf(view.state).report?.problems ?? [];
  const { head } = view.state.selection.main;
  const next = problems.find(({ span }) => span.from > head) ?? problems[0];
  if (!next) return false;
  const place = Math.min(next.span.from, view.state.doc.length);
  view.dispatch({ selection: EditorSelection.cursor(place), scrollIntoView: true });
  return true;
};

/** Moves the focus to the first fix below the cursor's line. */
const focusFix: Command = (view) => {
  const line = view.lineBlockAt(view.state.selection.main.head);
  const top = view.documentTop + line.top;
  const buttons = [...view.contentDOM.querySelectorAll<HTMLElement>('button.fix')];
  const button = buttons.find((candidate) => candidate.getBoundingClientRect().top >= top);
  button?.focus();
  return button !== undefined;
};
