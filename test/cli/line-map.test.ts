import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lineMap } from '../../src/cli/line-map.ts';

describe('the line map', () => {
  it('counts lines and columns from 1, whatever ends the lines', () => {
    const map = lineMap('ab\r\ncd\n\re');
    const places = [0, 2, 3, 4, 6, 7, 8, 9].map((offset) => map.position(offset));
    expect(places.map(({ line, column }) => `${line}:${column}`)).toEqual([
      '1:1',
      '1:3',
      '1:4',
      '2:1',
      '2:3',
      '3:1',
      '4:1',
      '4:2',
    ]);
    expect([1, 2, 3, 4].map((line) => map.lineEnd(line))).toEqual([2, 6, 7, 9]);
  });

  it('counts a character outside the basic plane as two columns, as editors do', () => {
    expect(lineMap('a𝜃b').position(3)).toEqual({ line: 1, column: 4 });
  });

  it('of an empty text has one place', () => {
    expect(lineMap('').position(0)).toEqual({ line: 1, column: 1 });
    expect(lineMap('').lineEnd(1)).toBe(0);
  });

  it('agrees with counting by hand in random texts', () => {
    const texts = fc.array(fc.constantFrom('a', 'b', '\n', '\r', '\r\n'), { maxLength: 30 });
    fc.assert(
      fc.property(texts, fc.nat(40), (pieces, cut) => {
        const before = pieces.slice(0, cut).join('');
        const lines = before.split(/\r\n|\n|\r/);
        // Between the two characters of one line end there is no line.
        fc.pre(!(before.endsWith('\r') && pieces[cut]?.startsWith('\n')));
        expect(lineMap(pieces.join('')).position(before.length)).toEqual({
          line: lines.length,
          column: lines[lines.length - 1].length + 1,
        });
      }),
      { seed: 20260613, numRuns: 500 },
    );
  });
});
