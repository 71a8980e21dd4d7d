import type { RequirementContent } from '../../engine/index.ts';
import type { Movement } from '../baseline.ts';
import { verdictClass, verdictShape, verdictWord } from '../verdicts.ts';
import { element } from './element.ts';
import { spoken } from './spoken.ts';
import { marginBarElement } from './margin-bar.ts';
import { withMinus } from './minus.ts';
import { movementElement, waitingLine } from './result-row.ts';

/** A verdict under its `require` statement: shape and word, and at the right edge the margin and its bar. */
export function requirementRow(
  content: RequirementContent,
  movement: Movement | null,
): HTMLElement {
  const row = element('div', 'result requirement');
  row.setAttribute('role', 'group');
  row.setAttribute('aria-label', `Requirement ${content.label ?? content.text}`);
  const figures = element('div', 'figures');
  // Without a limit what is shown is the verdict's word, which stands at the left.
  if (content.limit !== null) figures.append(element('span', 'value', withMinus(content.shown)));
  const bar = marginBarElement(content);
  if (bar) figures.append(bar);
  if (movement) figures.append(movementElement(movement));
  row.append(element('div', 'result-line', verdictElement(content), figures));
  if (content.waitsFor) row.append(waitingLine(content.waitsFor));
  row.append(...content.notes.map((note) => element('p', 'note', ...spoken(note))));
  return row;
}

function verdictElement(content: RequirementContent): HTMLElement {
  const made = element('span', `verdict verdict-${verdictClass(content.verdict)}`);
  made.innerHTML = verdictShape(content.verdict);
  made.append(verdictWord(content));
  return made;
}
