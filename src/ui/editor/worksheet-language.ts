import { defineLanguageFacet, Language } from '@codemirror/language';
import { worksheetParser } from '../../language/index.ts';

/** The worksheet grammar as the editor uses it: CommonMark with the loop language in its cells. */
export const worksheetLanguage = new Language(
  defineLanguageFacet({ commentTokens: { line: '#' } }),
  worksheetParser,
  [],
  'worksheet',
);
