import type { ChangeDesc, Text } from '@codemirror/state';
import type { SyntaxNode, Tree } from '@lezer/common';

/**
 * Stretches of the document made of whole top-level blocks. Both ends are line starts at which no block is open, or the
 * end of the document. What the blocks of a stretch are depends on no text outside it, but for the block before.
 */
export interface BlockRange {
  readonly from: number;
  readonly to: number;
}

/**
 * The blocks that a change of the text may have made others. Past the change, the trees agree again from the first
 * place on at which a block of the same kind begins in both.
 *
 * @param before tree of the text before the change
 * @param tree of the text after it; it may end before the text does, while the rest is still being read
 */
export function changedBlocks(
  before: Tree,
  tree: Tree,
  changes: ChangeDesc,
  doc: Text,
): BlockRange {
  const [firstA, lastA, firstB, lastB] = extentOf(changes);
  const startBefore = changes.mapPos(blockStart(before, firstA), -1);
  const from = lineStart(doc, Math.min(blockStart(tree, firstB), startBefore));
  const agreed = agreement(before, tree, lastA, lastB);
  const readTo = tree.length < doc.length ? lineStart(doc, tree.length) : doc.length;
  const to = agreed === null ? readTo : lineStart(doc, agreed);
  return { from, to: Math.max(from, to) };
}

/** The blocks that were read since the tree before, of the same text. */
export function readBlocks(before: Tree, tree: Tree, doc: Text): BlockRange {
  const from = lineStart(doc, blockStart(tree, Math.min(before.length, tree.length)));
  const to = tree.length < doc.length ? lineStart(doc, tree.length) : doc.length;
  return { from, to: Math.max(from, to) };
}

/** The blocks that share a place with a stretch of the text, or end where it begins. */
export function touchedBlocks(tree: Tree, { from, to }: BlockRange, doc: Text): BlockRange {
  const next = tree.topNode.childAfter(to + 1);
  const after = next && next.from <= to ? next.nextSibling : next;
  const end = after ? lineStart(doc, after.from) : doc.length;
  const start = lineStart(doc, blockStart(tree, from));
  return { from: start, to: Math.max(start, end) };
}

/** The first and last place that a change touches, in the text before and after it. */
function extentOf(changes: ChangeDesc): [number, number, number, number] {
  let extent: [number, number, number, number] | null = null;
  changes.iterChangedRanges((fromA, toA, fromB, toB) => {
    extent = extent ? [extent[0], toA, extent[2], toB] : [fromA, toA, fromB, toB];
  });
  return extent ?? [0, 0, 0, 0];
}

/** Where the block before the one at a place begins, since a line below can make it another; 0 if there is none. */
function blockStart(tree: Tree, place: number): number {
  const node = tree.topNode.childBefore(place + 1);
  return node?.prevSibling?.from ?? 0;
}

function agreement(before: Tree, tree: Tree, lastA: number, lastB: number): number | null {
  const shift = lastB - lastA;
  let node: SyntaxNode | null = tree.topNode.childAfter(lastB);
  for (; node; node = node.nextSibling) {
    if (node.from <= lastB) continue;
    const other = before.topNode.childAfter(node.from - shift);
    if (other?.from === node.from - shift && other.name === node.name) return node.from;
  }
  return null;
}

function lineStart(doc: Text, place: number): number {
  return doc.lineAt(Math.min(place, doc.length)).from;
}
