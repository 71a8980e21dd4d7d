import { HighlightStyle, syntaxHighlighting } from '@codemirror/language';
import { tags } from '@lezer/highlight';

/** Source is set quietly: words of the language stand out by weight, comments and units recede. */
const sourceStyle = HighlightStyle.define([
  { tag: tags.keyword, class: 'source-keyword' },
  { tag: [tags.comment, tags.lineComment], class: 'source-comment' },
  { tag: tags.unit, class: 'source-unit' },
  { tag: [tags.number, tags.literal], class: 'source-number' },
  { tag: tags.function(tags.variableName), class: 'source-function' },
  { tag: tags.string, class: 'source-string' },
  { tag: [tags.processingInstruction, tags.labelName, tags.meta], class: 'source-mark' },
]);

export const highlighting = syntaxHighlighting(sourceStyle);
