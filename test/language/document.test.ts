import { describe, expect, test } from 'vitest';
import {
  lineStarts,
  offsetSpan,
  parseWorksheet,
  placeProblem,
  positionAt,
  worksheetParser,
} from '../../src/language/index.ts';
import { shapeOf } from './shape.ts';
import { VOCABULARY } from './vocabulary.ts';

function read(text: string) {
  return parseWorksheet(text, VOCABULARY);
}

/** The texts of the statements of a worksheet. */
function statementTexts(text: string): readonly string[] {
  return read(text).statements.map(({ from, to }) => text.slice(from, to));
}

describe('a cell', () => {
  test.each([
    ['backticks', '```loop\na = 1\n```\n'],
    ['tildes', '~~~ loop \na = 1\n~~~\n'],
    ['a longer fence', '````loop\na = 1\n````\n'],
    ['an indented fence', 'text\n\n   ```loop\n   a = 1\n   ```\n'],
    ['a list item', '- item\n\n  ```loop\n  a = 1\n  ```\n'],
    ['a quote', '> ```loop\n> a = 1\n> ```\n'],
    ['a list in a quote', '> 1. ```loop\n>    a = 1\n>    ```\n'],
    ['carriage returns', 'x\r\n\r\n```loop\r\na = 1\r\n```\r\n'],
    ['no end', '```loop\na = 1'],
    ['blank lines and comments', '```loop\n\n# c\n\na = 1\n# d\n\n```\n'],
  ])('in %s is read', (_, text) => {
    expect(statementTexts(text)).toEqual(['a = 1']);
    expect(read(text).statements[0]!.node).toMatchObject({ kind: 'definition', name: 'a' });
  });

  test.each([
    ['without a tag', '```\na = 1\n```\n'],
    ['with another tag', '```text\na = 1\n```\n'],
    ['with words after the tag', '```loop x\na = 1\n```\n'],
    ['in code', '    ```loop\n    a = 1\n    ```\n'],
    ['in a fence', '````\n```loop\na = 1\n```\n````\n'],
  ])('%s is prose', (_, text) => {
    expect(read(text).cells).toEqual([]);
    expect(read(text).statements).toEqual([]);
  });

  test('has its fence and its content', () => {
    const text = 'a\n\n```loop\nx = 1\n```\n\n```loop\n```\n';
    const parts = read(text).cells.map((cell) => [
      text.slice(cell.from, cell.to),
      text.slice(cell.contentFrom, cell.contentTo),
    ]);
    expect(parts).toEqual([
      ['```loop\nx = 1\n```', 'x = 1\n'],
      ['```loop\n```', ''],
    ]);
  });

  test('that is not closed is said to take in all that follows', () => {
    const text = 'a\n\n~~~loop\nx = 1\n';
    expect(read(text).problems).toEqual([
      {
        code: 'unclosed-cell',
        severity: 'warning',
        span: { from: 3, to: 10 },
        message: 'This cell is not closed: it takes in all that follows.',
        fixes: [
          { title: 'close it at the end', edits: [{ span: { from: 17, to: 17 }, insert: '~~~' }] },
        ],
      },
    ]);
  });

  test('whose tag is nearly right is said to be prose', () => {
    expect(read('``` Loop x\ny = 1\n```\n').problems).toMatchObject([
      {
        code: 'near-cell',
        span: { from: 4, to: 10 },
        message: "A cell's fence is tagged `loop` alone; tagged `Loop x` it is prose.",
      },
    ]);
  });
});

