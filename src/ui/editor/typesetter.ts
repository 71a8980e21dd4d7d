import type { EditorState, Range } from '@codemirror/state';
import { Decoration } from '@codemirror/view';
import type { SyntaxNode, Tree } from '@lezer/common';
import { isCellFence } from './cells.ts';
import { MathsWidget, StandInWidget } from './prose-widgets.ts';
import { isRevealed, revealedField } from './revealed.ts';

/**
 * The decorations of the top-level blocks that begin between two line starts, and of the blank lines there.
 *
 * @param tree of the document, or of as much of it as was read
 * @param from a line start at which no block is open
 * @param to likewise, or the end of the document
 */
export function typesetBlocks(
  state: EditorState,
  tree: Tree,
  from: number,
  to: number,
): Range<Decoration>[] {
  const typesetter = new Typesetter(state);
  for (let node = tree.topNode.childAfter(from); node && node.from < to; node = node.nextSibling) {
    typesetter.block(node);
  }
  typesetter.blankLines(from, to);
  return typesetter.made;
}

const hidden = Decoration.replace({});
const joined = Decoration.replace({ widget: new StandInWidget('', ' ') });
const markedJoin = Decoration.replace({ widget: new StandInWidget('line-end', '↵ ') });
const broken = Decoration.replace({ widget: new StandInWidget('', '\n') });
const bullet = Decoration.replace({ widget: new StandInWidget('bullet', '•') });
const lineClass = (name: string) => Decoration.line({ class: name });
const markClass = (name: string) => Decoration.mark({ class: name });

const INLINE_MARKS: Readonly<Record<string, Decoration>> = {
  Emphasis: markClass('emphasis'),
  StrongEmphasis: markClass('strong'),
  InlineCode: markClass('inline-code'),
  Link: markClass('link'),
  Autolink: markClass('link'),
  Image: markClass('image'),
};

const HIDDEN_MARKS = new Set(['EmphasisMark', 'LinkMark', 'CodeMark', 'LinkTitle', 'LinkLabel']);
const CONTAINERS = new Set(['Document', 'BulletList', 'OrderedList', 'ListItem', 'Blockquote']);

class Typesetter {
  readonly made: Range<Decoration>[] = [];
  private readonly fencedLines = new Set<number>();

  constructor(private readonly state: EditorState) {}

  block(node: SyntaxNode): void {
    const { name } = node;
    if (name === 'Blockquote') this.eachLine(node, lineClass('quotation'));
    if (name === 'ListItem') this.listItem(node);
    if (CONTAINERS.has(name)) {
      for (let child = node.firstChild; child; child = child.nextSibling) this.block(child);
    } else if (name === 'Paragraph') this.paragraph(node);
    else if (/^(?:ATX|Setext)Heading/u.test(name)) this.heading(node);
    else if (name === 'FencedCode') this.fence(node);
    else if (name === 'FormulaBlock') this.formulaBlock(node);
    else if (name === 'CodeBlock') this.eachLine(node, lineClass('plain-code'));
    else if (name === 'HorizontalRule') this.rule(node);
    else if (/^(?:HTMLBlock|CommentBlock|ProcessingInstructionBlock|LinkReference)$/u.test(name)) {
      this.eachLine(node, lineClass('unset'));
    }
  }

  /** Blank lines of the prose stand for the space between blocks. */
  blankLines(from: number, to: number): void {
    const { doc } = this.state;
    const last = doc.lineAt(to).number;
    for (let number = doc.lineAt(from).number; number <= last; number += 1) {
      const line = doc.line(number);
      const isHere = line.from < to || to === doc.length;
      if (isHere && line.text.trim() === '' && !this.fencedLines.has(number)) {
        this.made.push(lineClass('blank').range(line.from));
      }
    }
  }

  private heading(node: SyntaxNode): void {
    const level = Number(/\d$/u.exec(node.name)?.[0] ?? 1);
    const line = this.state.doc.lineAt(node.from);
    this.made.push(lineClass(`heading heading-${level}`).range(line.from));
    if (isRevealed(this.state, node.from, node.to)) return;
    for (const mark of node.getChildren('HeaderMark')) this.headingMark(node, mark);
    this.inline(node);
  }

  /** Hides `# ` before, ` #` after, or the line of a setext heading below. */
  private headingMark(node: SyntaxNode, mark: SyntaxNode): void {
    const text = this.state.sliceDoc(node.from, node.to);
    if (mark.from === node.from) {
      const space = /^#+[ \t]*/u.exec(text)?.[0].length ?? 0;
      this.hide(mark.from, node.from + space);
    } else {
      const before = /\s*$/u.exec(text.slice(0, mark.from - node.from))?.[0].length ?? 0;
      this.hide(mark.from - before, mark.to);
    }
  }

  private listItem(node: SyntaxNode): void {
    const depth = depthOf(node);
    const mark = node.getChild('ListMark');
    this.eachLine(node, lineClass(`list-line list-depth-${Math.min(depth, 4)}`));
    if (!mark || isRevealed(this.state, mark.from, this.state.doc.lineAt(mark.from).to)) return;
    const line = this.state.doc.lineAt(mark.from);
    this.made.push(lineClass('list-first').range(line.from));
    if (node.parent?.name === 'BulletList') this.made.push(bullet.range(mark.from, mark.to));
    if (/^[ \t]+$/u.test(this.state.sliceDoc(line.from, mark.from)))
      this.hide(line.from, mark.from);
  }

