import { history, historyKeymap, defaultKeymap } from '@codemirror/commands';
import { MergeView } from '@codemirror/merge';
import { EditorState, type Extension } from '@codemirror/state';
import { EditorView, keymap } from '@codemirror/view';
import { fileText, keepEndings } from './endings-field.ts';
import { splitText } from './line-endings.ts';

/** Two texts side by side, the right one editable. */
export interface ComparisonView {
  /** The right text as it stands, with its own line endings. */
  readonly text: string;
  close(): void;
}

/** Shows the file on disk at the left and the unsaved text at the right, with what differs marked. */
export function compareTexts(parent: HTMLElement, disk: string, mine: string): ComparisonView {
  const view = new MergeView({
    parent,
    a: side(disk, 'On disk', [EditorState.readOnly.of(true), EditorView.editable.of(false)]),
    b: side(mine, 'Yours', [history(), keymap.of([...historyKeymap, ...defaultKeymap])]),
    revertControls: 'a-to-b',
    gutter: true,
    collapseUnchanged: { margin: 3, minSize: 6 },
  });
  return {
    get text() {
      return fileText(view.b.state);
    },
    close: () => view.destroy(),
  };
}

function side(text: string, label: string, more: Extension) {
  const split = splitText(text);
  return {
    doc: split.plain,
    extensions: [
      keepEndings(split),
      EditorView.lineWrapping,
      EditorView.contentAttributes.of({ 'aria-label': label }),
      more,
    ],
  };
}
