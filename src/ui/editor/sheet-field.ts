import { StateEffect, StateField, type ChangeDesc, type EditorState } from '@codemirror/state';
import type { Report } from '../../engine/index.ts';
import type { Baseline } from '../baseline.ts';

/** What the page knows of the text that it shows: the newest report, and what it is compared with. */
export interface Sheet {
  readonly report: Report | null;
  /** Keys of the report's rows, in its order; see `baseline.ts`. */
  readonly resultKeys: readonly string[];
  readonly requirementKeys: readonly string[];
  readonly baseline: Baseline | null;
  /** Keys of rows that moved with the newest report. */
  readonly moved: ReadonlySet<string>;
}

export const EMPTY_SHEET: Sheet = {
  report: null,
  resultKeys: [],
  requirementKeys: [],
  baseline: null,
  moved: new Set(),
};

interface NumberPlace {
  readonly from: number;
  readonly to: number;
}

interface SheetState {
  readonly sheet: Sheet;
  /** Whether the report is of the document as it stands. */
  readonly current: boolean;
  /** Where the number of each assumption stands in the document as it stands. */
  readonly numbers: ReadonlyMap<string, NumberPlace>;
}

/** Shows another sheet; its report is of the document as it stands when the effect arrives. */
export const showSheet = StateEffect.define<Sheet>();

const sheetState = StateField.define<SheetState>({
  create: () => ({ sheet: EMPTY_SHEET, current: false, numbers: new Map() }),
  update(state, transaction) {
    const shown = transaction.effects.find((effect) => effect.is(showSheet));
    if (shown) {
      const sheet = shown.value;
      return { sheet, current: true, numbers: numbersOf(sheet.report) };
    }
    if (!transaction.docChanged) return state;
    const numbers = mapNumbers(state.numbers, transaction.changes);
    return { sheet: state.sheet, current: false, numbers };
  },
});

/** Keeps what the page knows of the text beside it. */
export const sheetKeeping = sheetState;

/** The sheet that is shown. */
export function sheetOf(state: EditorState): Sheet {
  return state.field(sheetState).sheet;
}

/** Whether the report that is shown is of the document as it stands. */
export function isCurrent(state: EditorState): boolean {
  return state.field(sheetState).current;
}

/** Where the number of an assumption stands now; null where it has none. */
export function numberPlace(state: EditorState, name: string): NumberPlace | null {
  return state.field(sheetState).numbers.get(name) ?? null;
}

function numbersOf(report: Report | null): ReadonlyMap<string, NumberPlace> {
  const numbers = new Map<string, NumberPlace>();
  for (const { content } of report?.assumptions ?? []) {
    if (content.numberSpan) numbers.set(content.name, content.numberSpan);
  }
  return numbers;
}

function mapNumbers(numbers: ReadonlyMap<string, NumberPlace>, changes: ChangeDesc) {
  return new Map(
    [...numbers].map(([name, { from, to }]) => [
      name,
      { from: changes.mapPos(from, -1), to: changes.mapPos(to, 1) },
    ]),
  );
}