describe('the layout of a cell', () => {
  const inCell = (lines: string) => `\`\`\`loop\n${lines}\n\`\`\`\n`;

  test.each([
    ['a line that is deeper continues', 'a = 1 +\n 2\nb = 3', ['a = 1 +\n 2', 'b = 3']],
    [
      'the margin may be anywhere',
      '  a = 1\n  b = 2\n    + 3\nc = 3',
      ['a = 1', 'b = 2\n    + 3', 'c = 3'],
    ],
    [
      'blank and comment lines end no block',
      'loop a\n  b = c\n\n# x\n    # y\n  c = d\ne',
      ['loop a\n  b = c\n\n# x\n    # y\n  c = d', 'e'],
    ],
    [
      'tabs indent',
      'loop a\n\tb = c\n\t\t+ d\n\te = f\ng',
      ['loop a\n\tb = c\n\t\t+ d\n\te = f', 'g'],
    ],
    ['an open bracket ends with its lines', 'a = (1,\n  2\nb = 3)', ['a = (1,\n  2', 'b = 3)']],
    ['carriage returns stay out of statements', 'a = 1 # c\r\nb = 2\r\n', ['a = 1 # c', 'b = 2']],
  ])('%s', (_, lines, texts) => {
    expect(statementTexts(inCell(lines))).toEqual(texts);
  });

  test('gives a block the lines at its indent, and continues those that are deeper', () => {
    const text = inCell('loop a\n    b = c\n       + d\n    e = f\n  g = h');
    const [loop] = read(text).statements;
    const equations = loop!.node.kind === 'loop' ? loop!.node.equations : [];
    expect(equations.map(({ left, right }) => `${shapeOf(left)} = ${shapeOf(right)}`)).toEqual([
      'b = (+ c d)',
      'e = f',
      'g = h',
    ]);
  });

  test('leaves the marks of a quote out of a statement that goes on over lines', () => {
    const text = '> ```loop\n> a = 1\n>   + 2\n> ```\n';
    const [statement] = read(text).statements;
    expect(statement!.problems).toEqual([]);
    expect(statement!.node).toMatchObject({ formula: { kind: 'sum', span: { from: 4, to: 13 } } });
  });
});

describe('prose', () => {
  const text = [
    '# One *two* `three` [four](http://x.example)',
    'Words {a} and `{b}` and $x_{c}$, \\{d}, {theta_1}, { e } and {storm.e}.',
    '* item **{f}**\n* $5 and $6 {g}',
    '> quote {h}',
    '$$\nx_{i}\n- {j}\n$$',
    '```\n{k}\n```',
    'Setext {l}\n======',
    '$$ {m} is not closed',
    '<b>{n}</b>',
    '[{o}](http://x.example/{p})',
    '    {q}',
  ].join('\n\n');

  test('has references outside of maths and code', () => {
    const names = read(text).references.map(({ name }) => name);
    expect(names).toEqual(['a', 'θ_1', 'storm.e', 'f', 'g', 'h', 'l', 'm', 'n', 'o']);
  });

  test('has references at their places', () => {
    const { references } = read(text);
    expect(references.map(({ from, to }) => text.slice(from, to))[1]).toBe('{theta_1}');
  });

  test('is listed block by block, with the plain text of headings', () => {
    const blocks = read(text).prose;
    expect(blocks.filter(({ kind }) => kind === 'heading')).toMatchObject([
      { level: 1, text: 'One two three four' },
      { level: 1, text: 'Setext {l}' },
    ]);
    expect(blocks.map(({ kind }) => kind)).toEqual(
      'heading text list quote formula code heading text text text code'.split(' '),
    );
  });

  test('with a formula that is still being typed takes no cell with it', () => {
    expect(statementTexts('$$\nx\n```loop\na = 1\n```\n')).toEqual(['a = 1']);
    expect(statementTexts('> $$\n> x\n\n```loop\na = 1\n```\n$$\n')).toEqual(['a = 1']);
  });
});

describe('places', () => {
  test('are lines and columns from 1', () => {
    const starts = lineStarts('ab\r\ncd\n\nf');
    expect(starts).toEqual([0, 4, 7, 8]);
    expect([0, 1, 4, 6, 7, 8, 9].map((offset) => positionAt(starts, offset))).toEqual([
      { line: 1, column: 1 },
      { line: 1, column: 2 },
      { line: 2, column: 1 },
      { line: 2, column: 3 },
      { line: 3, column: 1 },
      { line: 4, column: 1 },
      { line: 4, column: 2 },
    ]);
  });

  test('of problems and their fixes move with their statement', () => {
    const span = { from: 1, to: 2 };
    const problem = {
      code: 'c',
      severity: 'error' as const,
      span,
      message: 'm',
      fixes: [{ title: 't', edits: [{ span, insert: 'i' }] }],
    };
    expect(placeProblem(problem, 10)).toEqual({
      ...problem,
      span: { from: 11, to: 12 },
      fixes: [{ title: 't', edits: [{ span: { from: 11, to: 12 }, insert: 'i' }] }],
    });
    expect(offsetSpan(span, 3)).toEqual({ from: 4, to: 5 });
  });
});

test('the parser of a worksheet nests the cells in the Markdown', () => {
  const tree = worksheetParser.parse('# A\n\n```loop\nloop a\n  b = c\n```\n');
  expect(tree.resolveInner(22, 1).name).toBe('Name');
  expect(tree.resolveInner(14, 1).parent!.name).toBe('Header');
});
