import type { SyntaxNode } from '@lezer/common';

/**
 * The first token of a statement or line. Its node may begin earlier, with the line's indent and, in the first statement
 * of a cell, with the comments before it.
 */
export function firstToken(node: SyntaxNode): SyntaxNode {
  let first = node;
  for (let child = node.firstChild; child; child = first.firstChild) {
    while (child.name === 'Comment' && child.nextSibling) child = child.nextSibling;
    first = child;
  }
  return first;
}
