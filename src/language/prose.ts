import { warningAt, type Fix, type Problem, type Span } from '../base/index.ts';
import type { SyntaxNode, Tree } from '@lezer/common';
import { canonicalName } from './names.ts';
import { CELL_INFO } from './worksheet-parser.ts';

/** A block of prose at the top level of a worksheet. */
export interface ProseBlock extends Span {
  readonly kind: 'heading' | 'text' | 'list' | 'quote' | 'code' | 'formula' | 'html' | 'rule';
  /** Level of a heading, 1 to 6. */
  readonly level?: number;
  /** A heading's text without marks; the source of other blocks. */
  readonly text: string;
}

/** `{e_ss}` in prose: where it stands, and the canonical name whose value it shows. */
export interface Reference extends Span {
  readonly name: string;
}

/** A cell by its places in the text: the whole fence, and the lines between its marks. */
export interface Cell extends Span {
  readonly contentFrom: number;
  readonly contentTo: number;
}

/** The parts of a worksheet that Markdown tells apart. */
export interface WorksheetParts {
  readonly cells: readonly Cell[];
  /** The fence nodes of the cells, which hold the cells' own trees. */
  readonly fences: readonly SyntaxNode[];
  readonly prose: readonly ProseBlock[];
  readonly references: readonly Reference[];
  readonly problems: readonly Problem[];
}

const PROSE_KINDS: Readonly<Record<string, ProseBlock['kind']>> = {
  Paragraph: 'text',
  LinkReference: 'text',
  BulletList: 'list',
  OrderedList: 'list',
  Blockquote: 'quote',
  FencedCode: 'code',
  CodeBlock: 'code',
  FormulaBlock: 'formula',
  HTMLBlock: 'html',
  CommentBlock: 'html',
  ProcessingInstructionBlock: 'html',
  HorizontalRule: 'rule',
};

/** Finds cells, prose and references in the tree of a worksheet. */
export function worksheetParts(tree: Tree, text: string): WorksheetParts {
  const fences: SyntaxNode[] = [];
  const references: Reference[] = [];
  const problems: Problem[] = [];
  tree.iterate({
    enter: (node) => {
      if (node.name === 'Reference') references.push(referenceAt(node, text));
      if (node.name !== 'FencedCode') return true;
      if (infoOf(node.node, text) === CELL_INFO) fences.push(node.node);
      problems.push(...fenceProblems(node.node, text));
      return false;
    },
  });
  return {
    cells: fences.map((fence) => cellOf(fence, text)),
    fences,
    prose: proseBlocks(tree, text),
    references,
    problems,
  };
}

function referenceAt({ from, to }: Span, text: string): Reference {
  const path = text.slice(from + 1, to - 1).split('.');
  return { from, to, name: path.map(canonicalName).join('.') };
}

function infoOf(fence: SyntaxNode, text: string): string {
  const info = fence.getChild('CodeInfo');
  return info ? text.slice(info.from, info.to).trim() : '';
}

function cellOf(fence: SyntaxNode, text: string): Cell {
  const lineEnd = text.indexOf('\n', fence.from);
  const contentFrom = lineEnd < 0 || lineEnd >= fence.to ? fence.to : lineEnd + 1;
  const marks = fence.getChildren('CodeMark');
  const close = marks.length > 1 ? marks.at(-1)!.from : fence.to;
  const closingLine = marks.length > 1 ? text.lastIndexOf('\n', close - 1) + 1 : close;
  return {
    from: fence.from,
    to: fence.to,
    contentFrom,
    contentTo: Math.max(contentFrom, closingLine),
  };
}

function fenceProblems(fence: SyntaxNode, text: string): readonly Problem[] {
  const info = infoOf(fence, text);
  const infoNode = fence.getChild('CodeInfo');
  const marks = fence.getChildren('CodeMark');
  if (info !== CELL_INFO) return infoNode ? nearCellProblems(infoNode, info) : [];
  if (marks.length > 1) return [];
  const span = { from: marks[0]!.from, to: infoNode!.to };
  const message = 'This cell is not closed: it takes in all that follows.';
  return [warningAt(span, 'unclosed-cell', message, closingFixes(fence, marks[0]!, text))];
}

/** The fix that closes a cell, unless it stands in a quote or list, whose marks the closing line would need too. */
function closingFixes(fence: SyntaxNode, mark: Span, text: string): readonly Fix[] {
  const indent = text.slice(text.lastIndexOf('\n', mark.from) + 1, mark.from);
  if (indent.trim() !== '' || fence.parent?.name !== 'Document') return [];
  const end = text.slice(fence.from, fence.to).endsWith('\n') ? '' : '\n';
  const insert = end + indent + text.slice(mark.from, mark.to);
  const edit = { span: { from: fence.to, to: fence.to }, insert };
  return [{ title: 'close it at the end', edits: [edit] }];
}

/** A fence that looks meant as a cell, but is prose. */
function nearCellProblems(infoNode: Span, info: string): readonly Problem[] {
  if (info.split(/\s/)[0]!.toLowerCase() !== CELL_INFO) return [];
  const span = { from: infoNode.from, to: infoNode.to };
  const message = `A cell's fence is tagged \`${CELL_INFO}\` alone; tagged \`${info}\` it is prose.`;
  const fixes = [{ title: `write \`${CELL_INFO}\``, edits: [{ span, insert: CELL_INFO }] }];
  return [warningAt(span, 'near-cell', message, fixes)];
}

function proseBlocks(tree: Tree, text: string): readonly ProseBlock[] {
  const blocks: ProseBlock[] = [];
  for (let node = tree.topNode.firstChild; node; node = node.nextSibling) {
    const block = proseBlock(node, text);
    if (block) blocks.push(block);
  }
  return blocks;
}

function proseBlock(node: SyntaxNode, text: string): ProseBlock | null {
  const { from, to, name } = node;
  const heading = /^(?:ATX|Setext)Heading(\d)$/.exec(name);
  if (heading)
    return { kind: 'heading', from, to, level: Number(heading[1]), text: headingText(node, text) };
  const kind = PROSE_KINDS[name];
  if (!kind || (name === 'FencedCode' && infoOf(node, text) === CELL_INFO)) return null;
  return { kind, from, to, text: text.slice(from, to) };
}

/** A heading's text without the marks of its level and of emphasis, code and links. */
function headingText(heading: SyntaxNode, text: string): string {
  let plain = '';
  let position = heading.from;
  heading.cursor().iterate(({ name, from, to }) => {
    if (!name.endsWith('Mark') && name !== 'URL') return true;
    plain += text.slice(position, from);
    position = to;
    return false;
  });
  return (plain + text.slice(position, heading.to)).trim();
}
