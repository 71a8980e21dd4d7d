import type { Fix, Problem } from '../../base/index.ts';
import { element } from './element.ts';
import { spoken } from './spoken.ts';

/** A problem said under its statement, with its fixes as buttons. */
export function problemRow(problem: Problem, applyFix: (fix: Fix) => void): HTMLElement {
  const row = element('div', `problem problem-${problem.severity}`);
  const kind = problem.severity === 'error' ? 'Problem' : 'Note';
  row.setAttribute('role', 'group');
  row.setAttribute('aria-label', kind);
  row.append(element('span', 'problem-mark', problem.severity === 'error' ? '!' : '?'));
  row.append(element('span', 'problem-words', ...spoken(problem.message)));
  if (problem.fixes.length > 0) {
    row.append(element('span', 'fixes', ...problem.fixes.map((fix) => fixButton(fix, applyFix))));
  }
  return row;
}

function fixButton(fix: Fix, applyFix: (fix: Fix) => void): HTMLElement {
  const button = element('button', 'fix', ...spoken(fix.title));
  button.type = 'button';
  button.addEventListener('click', () => applyFix(fix));
  return button;
}
