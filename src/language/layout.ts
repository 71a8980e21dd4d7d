import { ContextTracker, ExternalTokenizer, type InputStream } from '@lezer/lr';
import type { SyntaxNode, Tree } from '@lezer/common';
import { firstToken } from './first-token.ts';
import { blockStart, lineBreak, lineStart, softBreak, statementBreak } from './loop.grammar.terms';

const NEWLINE = 10;
const TAB = 9;
const TAB_STOP = 4;

/** Block lines are expected, and the first of them has yet to set their indent. */
const AWAITED = -2;
const NONE = -1;

/**
 * Where the reader of a cell stands: the indents (in columns) of the statement and of the block line it is in. A line
 * deeper than its own continues it; a line that is not deeper than its statement's starts the next statement.
 */
interface Layout {
  /** The next token is the first of a line that starts a statement or a block line. */
  readonly fresh: boolean;
  readonly statement: number;
  readonly block: number;
}

const BETWEEN_STATEMENTS: Layout = { fresh: true, statement: NONE, block: NONE };

function isSpace(code: number): boolean {
  return code !== NEWLINE && code >= 0 && /\s/.test(String.fromCharCode(code));
}

function isContent(code: number): boolean {
  return code >= 0 && code !== NEWLINE && code !== 35; /* # */
}

/** Column after a white-space character at `column`. */
function columnAfter(column: number, code: number): number {
  return code === TAB ? column + TAB_STOP - (column % TAB_STOP) : column + 1;
}

/** Indent, in columns, of the line that begins `offset` characters ahead, and the character that ends the indent. */
function indentAhead(input: InputStream, offset: number): { columns: number; next: number } {
  let columns = 0;
  let next = input.peek(offset);
  while (isSpace(next)) {
    columns = columnAfter(columns, next);
    next = input.peek(++offset);
  }
  return { columns, next };
}

function lineShifted(layout: Layout, indent: number): Layout {
  if (layout.statement < 0) return { fresh: false, statement: indent, block: NONE };
  const block = layout.block === AWAITED ? indent : layout.block;
  return { fresh: false, statement: layout.statement, block };
}

function shifted(layout: Layout, term: number, input: InputStream): Layout {
  if (term === lineStart) return lineShifted(layout, indentAhead(input, 0).columns);
  if (term === statementBreak) return BETWEEN_STATEMENTS;
  if (term === blockStart) return { fresh: true, statement: layout.statement, block: AWAITED };
  if (term === lineBreak) return { ...layout, fresh: true };
  return layout;
}

/** Indent, in columns, of the line on which a reused node's first token stands. */
function indentOf(node: SyntaxNode, input: InputStream): number {
  let offset = firstToken(node).from;
  while (isSpace(input.peek(offset - 1))) offset -= 1;
  return indentAhead(input, offset).columns;
}

/** The last statement in a reused run of statements, which is a node without a name; null in any other node. */
function lastStatement(tree: Tree): SyntaxNode | null {
  if (!tree.type.isAnonymous) return null;
  let node: SyntaxNode | null = tree.resolveInner(tree.length, -1);
  while (node && node.name !== 'Statement' && node.name !== 'BlockStatement') node = node.parent;
  return node;
}

/** The layout after a node of an earlier parse was taken over whole. */
function reused(layout: Layout, tree: Tree, input: InputStream): Layout {
  const { name } = tree.type;
  if (name === 'Statement' || name === 'BlockStatement')
    return lineShifted(BETWEEN_STATEMENTS, indentOf(tree.topNode, input));
  if (name === 'Header' || name === 'Line')
    return lineShifted(layout, indentOf(tree.topNode, input));
  const firstLine = name === 'Block' ? tree.topNode.getChild('Line') : null;
  if (firstLine) return { ...layout, fresh: false, block: indentOf(firstLine, input) };
  const last = lastStatement(tree);
  return last ? lineShifted(BETWEEN_STATEMENTS, indentOf(last, input)) : layout;
}

/** Follows the indents of the statement and block that are being read. */
export const layout = new ContextTracker<Layout>({
  start: BETWEEN_STATEMENTS,
  shift: (context, term, _stack, input) => shifted(context, term, input),
  reuse: (context, node, _stack, input) => reused(context, node, input),
  hash: (context) =>
    (context.fresh ? 1 : 0) + 2 * (context.statement + 2) + 4096 * (context.block + 2),
});

/** The indent of a line that starts a statement or a block line; zero-width at the left edge. */
export const lineStarts = new ExternalTokenizer(
  (input, stack) => {
    if (!(stack.context as Layout).fresh) return;
    let width = 0;
    while (isSpace(input.peek(width))) width += 1;
    if (isContent(input.peek(width))) input.acceptToken(lineStart, width);
  },
  { contextual: true },
);

/** What the end of a line means, given the indent of the next line with content. */
function lineEnd(current: Layout, indent: number, canStartBlock: boolean): number {
  if (current.fresh) return softBreak;
  if (indent <= current.statement) return statementBreak;
  if (canStartBlock) return blockStart;
  return current.block >= 0 && indent <= current.block ? lineBreak : softBreak;
}

/** The ends of lines; blank and comment lines end nothing. */
export const lineEnds = new ExternalTokenizer(
  (input, stack) => {
    if (input.next !== NEWLINE) return;
    const { columns, next } = indentAhead(input, 1);
    const token = isContent(next)
      ? lineEnd(stack.context as Layout, columns, stack.canShift(blockStart))
      : softBreak;
    input.acceptToken(token, 1);
  },
  { contextual: true },
);
