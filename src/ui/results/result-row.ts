import type { ResultContent } from '../../engine/index.ts';
import type { Movement } from '../baseline.ts';
import { element } from './element.ts';
import { withMinus } from './minus.ts';
import { scrollable } from './scrollable.ts';
import { spoken } from './spoken.ts';
import { typeset } from './mathematics.ts';
import { resultTable } from './value-table.ts';

/** Whether a result has anything to show under its statement. */
export function isShown(content: ResultContent, movement: Movement | null): boolean {
  return (
    movement !== null ||
    (content.state === 'error' && content.waitsFor !== null) ||
    (content.kind !== 'figure' && (content.state === 'ready' || content.notes.length > 0))
  );
}

/** A result under its statement: the formula, typeset, and at the column's right edge the value and the span. */
export function resultRow(content: ResultContent, movement: Movement | null): HTMLElement {
  const row = element('div', `result result-${content.kind}`);
  row.setAttribute('role', 'group');
  row.setAttribute('aria-label', `Result ${content.name ?? ''}`.trim());
  if (content.waitsFor && content.state === 'error') row.append(waitingLine(content.waitsFor));
  else row.append(mainLine(content, movement));
  const table = resultTable(content);
  if (table) row.append(table);
  row.append(...content.notes.map((note) => element('p', 'note', ...spoken(note))));
  return row;
}

/** "waits for K_p (line 12)": the line that shows where a dependent's fault lies. */
export function waitingLine(waitsFor: { readonly name: string; readonly line: number }) {
  return element('p', 'waiting', `waits for ${waitsFor.name}, line ${waitsFor.line}`);
}

function mainLine(content: ResultContent, movement: Movement | null): HTMLElement {
  const line = element('div', 'result-line');
  const formula = scrollable(element('div', 'formula'), 'Formula');
  if (content.state === 'ready' && content.latex) formula.append(formulaElement(content));
  line.append(formula, figures(content, movement));
  return line;
}

function formulaElement({ nameLatex, latex, formula, kind }: ResultContent): HTMLElement {
  if (nameLatex === null) return typeset(latex ?? '', 'result');
  // What is no formula of its own but a relation, a list of them or words does not equal its name.
  const isEqual = formula !== null && FORMULAS.has(kind) && !/^s(=|\\approx)/u.test(latex ?? '');
  return typeset(`${nameLatex}${isEqual ? ' = ' : '\\colon\\quad '}${latex}`, 'result');
}

const FORMULAS: ReadonlySet<ResultContent['kind']> = new Set(['value', 'transfer', 'polynomial']);

function figures(content: ResultContent, movement: Movement | null): HTMLElement {
  const made = element('div', 'figures');
  if (content.shown !== null && content.state === 'ready') {
    made.append(element('span', 'value', withMinus(content.shown)));
  }
  if (content.span && content.span.low !== content.span.high) {
    const { shown, how, n } = content.span;
    const found = how === 'sampled' ? `sampled, n = ${n ?? '?'}` : how;
    made.append(element('span', 'span', withMinus(shown), element('span', 'how', found)));
  }
  if (movement) made.append(movementElement(movement));
  return made;
}

/** "was 0.31 mrad, × 1.07". */
export function movementElement({ was, by }: Movement): HTMLElement {
  return element('span', 'was', withMinus(was), by === null ? null : element('span', 'by', by));
}
