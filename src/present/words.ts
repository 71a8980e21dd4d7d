const MARKS: Readonly<Record<string, string>> = {
  '\\': '\\textbackslash{}',
  '^': '\\textasciicircum{}',
  '~': '\\textasciitilde{}',
};

/** A sentence set as upright text within a formula. */
export function wordsLatex(words: string): string {
  const escaped = words.replace(/[\\{}$&#%_^~]/g, (mark) => MARKS[mark] ?? `\\${mark}`);
  return `\\text{${escaped}}`;
}
