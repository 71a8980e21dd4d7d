import { isolateHistory, undo } from '@codemirror/commands';
import type { ChangeSpec, EditorState, Transaction } from '@codemirror/state';
import type { EditorView } from '@codemirror/view';
import { isCurrent, numberPlace } from './sheet-field.ts';
import { dragStep } from './undo-steps.ts';

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
  private moved = false;

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
    if (this.wanted) this.write(this.wanted);
    this.close();
    if (numberChanges(this.view.state, this.original).length === 0) this.takeBack();
  }

  /** Ends the drag where it began. */
  cancel(): void {
    this.close();
    this.takeBack();
  }

  private follow(): void {
    this.frame = null;
    if (!this.wanted) return;
    if (isCurrent(this.view.state)) this.write(this.wanted);
    else this.frame = requestAnimationFrame(() => this.follow());
  }

  private write(numbers: NumberTexts): void {
    const changes = numberChanges(this.view.state, numbers);
    if (changes.length === 0) return;
    const annotations = this.moved ? dragStep.of(true) : isolateHistory.of('before');
    this.moved = true;
    this.view.dispatch({ changes, annotations });
  }

  /** Closes the undo step. */
  private close(): void {
    if (this.frame !== null) cancelAnimationFrame(this.frame);
    this.frame = null;
    this.wanted = null;
    this.view.dispatch({ annotations: isolateHistory.of('after') });
  }

  /** A drag that led nowhere leaves no step behind. */
  private takeBack(): void {
    if (this.moved) undo(this.view);
    this.moved = false;
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
