import { syntaxTree } from '@codemirror/language';
import { StateField, type EditorState, type Extension } from '@codemirror/state';
import { Decoration, EditorView, type DecorationSet } from '@codemirror/view';
import type { SyntaxNode } from '@lezer/common';
import type { Report } from '../../engine/index.ts';
import { ReferenceWidget } from './prose-widgets.ts';
import { isRevealed, revealedField } from './revealed.ts';
import { sheetOf, showSheet } from './sheet-field.ts';

interface References {
  /** At their places in the document as it stands. */
  readonly placed: Report['references'];
  readonly decorations: DecorationSet;
}

const referencesField = StateField.define<References>({
  create: () => ({ placed: [], decorations: Decoration.none }),
  update({ placed, decorations }, transaction) {
    const { state, startState, changes } = transaction;
    const isNew = transaction.effects.some((effect) => effect.is(showSheet));
    const here = isNew
      ? (sheetOf(state).report?.references ?? [])
      : transaction.docChanged
        ? placed.map((row) => ({
            ...row,
            from: changes.mapPos(row.from, 1),
            to: changes.mapPos(row.to, -1),
          }))
        : placed;
    const revealed = startState.field(revealedField) !== state.field(revealedField);
    if (here === placed && !revealed) return { placed, decorations };
    return { placed: here, decorations: decorate(state, here) };
  },
  provide: (field) => EditorView.decorations.from(field, ({ decorations }) => decorations),
});

/** Shows the present values of names in prose, where the source is not shown. */
export const references: Extension = referencesField;

/** Whether the paragraph or heading at a place is shown as typed. */
function isBlockRevealed(state: EditorState, place: number): boolean {
  let node: SyntaxNode | null = syntaxTree(state).resolve(place, 1);
  while (node && !/^Paragraph$|Heading\d$/u.test(node.name)) node = node.parent;
  return node !== null && isRevealed(state, node.from, node.to);
}

function decorate(state: EditorState, placed: Report['references']): DecorationSet {
  const ranges = placed
    .filter(({ from, to }) => from < to && to <= state.doc.length && !isBlockRevealed(state, from))
    .map(({ from, to, name, shown }) =>
      Decoration.replace({ widget: new ReferenceWidget(name, shown) }).range(from, to),
    );
  return Decoration.set(ranges, true);
}