  private paragraph(node: SyntaxNode): void {
    const shown = isRevealed(this.state, node.from, node.to);
    if (shown && this.state.field(revealedField).linesApart) return;
    this.joinLines(node, shown ? markedJoin : joined);
    if (shown) return;
    const first = this.state.doc.lineAt(node.from);
    const indent = this.state.sliceDoc(first.from, node.from);
    if (/^[ \t>]+$/u.test(indent)) this.hide(first.from, node.from);
    this.inline(node);
  }

  /** Joins the lines of a paragraph, but for forced breaks and inside formulas. */
  private joinLines(node: SyntaxNode, join: Decoration): void {
    const { doc } = this.state;
    const barred = stretches(node, ['Formula', 'HardBreak']);
    for (let line = doc.lineAt(node.from); line.to < node.to; line = doc.line(line.number + 1)) {
      const next = doc.line(line.number + 1);
      const margin = /^[ \t>]*/u.exec(next.text)?.[0].length ?? 0;
      const to = Math.min(next.from + margin, node.to);
      if (!barred.some((range) => range.from < to && line.to < range.to)) {
        this.made.push(join.range(line.to, to));
      }
    }
  }

  /** A displayed formula on lines of its own. */
  private formulaBlock(node: SyntaxNode): void {
    if (isRevealed(this.state, node.from, node.to)) {
      this.eachLine(node, lineClass('unset'));
    } else {
      this.made.push(lineClass('displayed').range(this.state.doc.lineAt(node.from).from));
      this.formula(node);
    }
  }

  private formula({ from, to }: SyntaxNode): void {
    const source = this.state.sliceDoc(from, to);
    const display = source.startsWith('$$');
    const latex = display ? source.slice(2, -2) : source.slice(1, -1);
    const widget = new MathsWidget(latex.trim(), display);
    this.made.push(Decoration.replace({ widget }).range(from, to));
  }

  /** Typesets what stands inside a paragraph or heading. */
  private inline(block: SyntaxNode): void {
    block.cursor().iterate((ref) => {
      const isBlock = ref.name === block.name && ref.from === block.from && ref.to === block.to;
      if (!isBlock) this.inlineNode(ref.node);
    });
  }

  private inlineNode(node: SyntaxNode): void {
    const { name, from, to } = node;
    if (isBracketed(node) || isBracketed(node.parent)) return;
    const mark = INLINE_MARKS[name];
    if (mark) this.made.push(mark.range(from, to));
    if (HIDDEN_MARKS.has(name)) this.hide(from, to);
    else if (name === 'Formula') this.formula(node);
    else if (name === 'URL' && node.parent?.name !== 'Autolink') this.hide(from, to);
    else if (name === 'Escape') this.hide(from, from + 1);
    else if (name === 'HardBreak') this.made.push(broken.range(from, to));
  }

  private fence(node: SyntaxNode): void {
    const { doc } = this.state;
    const first = doc.lineAt(node.from).number;
    const last = doc.lineAt(node.to).number;
    for (let number = first; number <= last; number += 1) this.fencedLines.add(number);
    if (!isCellFence(this.state, node)) return this.plainFence(node);
    const closed = node.getChildren('CodeMark').length > 1;
    for (let number = first; number <= last; number += 1) {
      const isFence = number === first || (closed && number === last);
      const name = isFence ? (number === first ? 'fence fence-open' : 'fence fence-close') : 'cell';
      const line = doc.line(number);
      this.made.push(lineClass(name).range(line.from));
      if (line.text.trim() === '') this.made.push(lineClass('cell-blank').range(line.from));
    }
  }

  private plainFence(node: SyntaxNode): void {
    this.eachLine(node, lineClass('plain-code'));
    for (const mark of node.getChildren('CodeMark')) {
      this.made.push(lineClass('plain-fence').range(this.state.doc.lineAt(mark.from).from));
    }
  }

  private rule(node: SyntaxNode): void {
    const line = this.state.doc.lineAt(node.from);
    this.made.push(lineClass('rule').range(line.from));
    if (!isRevealed(this.state, node.from, node.to)) this.hide(node.from, node.to);
  }

  private hide(from: number, to: number): void {
    if (from < to) this.made.push(hidden.range(from, to));
  }

  private eachLine(node: SyntaxNode, decoration: Decoration): void {
    const { doc } = this.state;
    for (let line = doc.lineAt(node.from); ; line = doc.line(line.number + 1)) {
      this.made.push(decoration.range(line.from));
      if (line.to >= node.to) break;
    }
  }
}

/** Whether this is words in brackets, `[1]` or `[rad/s]`, which the grammar takes for a link though it leads nowhere. */
function isBracketed(node: SyntaxNode | null): boolean {
  return (node?.name === 'Link' || node?.name === 'Image') && node.getChild('URL') === null;
}

function depthOf(node: SyntaxNode): number {
  let depth = 0;
  for (let parent = node.parent; parent; parent = parent.parent) {
    if (parent.name === 'ListItem') depth += 1;
  }
  return depth;
}

function stretches(block: SyntaxNode, names: readonly string[]): { from: number; to: number }[] {
  const found: { from: number; to: number }[] = [];
  block.cursor().iterate(({ name, from, to }) => {
    if (names.includes(name)) found.push({ from, to });
  });
  return found;
}
