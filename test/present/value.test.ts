import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { isRefusal } from '../../src/base/index.ts';
import { ALWAYS, routhArray, type RouthArray, type Value } from '../../src/control/index.ts';
import {
  matrixLatex,
  matrixText,
  routhLatex,
  routhRows,
  valueLatex,
  valueText,
} from '../../src/present/index.ts';
import { readFormula, writingOf } from './read-formula.ts';

const writing = writingOf('J b Tw R Kp Kd Ki a', 'Kp Kd Ki');
const base = { when: ALWAYS, notes: [] };

function arrayOf(polynomial: string): RouthArray {
  const array = routhArray(readFormula(polynomial).num, writing.signOf);
  if (isRefusal(array)) throw new Error(array.reason);
  return array;
}

describe('a Routh array', () => {
  const array = arrayOf('J s^3 + Kd s^2 + Kp s + Ki');

  it('has its entries row by row from the highest power', () => {
    expect(routhRows(array, writing)).toEqual([
      ['J', 'Kp'],
      ['Kd', 'Ki'],
      ['(Kp Kd - J Ki)/Kd'],
      ['Ki'],
    ]);
  });

  it('is set with the powers of s at the left', () => {
    const latex = routhLatex(array, writing);
    expect(latex).toMatch(/^\\begin\{array\}\{l\} \\begin\{array\}\{c\|cc\} s\^\{3\} & J & K_/);
    expect(latex).toContain('& \\displaystyle \\frac{');
    katex.renderToString(latex, { strict: 'error' });
  });

  it('is followed by what keeps its first column positive, one condition a line', () => {
    const below = routhLatex(arrayOf('s^2 + (Kp - Kd) s + Kp - Ki'), writing).split(
      '\\end{array}',
    )[1];
    expect(below).toMatch(/\\text\{stable if\}.*\\text\{and\}/);
    expect(routhLatex(arrayOf('s^2 + 3 s + 2'), writing)).toContain('\\text{stable}');
    expect(routhLatex(arrayOf('s^2 - 3 s + 2'), writing)).toContain('\\text{not stable}');
  });

  it('rounds what is too long to read, and says so; the rows stay exact', () => {
    // Third row of s^3 + 1.23457 s^2 + 7.65432 s + 3.14159: 7.65432 − 3.14159/1.23457
    const long = arrayOf('s^3 + 123457/100000 s^2 + 765432/100000 s + 314159/100000');
    const latex = routhLatex(long, writing);
    expect(latex).toMatch(/s\^\{1\} & \\approx [\d\\,]+/);
    expect(routhRows(long, writing)[2][0]).toMatch(/\d{5,}\/\d{5,}/);
    katex.renderToString(latex, { strict: 'error' });
  });

  it('marks the row of a special case', () => {
    // s^3 + s^2 + 4 s + 4: the row of s^1 vanishes, its auxiliary polynomial is s^2 + 4. From memory, no source.
    const latex = routhLatex(arrayOf('s^3 + s^2 + 4 s + 4'), writing);
    expect(latex).toContain('\\text{ zero row}');
    katex.renderToString(latex, { strict: 'error' });
  });
});

describe('a matrix', () => {
  const rows = [
    [readFormula('0'), readFormula('1')],
    [readFormula('-Kp/J'), readFormula('-b/J')],
  ];

  it('is written so that the language reads it back', () => {
    expect(matrixText(rows, writing)).toBe('rows(0, 1 | -Kp/J, -b/J)');
    expect(matrixText([[readFormula('b')]], writing)).toBe('b');
  });

  it('is set in brackets', () => {
    katex.renderToString(matrixLatex(rows, writing), { strict: 'error' });
  });
});

describe('values of every kind', () => {
  it.each<[string, Value, string]>([
    [
      'a sum of parts takes their signs',
      {
        ...base,
        kind: 'parts',
        joined: 'sum',
        parts: ['1/s', '-Kp/(s + a)', 'b'].map((text) => ({
          name: '',
          value: {
            ...base,
            kind: 'formula',
            ratio: readFormula(text),
            hidden: null,
            origin: 'formula',
          },
        })),
      },
      '1/s - Kp/(s + a) + b',
    ],
    [
      'a list of parts names them',
      {
        ...base,
        kind: 'parts',
        joined: 'list',
        parts: ['Kp', 'Kd'].map((name) => ({
          name,
          value: {
            ...base,
            kind: 'formula',
            ratio: readFormula(`J ${name}`),
            hidden: null,
            origin: 'formula',
          },
        })),
      },
      'Kp = J Kp, Kd = J Kd',
    ],
    [
      'a growing final value has its rate',
      {
        ...base,
        kind: 'none',
        reason: 'grows without bound',
        growth: { rate: readFormula('R/Kp'), power: 1 },
      },
      'grows without bound (rate R/Kp)',
    ],
    [
      'a delayed signal has its transform',
      {
        ...base,
        kind: 'signal',
        name: 'x',
        blocks: [],
        inputs: [],
        terms: [
          {
            input: 'w',
            source: 'constant',
            transform: readFormula('Tw/s'),
            after: readFormula('5'),
          },
        ],
      },
      'Tw delay(5)/s',
    ],
    [
      'roots are those of a polynomial',
      { ...base, kind: 'roots', of: 'poles', polynomial: readFormula('J s^2 + b s + Kp').num },
      'J s^2 + b s + Kp = 0',
    ],
  ])('%s', (_, value, expected) => {
    expect(valueText(value, writing)).toBe(expected);
    katex.renderToString(valueLatex(value, writing), { strict: 'error' });
  });

  it('of a sum that grows multiplies all of it by time', () => {
    const growth = { rate: readFormula('R + a'), power: 2 };
    const value: Value = { ...base, kind: 'none', reason: 'grows without bound', growth };
    expect(valueLatex(value, writing)).toBe('\\text{grows as}\\quad \\frac{t^{2}(R+a)}{2}');
  });
});
