import { isolateHistory } from '@codemirror/commands';
import type { EditorView } from '@codemirror/view';
import type { Fix } from '../../base/index.ts';
import { isCurrent } from './sheet-field.ts';

/**
 * Applies a fix as one undo step. Its edits refer to the text of the newest report; where the text has changed since,
 * nothing is done, since the edits would land at the wrong place (the next report brings the fix again).
 */
export function applyFix(view: EditorView, fix: Fix): void {
  if (!isCurrent(view.state)) return;
  view.dispatch({
    changes: fix.edits.map(({ span, insert }) => ({ from: span.from, to: span.to, insert })),
    annotations: isolateHistory.of('full'),
    userEvent: 'input.fix',
    scrollIntoView: true,
  });
  view.focus();
}
