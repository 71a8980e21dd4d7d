import type { Parser } from '@lezer/common';
import { styleTags, tags } from '@lezer/highlight';
import { parseCode, parser as commonMarkParser } from '@lezer/markdown';
import { parser as cellParser } from './loop.grammar';
import { worksheetMarkdown } from './markdown.ts';

/** The info string of the fences that are cells. */
export const CELL_INFO = 'loop';

/** The parser of a cell's text, with highlighting. */
export const loopParser = cellParser.configure({
  props: [
    styleTags({
      Name: tags.variableName,
      Keyword: tags.keyword,
      Number: tags.number,
      'Text OpenText': tags.string,
      Comment: tags.lineComment,
      Operator: tags.arithmeticOperator,
      Relation: tags.compareOperator,
      Arrow: tags.operator,
      PlusMinus: tags.operator,
      Prime: tags.operator,
      UnitSign: tags.unit,
      Bracket: tags.paren,
      Punctuation: tags.separator,
      Stray: tags.invalid,
    }),
  ],
});

/** The parser of a whole worksheet: CommonMark, with the cells' text parsed by {@link loopParser}. */
export const worksheetParser: Parser = commonMarkParser.configure([
  worksheetMarkdown,
  parseCode({ codeParser: (info) => (info.trim() === CELL_INFO ? loopParser : null) }),
]);
