import { ensureSyntaxTree, syntaxTree } from '@codemirror/language';
import type { EditorState } from '@codemirror/state';
import type { Heading } from '../outline.ts';

const PARSE_MILLISECONDS = 50;

/** Headings as far as the document is parsed; asked again, it is parsed further. */
export interface FoundHeadings {
  readonly headings: readonly Heading[];
  readonly complete: boolean;
}

/** The headings of the document, with their words free of markup. */
export function headingsOf(state: EditorState): FoundHeadings {
  const whole = ensureSyntaxTree(state, state.doc.length, PARSE_MILLISECONDS);
  const tree = whole ?? syntaxTree(state);
  const headings: Heading[] = [];
  for (let node = tree.topNode.firstChild; node; node = node.nextSibling) {
    const level = /^(?:ATX|Setext)Heading(\d)$/u.exec(node.name)?.[1];
    if (level === undefined) continue;
    const text = plainWords(state.sliceDoc(node.from, node.to));
    headings.push({ from: node.from, level: Number(level), text });
  }
  return { headings, complete: whole !== null };
}

function plainWords(source: string): string {
  return source
    .replace(/\n[=-]+\s*$/u, '')
    .replace(/^#+\s*/u, '')
    .replace(/\s+#+\s*$/u, '')
    .replace(/[*`$]/gu, '')
    .trim();
}
