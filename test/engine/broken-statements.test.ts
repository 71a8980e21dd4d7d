import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

describe('a statement that cannot be read', () => {
  const cell = evaluateCell(`
k is 2 N/m
x = 2 +
draw picture of x
3 +
explain (
tabulate (
require ( # R-1 half-typed
require x <= # R-2
y = 2 k`);

  test('has its row all the same, without a value', () => {
    expect(
      cell.report.results.map(({ line, content }) => [line, content.name, content.kind]),
    ).toEqual([
      [4, 'x', 'value'],
      [5, null, 'figure'],
      [6, null, 'value'],
      [7, null, 'text'],
      [8, null, 'table'],
      [11, 'y', 'value'],
    ]);
    for (const { line, content } of cell.report.results) {
      if (line === 11) continue;
      expect(content).toMatchObject({ state: 'error', value: null, formula: null, span: null });
    }
    expect(cell.result('y').value).toBe(4);
  });

  test('is an undecided requirement where it is one', () => {
    expect(cell.report.requirements.map(({ content }) => content)).toMatchObject([
      { label: 'R-1 half-typed', text: '(', verdict: 'undecided' },
      { label: 'R-2', text: 'x <=', verdict: 'undecided' },
    ]);
  });

  test('is a problem once', () => {
    const lines = cell.report.problems.map(({ span }) => span.from);
    expect(new Set(lines).size).toBe(cell.problems.length);
    expect(cell.problems).toHaveLength(7);
  });
});
