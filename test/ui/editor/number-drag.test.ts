import { undo, undoDepth } from '@codemirror/commands';
import { EditorState, Transaction, type TransactionSpec } from '@codemirror/state';
import type { EditorView } from '@codemirror/view';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { NumberDrag, writeNumbers } from '../../../src/ui/editor/number-drag.ts';
import { EMPTY_SHEET, sheetKeeping, showSheet } from '../../../src/ui/editor/sheet-field.ts';
import { undoSteps } from '../../../src/ui/editor/undo-steps.ts';
import { assumption, placed, report } from '../rows.ts';

const TEXT = 'Kp is 9 kN m/rad\nKi is 6 kN m/(rad s)\n';

/** The part of a view that a drag uses. */
class StandInView {
  state = EditorState.create({ doc: TEXT, extensions: [undoSteps, sheetKeeping] });

  dispatch = (step: TransactionSpec | Transaction): void => {
    this.state = step instanceof Transaction ? step.state : this.state.update(step).state;
  };

  get text(): string {
    return this.state.doc.toString();
  }

  /** The evaluator answers: the report is of the text as it stands. */
  answer(): void {
    const rows = [...this.text.matchAll(/^(K.) is ([\d.]+)/gmu)].map((match) => {
      const to = match.index + match[0].length;
      const numberSpan = { from: to - (match[2]?.length ?? 0), to };
      return placed(assumption({ name: match[1] ?? '', numberSpan }));
    });
    const sheet = { ...EMPTY_SHEET, report: report({ assumptions: rows }) };
    this.dispatch({ effects: showSheet.of(sheet) });
  }
}

function setUp() {
  const view = new StandInView();
  view.answer();
  return { view, asView: view as unknown as EditorView };
}

let frames: (() => void)[] = [];

function nextFrame(): void {
  const due = frames;
  frames = [];
  due.forEach((frame) => frame());
}

describe('dragging numbers of the text', () => {
  beforeEach(() => {
    frames = [];
    vi.stubGlobal('requestAnimationFrame', (frame: () => void) => frames.push(frame));
    vi.stubGlobal('cancelAnimationFrame', () => (frames = []));
    vi.useFakeTimers({ toFake: ['Date'] });
  });
  afterEach(() => {
    vi.unstubAllGlobals();
    vi.useRealTimers();
  });

  it('follows at frames, and no faster than the evaluator answers', () => {
    const { view, asView } = setUp();
    const drag = new NumberDrag(asView, ['Kp']);
    drag.move(new Map([['Kp', '9.5']]));
    drag.move(new Map([['Kp', '10']]));
    expect(view.text).toBe(TEXT);
    nextFrame();
    expect(view.text).toContain('Kp is 10 kN');
    drag.move(new Map([['Kp', '11']]));
    nextFrame();
    expect(view.text).toContain('Kp is 10 kN');
    view.answer();
    nextFrame();
    expect(view.text).toContain('Kp is 11 kN');
  });

  it('is one undo step however long it took, apart from the edits before and after', () => {
    const { view, asView } = setUp();
    writeNumbers(asView, new Map([['Ki', '7']]));
    view.answer();
    const drag = new NumberDrag(asView, ['Kp', 'Ki']);
    for (const [Kp, Ki] of [
      ['10', '8'],
      ['11', '9.25'],
      ['12.5', '10'],
    ] as const) {
      vi.advanceTimersByTime(2_000);
      drag.move(
        new Map([
          ['Kp', Kp],
          ['Ki', Ki],
        ]),
      );
      nextFrame();
      view.answer();
    }
    drag.finish();
    expect(view.text).toBe('Kp is 12.5 kN m/rad\nKi is 10 kN m/(rad s)\n');
    writeNumbers(asView, new Map([['Kp', '13']]));
    expect(undoDepth(view.state)).toBe(3);
    undo(asView);
    undo(asView);
    expect(view.text).toBe('Kp is 9 kN m/rad\nKi is 7 kN m/(rad s)\n');
    undo(asView);
    expect(view.text).toBe(TEXT);
  });

  it('reaches the last number asked for even where the evaluator never answered', () => {
    const { view, asView } = setUp();
    const drag = new NumberDrag(asView, ['Kp']);
    drag.move(new Map([['Kp', '10']]));
    nextFrame();
    drag.move(new Map([['Kp', '15']]));
    nextFrame();
    drag.finish();
    expect(view.text).toContain('Kp is 15 kN');
  });

  it('leaves the text and the history as they were when it is cancelled or leads nowhere', () => {
    const { view, asView } = setUp();
    const drag = new NumberDrag(asView, ['Kp']);
    drag.move(new Map([['Kp', '10']]));
    nextFrame();
    drag.cancel();
    expect(view.text).toBe(TEXT);
    view.answer();
    const back = new NumberDrag(asView, ['Kp']);
    back.move(new Map([['Kp', '10']]));
    nextFrame();
    back.move(new Map([['Kp', '9']]));
    back.finish();
    expect(view.text).toBe(TEXT);
    expect(undoDepth(view.state)).toBe(0);
  });
});
