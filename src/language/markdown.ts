import type { BlockContext, Element, InlineContext, Line, MarkdownConfig } from '@lezer/markdown';
import { tags } from '@lezer/highlight';

const DOLLAR = 36;
const BRACE = 123;

/** `{e_ss}`, and `{storm.e}` for a signal. */
const REFERENCE = /^\{([\p{L}][\p{L}\p{M}\d_]*(?:\.[\p{L}][\p{L}\p{M}\d_]*)*)\}/u;

/** `$…$`: no white space just inside the signs, and no digit after them, so that prices are not formulas. */
const INLINE_FORMULA = /^\$(?![\s$])(?:\\.|[^\\$])*?(?<!\s)\$(?!\d)/;
const DISPLAYED_FORMULA = /^\$\$(?:\\.|[^\\$])+\$\$/;

function parseFormula(context: InlineContext, next: number, position: number): number {
  if (next !== DOLLAR) return -1;
  const rest = context.slice(position, context.end);
  const match = DISPLAYED_FORMULA.exec(rest) ?? INLINE_FORMULA.exec(rest);
  if (!match) return -1;
  return context.addElement(context.elt('Formula', position, position + match[0].length));
}

function parseReference(context: InlineContext, next: number, position: number): number {
  if (next !== BRACE) return -1;
  const match = REFERENCE.exec(context.slice(position, context.end));
  if (!match) return -1;
  return context.addElement(context.elt('Reference', position, position + match[0].length));
}

/**
 * Reads a paragraph that begins with `$$` up to the line that ends with `$$`. Where a blank line or a fence comes first
 * it is a paragraph like others: a formula that is still being typed must not swallow the cells below it.
 */
function parseFormulaBlock(context: BlockContext, line: Line): boolean {
  const first = line.text.slice(line.pos).trimEnd();
  if (!first.startsWith('$$')) return false;
  const from = context.lineStart + line.pos;
  const lines = [line.text.slice(line.pos)];
  let to = from + lines[0]!.length;
  let isClosed = first.length > 4 && first.endsWith('$$');
  while (!isClosed && context.nextLine() && !endsParagraph(context, line)) {
    lines.push(line.text);
    // The whole line: a block that ends short of its line's end would be kept when the next line changes.
    to = context.lineStart + line.text.length;
    isClosed = line.text.trimEnd().endsWith('$$');
  }
  if (isClosed) context.nextLine();
  const content = isClosed ? [] : inlineContent(context, lines, from);
  context.addElement(context.elt(isClosed ? 'FormulaBlock' : 'Paragraph', from, to, content));
  return true;
}

/** What stands in the lines of a paragraph, unless the marks of a quote or list stand between them. */
function inlineContent(context: BlockContext, lines: readonly string[], from: number): Element[] {
  const isInterrupted = context.depth > 1 && lines.length > 1;
  return isInterrupted ? [] : context.parser.parseInline(lines.join('\n'), from);
}

/** How many containers a line continues; the library keeps it, but does not list it in its types. */
type DepthLine = Line & { readonly depth: number };

function endsParagraph(context: BlockContext, line: Line): boolean {
  const content = line.text.slice(line.pos);
  const leavesContainer = (line as DepthLine).depth < context.depth;
  return leavesContainer || content.trim() === '' || /^(```|~~~)/.test(content);
}

/** CommonMark with formulas, and with references to names of the worksheet in its prose. */
export const worksheetMarkdown: MarkdownConfig = {
  defineNodes: [
    { name: 'Formula', style: tags.special(tags.content) },
    { name: 'FormulaBlock', block: true, style: tags.special(tags.content) },
    { name: 'Reference', style: tags.special(tags.variableName) },
  ],
  parseInline: [
    { name: 'Formula', parse: parseFormula, before: 'Emphasis' },
    { name: 'Reference', parse: parseReference, before: 'Emphasis' },
  ],
  parseBlock: [{ name: 'FormulaBlock', parse: parseFormulaBlock, before: 'LinkReference' }],
};
