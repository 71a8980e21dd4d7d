import {
  StateEffect,
  StateField,
  type EditorState,
  type Extension,
  type Transaction,
} from '@codemirror/state';
import { EditorView, ViewPlugin } from '@codemirror/view';

/**
 * Where the source is shown as it was typed: the ranges of the selection while the text has the focus, none while it is
 * only read. While the pointer is held down the ranges stand still, so that the text does not move under it.
 */
export interface Revealed {
  readonly focused: boolean;
  readonly held: boolean;
  /**
   * Whether the lines of a paragraph that is shown as typed stand apart: since a line was broken here, until the pointer goes
   * elsewhere. Otherwise they stay joined, so that nothing jumps where the cursor goes.
   */
  readonly linesApart: boolean;
  readonly ranges: readonly { readonly from: number; readonly to: number }[];
}

export const setFocused = StateEffect.define<boolean>();
const setHeld = StateEffect.define<boolean>();

export const revealedField = StateField.define<Revealed>({
  create: () => ({ focused: false, held: false, linesApart: false, ranges: [] }),
  update(revealed, transaction) {
    let { focused, held } = revealed;
    for (const effect of transaction.effects) {
      if (effect.is(setFocused)) focused = effect.value;
      if (effect.is(setHeld)) held = effect.value;
    }
    const moved = transaction.docChanged || transaction.selection !== undefined;
    if (!moved && focused === revealed.focused && held === revealed.held) return revealed;
    if (!focused) return { focused, held, linesApart: false, ranges: [] };
    if (held && !transaction.docChanged) return { ...revealed, focused, held };
    const linesApart =
      breaksLine(transaction) ||
      (revealed.linesApart && !transaction.isUserEvent('select.pointer'));
    return { focused, held, linesApart, ranges: transaction.newSelection.ranges };
  },
});

function breaksLine(transaction: Transaction): boolean {
  let breaks = false;
  transaction.changes.iterChanges((_fromA, _toA, _fromB, _toB, inserted) => {
    breaks ||= inserted.lines > 1;
  });
  return breaks && transaction.isUserEvent('input');
}

const pointerWatch = ViewPlugin.define((view) => {
  const release = () => {
    if (view.state.field(revealedField).held) view.dispatch({ effects: setHeld.of(false) });
  };
  const hold = (event: PointerEvent) => {
    if (event.button === 0) view.dispatch({ effects: setHeld.of(true) });
  };
  view.contentDOM.addEventListener('pointerdown', hold);
  window.addEventListener('pointerup', release);
  window.addEventListener('pointercancel', release);
  return {
    destroy() {
      view.contentDOM.removeEventListener('pointerdown', hold);
      window.removeEventListener('pointerup', release);
      window.removeEventListener('pointercancel', release);
    },
  };
});

/** Tracks where the source is shown. */
export const revealing: Extension = [
  revealedField,
  EditorView.focusChangeEffect.of((_, focusing) => setFocused.of(focusing)),
  pointerWatch,
];

/** Whether the source between two offsets is shown as typed. */
export function isRevealed(state: EditorState, from: number, to: number): boolean {
  return state.field(revealedField).ranges.some((range) => range.from <= to && range.to >= from);
}
