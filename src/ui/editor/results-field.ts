import { StateField, type EditorState, type Range } from '@codemirror/state';
import { Decoration, EditorView, type DecorationSet, type WidgetType } from '@codemirror/view';
import type { Problem } from '../../base/index.ts';
import type { FigureData } from '../../figures/index.ts';
import type { Report } from '../../engine/index.ts';
import { figureWithBaseline, requirementMovement, resultMovement } from '../baseline.ts';
import { isShown } from '../results/result-row.ts';
import { applyFix } from './fixes.ts';
import { FigureWidget } from './figure-widget.ts';
import {
  LoopWidget,
  ProblemWidget,
  RequirementWidget,
  ResultWidget,
  type RowChange,
} from './result-widgets.ts';
import { sheetOf, showSheet, type Sheet } from './sheet-field.ts';

/**
 * The report in the document: rows under their statements, problems underlined and said. Between two reports the
 * decorations move along with the text.
 */
export const resultsField = StateField.define<DecorationSet>({
  create: () => Decoration.none,
  update(decorations, transaction) {
    if (transaction.effects.some((effect) => effect.is(showSheet))) {
      return decorate(transaction.state);
    }
    return transaction.docChanged ? decorations.map(transaction.changes) : decorations;
  },
  provide: (field) => EditorView.decorations.from(field),
});

function decorate(state: EditorState): DecorationSet {
  const sheet = sheetOf(state);
  if (!sheet.report) return Decoration.none;
  const ranges = [
    ...problemRanges(state, sheet.report.problems),
    ...loopRanges(state, sheet.report),
    ...resultRanges(state, sheet, sheet.report),
    ...requirementRanges(state, sheet, sheet.report),
  ];
  return Decoration.set(ranges, true);
}

function figureWidget({ baseline }: Sheet, key: string, figure: FigureData): FigureWidget {
  return new FigureWidget(figure, figureWithBaseline(baseline, key, figure));
}

/** Order of the rows below one line. */
const ORDER = { problem: 1, loop: 2, row: 3, figure: 4 };

function below(state: EditorState, place: number, widget: WidgetType, side: number) {
  const line = state.doc.lineAt(Math.min(place, state.doc.length));
  return Decoration.widget({ widget, block: true, side }).range(line.to);
}

function resultRanges(state: EditorState, sheet: Sheet, report: Report): Range<Decoration>[] {
  return report.results.flatMap(({ to, content }, index) => {
    const key = sheet.resultKeys[index] ?? '';
    const change = changeOf(sheet, key, () =>
      sheet.baseline ? resultMovement(sheet.baseline, key, content) : null,
    );
    const made: Range<Decoration>[] = [];
    if (isShown(content, change.movement)) {
      made.push(below(state, to, new ResultWidget(content, change), ORDER.row));
    }
    if (content.figure) {
      made.push(below(state, to, figureWidget(sheet, key, content.figure), ORDER.figure));
    }
    return made;
  });
}

function requirementRanges(state: EditorState, sheet: Sheet, report: Report) {
  return report.requirements.map(({ to, content }, index) => {
    const change = changeOf(sheet, sheet.requirementKeys[index] ?? '', (key) =>
      sheet.baseline ? requirementMovement(sheet.baseline, key, content) : null,
    );
    return below(state, to, new RequirementWidget(content, change), ORDER.row);
  });
}

function loopRanges(state: EditorState, report: Report): Range<Decoration>[] {
  const still: RowChange = { moved: false, movement: null };
  return report.loops
    .filter(({ content }) => content.equationsLatex.length > 0)
    .map(({ to, content }) => below(state, to, new LoopWidget(content, still), ORDER.loop));
}

function changeOf(
  sheet: Sheet,
  key: string,
  movementOf: (key: string) => RowChange['movement'],
): RowChange {
  return { moved: sheet.moved.has(key), movement: movementOf(key) };
}

function problemRanges(state: EditorState, problems: readonly Problem[]): Range<Decoration>[] {
  const { length } = state.doc;
  return problems.flatMap((problem) => {
    const from = Math.min(problem.span.from, length);
    const to = Math.min(Math.max(problem.span.to, from), length);
    const line = state.doc.lineAt(from);
    return [
      ...underline(state, problem, from, to),
      Decoration.line({ class: `faulty faulty-${problem.severity}` }).range(line.from),
      below(state, to, new ProblemWidget(problem, applyFix), ORDER.problem),
    ];
  });
}

/** Underlines a problem's span; an empty span is widened to a character of its line where there is one. */
function underline(state: EditorState, problem: Problem, from: number, to: number) {
  const line = state.doc.lineAt(from);
  const start = from === to ? Math.max(line.from, from - 1) : from;
  const end = from === to ? Math.min(line.to, Math.max(to, start + 1)) : to;
  if (start >= end) return [];
  return [
    Decoration.mark({ class: `underlined underlined-${problem.severity}` }).range(start, end),
  ];
}
