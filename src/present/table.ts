import { asRational, rationalToNumber, type Ratio } from '../algebra/index.ts';
import { allOf, type Condition, type RouthArray } from '../control/index.ts';
import { formatNumber } from '../units/index.ts';
import { conditionLatex } from './condition.ts';
import { formulaLatex, formulaText } from './formula.ts';
import { numberLatex } from './written-latex.ts';
import type { Writing } from './writing.ts';

/** The entries of a Routh array as re-readable formulas, row by row from the highest power of s. */
export function routhRows(array: RouthArray, writing: Writing): string[][] {
  return array.rows.map((row) => row.entries.map((entry) => formulaText(entry, writing)));
}

/** A Routh array as one re-readable matrix, its short rows filled up with zeros. */
export function routhText(array: RouthArray, writing: Writing): string {
  const rows = routhRows(array, writing);
  const columns = Math.max(...rows.map((row) => row.length));
  const filled = rows.map((row) => [...row, ...Array<string>(columns - row.length).fill('0')]);
  return `rows(${filled.map((row) => row.join(', ')).join(' | ')})`;
}

/** A Routh array as LaTeX, and below it the conditions that keep its first column positive, one a line. */
export function routhLatex(array: RouthArray, writing: Writing): string {
  const lines = [arrayLatex(array, writing), ...verdictLines(array.conditions, writing)];
  return `\\begin{array}{l} ${lines.join(' \\\\ ')} \\end{array}`;
}

/** A line that keeps away from the one above. */
const ROOM = '\\rule{0pt}{2.1em}';

/** "stable if c₁", "and c₂", …; a word where the conditions are settled. */
function verdictLines(conditions: readonly Condition[], writing: Writing): string[] {
  const whole = allOf(conditions);
  if (whole.kind === 'truth') return [`${ROOM}\\text{${whole.value ? 'stable' : 'not stable'}}`];
  return conditions.map((condition, i) => {
    const start = i === 0 ? 'stable if' : 'and';
    return `${ROOM}\\text{${start}}\\quad \\displaystyle ${conditionLatex(condition, writing)}`;
  });
}

/** The array itself: the powers of s at the left, rows with a special case marked at the right. */
function arrayLatex(array: RouthArray, writing: Writing): string {
  const columns = Math.max(1, ...array.rows.map(({ entries }) => entries.length));
  const rows = array.rows.map(({ power, entries, special }) => {
    const cells = entries.map((entry) => entryLatex(entry, writing));
    const padding = Array<string>(columns - cells.length).fill('');
    const mark = special === null ? '' : `\\;\\leftarrow\\text{ ${special}}`;
    return [powerLatex(power), ...cells, ...padding].join(' & ') + mark;
  });
  return `\\begin{array}{c|${'c'.repeat(columns)}} ${rowsLatex(rows)} \\end{array}`;
}

/** Characters of an exact number in an array; a longer one, such as a fraction of products, is rounded for reading. */
const LONGEST_NUMBER = 12;

function entryLatex(entry: Ratio, writing: Writing): string {
  const exact = asRational(entry);
  const isLong = exact !== null && formulaText(entry, writing).length > LONGEST_NUMBER;
  if (!isLong) return cellLatex(entry, writing);
  return `\\approx ${numberLatex(formatNumber(rationalToNumber(exact)))}`;
}

/** A formula in a cell: its fractions in full size, which LaTeX would set small there. */
function cellLatex(entry: Ratio, writing: Writing): string {
  const latex = formulaLatex(entry, writing);
  return latex.includes('\\frac') ? `\\displaystyle ${latex}` : latex;
}

/** Rows one below the other; one with fractions in full size needs more room below it. */
function rowsLatex(rows: readonly string[]): string {
  const separated = rows.slice(0, -1).map((row) => {
    return `${row} \\\\[${row.includes('\\frac') ? '10pt' : '3pt'}]`;
  });
  return [...separated, ...rows.slice(-1)].join(' ');
}

function powerLatex(power: number): string {
  return `s^{${power}}`;
}

/** A matrix as re-readable text, `rows(a, b | c, d)`; a 1 × 1 matrix is its entry. */
export function matrixText(rows: readonly (readonly Ratio[])[], writing: Writing): string {
  if (isSingle(rows)) return formulaText(rows[0][0], writing);
  const lines = rows.map((row) => row.map((entry) => formulaText(entry, writing)).join(', '));
  return `rows(${lines.join(' | ')})`;
}

/** The same matrix as {@link matrixText}, as LaTeX. */
export function matrixLatex(rows: readonly (readonly Ratio[])[], writing: Writing): string {
  if (isSingle(rows)) return formulaLatex(rows[0][0], writing);
  const lines = rows.map((row) => row.map((entry) => cellLatex(entry, writing)).join(' & '));
  return `\\begin{bmatrix} ${rowsLatex(lines)} \\end{bmatrix}`;
}

/** The entries of a matrix as re-readable formulas. */
export function matrixRows(rows: readonly (readonly Ratio[])[], writing: Writing): string[][] {
  return rows.map((row) => row.map((entry) => formulaText(entry, writing)));
}

function isSingle(rows: readonly (readonly Ratio[])[]): boolean {
  return rows.length === 1 && rows[0].length === 1;
}
