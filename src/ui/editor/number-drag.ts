import { isolateHistory } from '@codemirror/commands';
import { Transaction, type ChangeSpec, type EditorState } from '@codemirror/state';
import type { EditorView } from '@codemirror/view';
import { isCurrent, numberPlace } from './sheet-field.ts';

/** Numbers of assumptions by name, as the text is to have them. */
export type NumberTexts = ReadonlyMap<string, string>;

/**
 * Numbers of the text being dragged. The text follows at animation frames, and no faster than the evaluator
 * answers, so that what is seen is always current; whatever was passed through, the whole drag is one undo step.
 */
export class NumberDrag {
  private readonly original: NumberTexts;
  private wanted: NumberTexts | null = null;
  private frame: number | null = null;

  constructor(
    private readonly view: EditorView,
    names: readonly string[],
  ) {
    this.original = currentTexts(view.state, names);
  }

  /** Asks for numbers; they reach the text when it is their turn, unless newer ones overtake them. */
  move(numbers: NumberTexts): void {
    this.wanted = numbers;
    this.frame ??= requestAnimationFrame(() => this.follow());
  }

  /** Ends the drag at the numbers asked for last. */
  finish(): void {
    const reached = this.wanted ?? currentTexts(this.view.state, [...this.original.keys()]);
    this.restore(reached);
  }

  /** Ends the drag where it began. */
  cancel(): void {
    this.restore(null);
  }

  private follow(): void {
    this.frame = null;
    if (!this.wanted) return;
    if (!isCurrent(this.view.state)) {
      this.frame = requestAnimationFrame(() => this.follow());
      return;
    }
    const changes = numberChanges(this.view.state, this.wanted);
    if (changes.length === 0) return;
    this.view.dispatch({ changes, annotations: Transaction.addToHistory.of(false) });
  }

  /** Takes the drag back without a trace and, where it led to other numbers, does it again as one step. */
  private restore(reached: NumberTexts | null): void {
    if (this.frame !== null) cancelAnimationFrame(this.frame);
    this.frame = null;
    this.wanted = null;
    const { state } = this.view;
    const back = state.update({
      changes: numberChanges(state, this.original),
      annotations: Transaction.addToHistory.of(false),
    });
    const again = reached ? numberChanges(back.state, reached) : [];
    const steps = [back];
    if (again.length > 0) steps.push(numberStep(back.state, again));
    this.view.dispatch(steps);
  }
}

/** Writes numbers of assumptions into the text as one undo step. */
export function writeNumbers(view: EditorView, numbers: NumberTexts): void {
  const changes = numberChanges(view.state, numbers);
  if (changes.length > 0) view.dispatch(numberStep(view.state, changes));
}

function numberStep(state: EditorState, changes: ChangeSpec[]): Transaction {
  return state.update({
    changes,
    annotations: isolateHistory.of('full'),
    userEvent: 'input.number',
  });
}

function currentTexts(state: EditorState, names: readonly string[]): NumberTexts {
  const texts = new Map<string, string>();
  for (const name of names) {
    const place = numberPlace(state, name);
    if (place) texts.set(name, state.sliceDoc(place.from, place.to));
  }
  return texts;
}

function numberChanges(state: EditorState, numbers: NumberTexts): ChangeSpec[] {
  return [...numbers].flatMap(([name, insert]) => {
    const place = numberPlace(state, name);
    if (!place || state.sliceDoc(place.from, place.to) === insert) return [];
    return [{ from: place.from, to: place.to, insert }];
  });
}
