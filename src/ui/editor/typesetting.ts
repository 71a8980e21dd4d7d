import { syntaxTree } from '@codemirror/language';
import { StateField, type EditorState, type Transaction } from '@codemirror/state';
import { Decoration, EditorView, type DecorationSet } from '@codemirror/view';
import { changedBlocks, readBlocks, touchedBlocks, type BlockRange } from './block-ranges.ts';
import { revealedField } from './revealed.ts';
import { typesetBlocks } from './typesetter.ts';

/**
 * The look of the document: prose is typeset by hiding its markup and joining the lines of a paragraph, so that every
 * character stays at its place in the text; where the cursor is, the source is shown. Cells get their line classes.
 * Only the blocks that changed, were read anew, or hold the cursor now or held it before are typeset again.
 */
export const typesetting = StateField.define<DecorationSet>({
  create: (state) => typesetRange(state, Decoration.none, { from: 0, to: state.doc.length }),
  update(decorations, transaction) {
    const { state, changes } = transaction;
    const moved = transaction.docChanged ? decorations.map(changes) : decorations;
    return staleRanges(transaction).reduce((set, range) => typesetRange(state, set, range), moved);
  },
  provide: (field) => EditorView.decorations.from(field),
});

function staleRanges({ startState, state, changes, docChanged }: Transaction): BlockRange[] {
  const before = syntaxTree(startState);
  const tree = syntaxTree(state);
  const ranges: BlockRange[] = [];
  if (docChanged) ranges.push(changedBlocks(before, tree, changes, state.doc));
  else if (before !== tree) ranges.push(readBlocks(before, tree, state.doc));
  const [was, is] = [startState.field(revealedField), state.field(revealedField)];
  if (was !== is) {
    const places = [
      ...was.ranges.map(({ from, to }) => ({
        from: changes.mapPos(from, -1),
        to: changes.mapPos(to, 1),
      })),
      ...is.ranges,
    ];
    ranges.push(...places.map((place) => touchedBlocks(tree, place, state.doc)));
  }
  return ranges;
}

function typesetRange(state: EditorState, set: DecorationSet, { from, to }: BlockRange) {
  const isLast = to === state.doc.length;
  return set.update({
    filterFrom: from,
    filterTo: to,
    filter: (start) => start < from || (start >= to && !isLast),
    add: typesetBlocks(state, syntaxTree(state), from, to),
    sort: true,
  });
}
