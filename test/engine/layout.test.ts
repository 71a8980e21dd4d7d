import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { createSession, type Report } from '../../src/engine/index.ts';
import { evaluateCell } from './worksheet.ts';

function reportOn(text: string): Report {
  return createSession().update(text);
}

function problemsOf(text: string): string[] {
  return reportOn(text).problems.map(
    ({ severity, span, message }) =>
      `${severity} at ‹${text.slice(span.from, span.to)}›: ${message}`,
  );
}

function valuesOf(text: string): Record<string, unknown> {
  return Object.fromEntries(
    reportOn(text).results.map(({ content }) => [content.name ?? '', content.value]),
  );
}

describe('a worksheet is a CommonMark document', () => {
  test('in which the fences tagged loop are the cells', () => {
    const text = [
      '# Title',
      '```',
      'a is 99',
      '```',
      '```loop',
      'a is 3',
      '```',
      'prose a is 5',
      '~~~loop',
      'x = 2 a',
      '~~~',
      '> ```loop',
      '> q = 4 a',
      '> ```',
      '',
      '- item',
      '  ```loop',
      '  v = 5 a',
      '  ```',
      '',
    ].join('\n');
    expect(problemsOf(text)).toEqual([]);
    expect(valuesOf(text)).toEqual({ x: 6, q: 12, v: 15 });
  });

  test('in which a nearly tagged fence is prose, with a warning', () => {
    expect(problemsOf('```Loop\na is 3\n```\n')).toEqual([
      "warning at ‹Loop›: A cell's fence is tagged `loop` alone; tagged `Loop` it is prose.",
    ]);
  });

  test('may end within a cell', () => {
    const text = '```loop\na is 3\nx = 2 a';
    expect(problemsOf(text)).toEqual([
      'warning at ‹```loop›: This cell is not closed: it takes in all that follows.',
    ]);
    expect(valuesOf(text)).toEqual({ x: 6 });
  });

  test.each([
    ['empty', ''],
    ['without cells', '# Only prose\n'],
    ['with an empty cell', '```loop\n```\n'],
    ['with a cell of comments', '```loop\n# nothing\n\n```\n'],
  ])('may be %s', (_, text) => {
    expect(reportOn(text)).toMatchObject({ results: [], problems: [], assumptions: [] });
  });

  test.each([['\r\n'], ['\n']])('may have any line ends: %j', (end) => {
    const text = ['```loop', 'a is 3', 'x = 2 a', '  + 1', '```', ''].join(end);
    expect(problemsOf(text)).toEqual([]);
    expect(valuesOf(text)).toEqual({ x: 7 });
  });

  test('may begin with a byte order mark', () => {
    expect(valuesOf('\uFEFF```loop\nx = 2\n```\n')).toEqual({ x: 2 });
  });

  test('gives every row its line in the file', () => {
    const { results, requirements, assumptions } = reportOn(
      '# T\n\n```loop\na is 3\nx = 2 a\nrequire x > 0\n```\n',
    );
    expect(assumptions[0].line).toBe(4);
    expect(results[0].line).toBe(5);
    expect(requirements[0].line).toBe(6);
  });
});

describe('names in prose', () => {
  const text = (prose: string) =>
    `${prose}\n\n\`\`\`loop\na is 3 mm\nx = 2 a in µm\ny = x > 3 [m]\ntheta is 2 mrad\n\`\`\`\n`;
  const shown = (prose: string) => reportOn(text(prose)).references.map((row) => row.shown);

  test('show present values', () => {
    expect(shown('The gap is {x}, {a}, {theta}, {y}.')).toEqual([
      '6000 µm',
      '3 mm',
      '2 mrad',
      'does not hold',
    ]);
  });

  test('stay in maths and code', () => {
    expect(shown('`{x}` and $ {x} $ and $a_{x}$ and $$b_{x}$$')).toHaveLength(1);
    expect(shown('`{x}` and $a_{x}$ and $$b_{x}$$')).toEqual([]);
    expect(shown('```\n{x}\n```')).toEqual([]);
  });

  test('that nothing introduces are warned of', () => {
    expect(problemsOf(text('It is {thetaa}.'))).toEqual([
      'warning at ‹{thetaa}›: Nothing introduces thetaa, so this stays as typed. Is theta meant?',
    ]);
  });

  test('follow a change', () => {
    const session = createSession();
    session.update(text('{x}'));
    const { references } = session.update(text('{x}').replace('3 mm', '4 mm'));
    expect(references[0].shown).toBe('8000 µm');
  });
});

