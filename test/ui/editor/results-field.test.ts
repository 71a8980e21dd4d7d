import { EditorState } from '@codemirror/state';
import type { Decoration, WidgetType } from '@codemirror/view';
import { describe, expect, it } from 'vitest';
import { errorAt } from '../../../src/base/index.ts';
import type { Report } from '../../../src/engine/index.ts';
import {
  ProblemWidget,
  RequirementWidget,
  ResultWidget,
} from '../../../src/ui/editor/result-widgets.ts';
import { resultsField } from '../../../src/ui/editor/results-field.ts';
import {
  EMPTY_SHEET,
  isCurrent,
  sheetKeeping,
  showSheet,
} from '../../../src/ui/editor/sheet-field.ts';
import { placed, report, requirement, result } from '../rows.ts';

const TEXT = 'a = b\nb = 2 * 3   # six\nrequire a <= 7\n';

function showing(given: Partial<Report>): EditorState {
  const state = EditorState.create({ doc: TEXT, extensions: [sheetKeeping, resultsField] });
  return state.update({ effects: showSheet.of({ ...EMPTY_SHEET, report: report(given) }) }).state;
}

/** Place and widget's class of every row; place and class of every mark. */
function rowsOf(state: EditorState): string[] {
  const found: string[] = [];
  state.field(resultsField).between(0, state.doc.length, (from, to, value: Decoration) => {
    const { widget, class: name } = value.spec as { widget?: WidgetType; class?: string };
    found.push(widget ? `${from} ${widget.constructor.name}` : `${from}–${to} ${name}`);
  });
  return found;
}

describe('rows under statements', () => {
  const value = placed(result({ name: 'a', latex: '6', shown: '6' }), 0, 5);
  const verdict = placed(requirement({ text: 'a <= 7' }), 24, 38);

  it('stand at the end of their statement’s last line, comments included', () => {
    const state = showing({ results: [{ ...value, from: 6, to: 15 }], requirements: [verdict] });
    expect(rowsOf(state)).toEqual([`23 ${ResultWidget.name}`, `38 ${RequirementWidget.name}`]);
  });

  it('leave out a result that is the same as its source', () => {
    const state = showing({ results: [placed(result({ state: 'trivial' }), 0, 5)] });
    expect(rowsOf(state)).toEqual([]);
  });

  it('move with the text until the next report, which is then no longer current', () => {
    const before = showing({ results: [value] });
    const after = before.update({ changes: { from: 0, insert: '# note\n' } }).state;
    expect(rowsOf(after)).toEqual([`12 ${ResultWidget.name}`]);
    expect([isCurrent(before), isCurrent(after)]).toEqual([true, false]);
  });

  it('say a problem under the line where it is, underline it and mark the margin', () => {
    const problem = errorAt({ from: 10, to: 15 }, 'any', 'No.');
    expect(rowsOf(showing({ problems: [problem] }))).toEqual([
      '6–6 faulty faulty-error',
      '10–15 underlined underlined-error',
      `23 ${ProblemWidget.name}`,
    ]);
  });

  it('underline a character where a problem has no extent, and outlive one past the end', () => {
    const empty = errorAt({ from: 5, to: 5 }, 'any', 'Something is missing here.');
    expect(rowsOf(showing({ problems: [empty] }))).toContain('4–5 underlined underlined-error');
    const past = errorAt({ from: 900, to: 950 }, 'any', 'No.');
    expect(rowsOf(showing({ problems: [past] }))).toContain(`39 ${ProblemWidget.name}`);
  });
});
