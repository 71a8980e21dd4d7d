import { describe, expect, test } from 'vitest';
import { parseWorksheet, type WorksheetDocument } from '../../src/language/index.ts';
import { randomSource } from './random.ts';
import { SAMPLE } from './sample.ts';
import { VOCABULARY } from './vocabulary.ts';

/** All that a document says, without its tree. */
function contents(document: WorksheetDocument): unknown {
  const { statements, cells, prose, references, problems } = document;
  return { statements, cells, prose, references, problems };
}

const PIECES = [
  ' ',
  '\n',
  '\n  ',
  '\n    ',
  '  ',
  '# ',
  '(',
  ')',
  '```',
  '```loop\n',
  '\n```\n',
  '> ',
  '- ',
  "'",
  '"',
  ' is ',
  ' = ',
  'loop a driven by b\n  c = b\n',
  'x',
  '2',
  '/',
  '%',
  '\n\n',
  '\t',
  '\r\n',
  'θ',
  'Kp',
  '$$',
  '{x}',
  ' ± 2 %',
  '|',
  ',',
];

function edited(text: string, random: (below: number) => number): string {
  const from = random(text.length + 1);
  const removed = random(3) === 0 ? random(40) : random(3);
  const inserted = random(4) === 0 ? '' : PIECES[random(PIECES.length)]!;
  return text.slice(0, from) + inserted + text.slice(from + removed);
}

describe('reading with the document of an earlier text', () => {
  test.each([1, 2, 3, 4, 5])(
    'gives what reading anew gives, after 40 random edits (seed %i)',
    (seed) => {
      const random = randomSource(seed);
      let text = SAMPLE;
      let document = parseWorksheet(text, VOCABULARY);
      for (let edit = 0; edit < 40; edit++) {
        const before = text;
        text = edited(text, random);
        document = parseWorksheet(text, VOCABULARY, document);
        const anew = contents(parseWorksheet(text, VOCABULARY));
        if (JSON.stringify(contents(document)) === JSON.stringify(anew)) continue;
        expect(contents(document), JSON.stringify({ before, text })).toEqual(anew);
      }
    },
  );

  test('keeps the nodes of statements that did not change, wherever they moved', () => {
    const before = parseWorksheet(SAMPLE, VOCABULARY);
    const after = parseWorksheet(`A new line.\n\n${SAMPLE}`, VOCABULARY, before);
    expect(after.statements.map(({ node }) => node)).toHaveLength(before.statements.length);
    after.statements.forEach(({ node }, k) => expect(node).toBe(before.statements[k]!.node));
  });

  test('reads a statement anew when a name in it becomes something else', () => {
    const cell = (first: string) => `\`\`\`loop\n${first}\ny = K(r - 1)\nz = 2 a\n\`\`\`\n`;
    const before = parseWorksheet(cell('K is 3'), VOCABULARY);
    const after = parseWorksheet(cell('loop K'), VOCABULARY, before);
    expect(before.statements[1]!.node).toMatchObject({ formula: { kind: 'product' } });
    expect(after.statements[1]!.node).toMatchObject({ formula: { kind: 'call' } });
    expect(after.statements[2]!.node).toBe(before.statements[2]!.node);
  });

  test('gives two statements of the same text two nodes', () => {
    const text = '```loop\nx = 1\nx = 1\n```\n';
    const before = parseWorksheet(text, VOCABULARY);
    const [first, second] = parseWorksheet(text, VOCABULARY, before).statements;
    expect(first!.node).not.toBe(second!.node);
    expect(first!.node).toBe(before.statements[0]!.node);
  });
});
