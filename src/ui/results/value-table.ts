import type { ResultContent } from '../../engine/index.ts';
import { element } from './element.ts';
import { scrollable } from './scrollable.ts';

interface PlainTable {
  readonly columns: readonly string[];
  readonly rows: readonly (readonly unknown[])[];
}

/** A result of kind `table` as a table; null for others or where its parts hold none. */
export function resultTable(content: ResultContent): HTMLElement | null {
  if (content.kind !== 'table' || !isPlainTable(content.parts)) return null;
  return tableElement(content.parts);
}

/** A table of texts and numbers, with its columns' heads. */
export function tableElement({ columns, rows }: PlainTable): HTMLElement {
  const head = element('tr', '', ...columns.map((column) => headCell(column)));
  const body = rows.map((cells) =>
    element('tr', '', ...cells.map((cell) => element('td', '', cellText(cell)))),
  );
  const table = element('table', 'values', element('thead', '', head));
  table.append(element('tbody', '', ...body));
  return scrollable(element('div', 'table-frame', table), 'Table');
}

function headCell(text: string): HTMLElement {
  const made = element('th', '', text);
  made.scope = 'col';
  return made;
}

function cellText(cell: unknown): string {
  if (typeof cell === 'number') return String(Number(cell.toPrecision(4))).replace(/^-/u, '−');
  return cell === null || cell === undefined ? '–' : String(cell);
}

function isPlainTable(parts: unknown): parts is PlainTable {
  const table = parts as Partial<PlainTable> | null;
  return Array.isArray(table?.columns) && Array.isArray(table?.rows);
}
