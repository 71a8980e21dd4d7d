import type { SyntaxNode } from '@lezer/common';
import type { Span } from '../base/index.ts';

export type TokenKind =
  'name' | 'keyword' | 'number' | 'text' | 'open-text' | 'symbol' | 'unit-sign' | 'stray';

/** A token of a statement; its place is relative to the statement's first character. */
export interface Token extends Span {
  readonly kind: TokenKind;
  /** As typed, but with one form for each sign: `<=` for `≤`, `±` for `+-`, `-` for `−`, `'` for `′`. */
  readonly text: string;
  /** Whether white space stands before it. */
  readonly spaced: boolean;
}

/** A line of a statement (with the lines that continue it): the statement's own, or one of its block. */
export interface TokenLine {
  readonly tokens: readonly Token[];
  /** The first comment that follows tokens on a line, without `#`. */
  readonly comment: string | null;
}

const KIND_OF_NODE: Readonly<Record<string, TokenKind>> = {
  Name: 'name',
  Keyword: 'keyword',
  Number: 'number',
  Text: 'text',
  OpenText: 'open-text',
  Stray: 'stray',
  UnitSign: 'unit-sign',
  Operator: 'symbol',
  Relation: 'symbol',
  Arrow: 'symbol',
  PlusMinus: 'symbol',
  Prime: 'symbol',
  Bracket: 'symbol',
  Punctuation: 'symbol',
};

const ONE_FORM: Readonly<Record<string, string>> = {
  '≤': '<=',
  '≥': '>=',
  '+-': '±',
  '−': '-',
  '⋅': '·',
  '’': "'",
  '′': "'",
};

class LineCollector {
  private readonly lines: { tokens: Token[]; comment: string | null }[] = [
    { tokens: [], comment: null },
  ];
  private end = 0;

  constructor(
    private readonly text: string,
    private readonly origin: number,
  ) {}

  startBlockLine(): void {
    this.lines.push({ tokens: [], comment: null });
  }

  add(
    node: { readonly name: string; readonly from: number; readonly to: number },
    by: number,
  ): void {
    const [from, to] = [node.from + by, node.to + by];
    if (node.name === 'Comment') this.addComment(from, to);
    const kind = KIND_OF_NODE[node.name];
    if (!kind) return;
    const typed = this.text.slice(from, to);
    const text = kind === 'symbol' ? (ONE_FORM[typed] ?? typed) : typed.replace('−', '-');
    const spaced = from > this.end;
    this.lines
      .at(-1)!
      .tokens.push({ kind, text, spaced, from: from - this.origin, to: to - this.origin });
    this.end = to;
  }

  private addComment(from: number, to: number): void {
    const line = this.lines.at(-1)!;
    const isAlone = line.tokens.length === 0 || this.text.slice(this.end, from).includes('\n');
    if (!isAlone) line.comment ??= this.text.slice(from + 1, to).trim();
  }

  finish(): readonly TokenLine[] {
    return this.lines;
  }
}

/**
 * The lines of tokens of a statement: its own line first, then those of its block.
 *
 * @param statement the `Statement` or `BlockStatement` node of the cell's tree
 * @param comment the comment that ends it, which stands outside of the node
 * @param text the worksheet's text
 * @param treeStart where the cell's tree starts in the text
 * @param origin where the statement's first character stands in the text
 */
export function tokenLines(
  statement: SyntaxNode,
  comment: Span | null,
  text: string,
  treeStart: number,
  origin: number,
): readonly TokenLine[] {
  const collector = new LineCollector(text, origin);
  statement.cursor().iterate((node) => {
    if (node.name === 'Line') collector.startBlockLine();
    else collector.add(node, treeStart);
  });
  if (comment) collector.add({ name: 'Comment', ...comment }, 0);
  return collector.finish();
}
