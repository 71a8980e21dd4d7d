import { history } from '@codemirror/commands';
import { Annotation, StateField, Transaction, type Extension } from '@codemirror/state';

/** Marks a step of a drag: it joins the steps before it, however long the pointer rested between. */
export const dragStep = Annotation.define<true>();

/** Milliseconds without a change after which typing begins another undo step. */
const PAUSE = 500;

const lastChange = StateField.define<number>({
  create: () => 0,
  update: (time, transaction) =>
    transaction.docChanged ? (transaction.annotation(Transaction.time) ?? time) : time,
});

/**
 * The one undo history. Typing joins as long as it goes on at one place; the steps of a drag always join. The history's
 * own pause is therefore set out of reach (yet below the time of day, by which it marks a step as closed).
 */
export const undoSteps: Extension = [
  lastChange,
  history({
    newGroupDelay: 1e9,
    joinToEvent(transaction, isAdjacent) {
      if (transaction.annotation(dragStep)) return true;
      const now = transaction.annotation(Transaction.time) ?? 0;
      return isAdjacent && now - transaction.startState.field(lastChange) < PAUSE;
    },
  }),
];
