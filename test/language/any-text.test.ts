import { describe, expect, test } from 'vitest';
import { parseFormula, parseWorksheet } from '../../src/language/index.ts';
import { randomSource } from './random.ts';
import { SAMPLE } from './sample.ts';
import { VOCABULARY } from './vocabulary.ts';

const TOKENS =
  'is are has tune from to points loop driven by uses as case of starts at after over for in with require where draw titled explain tabulate and or not unit s t j pi x Kp theta rows limit step rows( limit( step( az( -> 2 3.5 1e-3 ( ) [ ] \' . , | -> + - * / ^ = <= >= < > ± +- · % ° √ " "a" # ² × \ud800 😀 e\u0301 µ Ω'.split(
    ' ',
  );
const SPACES = ['', ' ', ' ', '\n', '\n  ', '\n    ', '\t', '\r\n'];

function randomText(random: (below: number) => number, length: number): string {
  let text = '';
  for (let k = 0; k < length; k++)
    text += TOKENS[random(TOKENS.length)]! + SPACES[random(SPACES.length)]!;
  return text;
}

function inCell(text: string): string {
  return `\`\`\`loop\n${text}\n\`\`\`\n`;
}

/** Every span lies in the text, and every problem says something. */
function expectSound(text: string): void {
  const { statements } = parseWorksheet(text, VOCABULARY);
  let end = 0;
  for (const { from, to, node, problems } of statements) {
    expect(from).toBeGreaterThanOrEqual(end);
    expect(to).toBeLessThanOrEqual(text.length);
    expect(node.span.to).toBeLessThanOrEqual(to - from);
    end = to;
    for (const { span, message } of problems) {
      expect(span.from).toBeLessThan(span.to);
      expect(span.to).toBeLessThanOrEqual(to - from);
      expect(message).toMatch(/[.]$/);
    }
    if (node.kind === 'broken') expect(problems.length).toBeGreaterThan(0);
  }
}

describe('any text', () => {
  test.each([1, 2, 3, 4])(
    'in a cell is read without a throw, with every span in place (seed %i)',
    (seed) => {
      const random = randomSource(seed);
      for (let k = 0; k < 250; k++) expectSound(inCell(randomText(random, 1 + random(25))));
    },
  );

  test('that is cut off anywhere is read', () => {
    for (let end = 0; end <= SAMPLE.length; end += 7) expectSound(SAMPLE.slice(0, end));
  });

  test('as a formula is read', () => {
    const random = randomSource(11);
    for (let k = 0; k < 300; k++) {
      const { expression, problems } = parseFormula(randomText(random, random(12)), VOCABULARY);
      expect(expression === null).toBe(problems.some(({ severity }) => severity === 'error'));
    }
  });

  test.each([
    ['brackets', '('.repeat(20_000)],
    ['calls', 'sin('.repeat(20_000)],
    ['evaluations', `x = 1\ny = ${'x(j '.repeat(20_000)}`],
    ['signs', '-'.repeat(50_000) + 'x'],
    ['plus signs', '+ '.repeat(50_000) + 'x'],
    ['exponents', 'x^'.repeat(20_000) + '2'],
    ['nots', 'not '.repeat(20_000) + 'x'],
    ['primes', `x${"'".repeat(50_000)}`],
    ['members', `x${'.y'.repeat(20_000)}`],
    ['replacements', `x${' with a = 1'.repeat(20_000)}`],
    ['units', `x${' in m'.repeat(20_000)}`],
    ['unit brackets', `x is 1 ${'('.repeat(20_000)}`],
    ['slots', `${'step(1 ('.repeat(10_000)}`],
    ['solidi', `x = 1${'/a'.repeat(20_000)}`],
    ['terms', `x = a${' + a'.repeat(20_000)}`],
    ['factors', `x = a${' a'.repeat(20_000)}`],
    ['relations', `a${' < a'.repeat(20_000)}`],
    ['roots of units', `x is 1 ${'√'.repeat(50_000)}m`],
  ])('with a great many %s is read within the time of a test', (_, text) => {
    expectSound(inCell(text));
  });

  test('of two megabytes is read within the time of a test', () => {
    const text = SAMPLE.repeat(Math.ceil(2_000_000 / SAMPLE.length));
    const { statements } = parseWorksheet(text, VOCABULARY);
    expect(statements.length).toBeGreaterThan(20_000);
  });
});