describe('lines', () => {
  test('that are indented deeper continue the line above, over blank and comment lines', () => {
    const cell = evaluateCell('a is 3\nx = a\n# comment\n\n  + 1\n   + 2\ny = 2 x');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').value).toBe(6);
    expect(cell.result('y').value).toBe(12);
  });

  test('of a block go on after blank lines and comments at the margin', () => {
    const cell = evaluateCell(
      "loop az driven by w\n    # comment\n\n    x' = w\n# comment at the margin\n      - 2 x\n\n    y = x\ncase c of az\n  w = step(2)\nfinal(c.y)",
    );
    expect(cell.problems).toEqual([]);
    expect(cell.result('final(c.y)').value).toBe(1);
  });

  test('may begin deeper than the fence', () => {
    const cell = evaluateCell('  a is 3\n  x = 2 a');
    expect(cell.problems).toEqual([]);
    expect(cell.result('x').value).toBe(6);
  });

  test('that are statements, but indented, are told what that means', () => {
    expect(evaluateCell('y = 3\n  z = 4').problems).toEqual([
      'error at ‹=›: An equation or definition has one `=`; a condition goes in brackets (a line that is indented deeper continues the line above it).',
    ]);
  });

  test('with an unclosed bracket are an error of their own statement only', () => {
    const cell = evaluateCell('a is 3\nx = (a + 1\n  + 2 a\ny = 2 a');
    expect(cell.problems).toEqual(['error at ‹(›: This bracket is not closed.']);
    expect(cell.result('y').value).toBe(6);
  });

  test('with an unclosed bracket in a block leave the other lines alone', () => {
    const { problems } = evaluateCell(
      "loop az driven by w\n  x' = (w - 2 x\n  y = x\na is 3\nz = a",
    );
    expect(problems[0]).toBe('error at ‹(›: This bracket is not closed.');
    expect(
      evaluateCell("loop az driven by w\n  x' = (w - 2 x\n  y = x\na is 3\nz = a").result('z')
        .value,
    ).toBe(3);
  });

  test('end in a comment, in which # is text', () => {
    const { report } = evaluateCell('a is 3 # the "a" # more\nrequire a > 2 # R-1 "quoted # not"');
    expect(report.assumptions[0].content.description).toBe('the "a" # more');
    expect(report.requirements[0].content.label).toBe('R-1 "quoted # not"');
  });
});

describe('half-typed text', () => {
  const whole = [
    'J is 480 kg m^2 ± 8 % # dish',
    'Kp is 9 kN m/rad from 1 to 20',
    'J, Kp are positive',
    'tune Kp from 1 to 20',
    'C = Kp (1 + 2/s)',
    'loop az driven by r, w',
    "  J theta'' = T + w",
    '  T = C (r - theta)',
    'case storm of az',
    '  w = step(3 N m) after 2 s',
    'e = final(storm.theta with Kp is 3) in mrad',
    'require abs(e) <= 2 mrad and stable(az)',
    'draw response of storm.theta over 20 s',
  ];

  test.each(whole.map((line, index) => [line.trim(), index] as const))(
    'in any place of `%s` gives problems in that statement and leaves the others alone',
    (line, index) => {
      const session = createSession();
      for (let length = 0; length <= line.length; length++) {
        const lines = [...whole];
        lines[index] = lines[index].slice(0, lines[index].length - line.length + length);
        const text = `\`\`\`loop\n${lines.join('\n')}\nz1 = 2 zz\nzz is 4\n\`\`\`\n`;
        const report = session.update(text);
        const ours = report.problems.filter(({ code }) => code === 'our-fault');
        expect(ours).toEqual([]);
        const last = report.results.find(({ content }) => content.name === 'z1');
        expect(last?.content.value).toBe(8);
        for (const { span } of report.problems) {
          expect(span.from).toBeGreaterThanOrEqual(0);
          expect(span.to).toBeLessThanOrEqual(text.length);
        }
      }
    },
  );
});

test('the worksheet of the language page reads without an unexpected problem', () => {
  const text = readFileSync(new URL('../data/language-example.md', import.meta.url), 'utf8');
  const problems = reportOn(text).problems.filter(({ code }) => code !== 'not-available-yet');
  expect(problems).toEqual([]);
});
