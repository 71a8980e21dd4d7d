import type { BlockContext, InlineContext, Line, MarkdownConfig } from '@lezer/markdown';
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

/** Whether a line, from its content on, ends a displayed formula that an earlier line opened. */
function closesFormula(line: Line): boolean {
  return line.text.slice(line.pos).trimEnd().endsWith('$$');
}

/**
 * Reads a paragraph that begins with `$$` up to the line that ends with `$$`. Where a blank line or a fence comes first
 * there is no formula: a formula that is still being typed must not swallow the cells below it.
 */
function parseFormulaBlock(context: BlockContext, line: Line): boolean {
  const opening = line.text.slice(line.pos).trimEnd();
  if (!opening.startsWith('$$')) return false;
  const from = context.lineStart + line.pos;
  let to = context.lineStart + line.text.trimEnd().length;
  let isClosed = opening.length > 4 && opening.endsWith('$$');
  while (!isClosed && context.nextLine() && !endsParagraph(context, line)) {
    to = context.lineStart + line.text.trimEnd().length;
    isClosed = closesFormula(line);
  }
  if (isClosed) context.nextLine();
  context.addElement(context.elt(isClosed ? 'FormulaBlock' : 'Paragraph', from, to));
  return true;
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
