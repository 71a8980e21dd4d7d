import { syntaxTree } from '@codemirror/language';
import type { EditorState } from '@codemirror/state';
import type { SyntaxNode } from '@lezer/common';
import { CELL_INFO } from '../../language/index.ts';

/** Whether a fence of the document is a cell. */
export function isCellFence(state: EditorState, fence: SyntaxNode): boolean {
  const info = fence.getChild('CodeInfo');
  return info !== null && state.sliceDoc(info.from, info.to).trim() === CELL_INFO;
}

/** Whether a place is inside a cell. */
export function isInCell(state: EditorState, place: number): boolean {
  let node: SyntaxNode | null = syntaxTree(state).resolve(place, -1);
  while (node && node.name !== 'FencedCode') node = node.parent;
  return node !== null && isCellFence(state, node);
}
