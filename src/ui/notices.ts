import type { EvaluatorState } from '../worker/index.ts';
import type { FileState } from './files/file-keeper.ts';

export type NoticeAction = 'restore draft' | 'forget draft' | 'save' | 'open again';

/** Something that the user should know about the page itself, with what can be done. */
export interface Notice {
  readonly words: string;
  readonly grave: boolean;
  readonly actions: readonly { readonly action: NoticeAction; readonly title: string }[];
}

/** The notices above the column, most pressing first. */
export function noticesOf(
  file: FileState | null,
  evaluator: EvaluatorState,
  connected: boolean,
): Notice[] {
  return [...connectionNotices(connected), ...fileNotices(file), ...evaluatorNotices(evaluator)];
}

function connectionNotices(connected: boolean): Notice[] {
  if (connected) return [];
  const words =
    'Offline: the worksheet service does not answer. You can go on; your edits are kept in this browser until it is back.';
  return [{ words, grave: true, actions: [] }];
}

function fileNotices(file: FileState | null): Notice[] {
  if (file === null) return [];
  const notices: Notice[] = [];
  if (file.failure !== null) {
    const again = { action: 'open again', title: 'Try again' } as const;
    const save = { action: 'save', title: 'Save again' } as const;
    const actions = [file.phase === 'failed' ? again : save];
    notices.push({ words: file.failure, grave: true, actions });
  }
  if (file.removed) {
    const words = `${file.name} is no longer on disk. Its text is still here; saving makes the file anew.`;
    notices.push({ words, grave: true, actions: [{ action: 'save', title: 'Save' }] });
  }
  if (file.draft) {
    const words = 'There are unsaved edits of this worksheet from an earlier visit.';
    const actions = [
      { action: 'restore draft', title: 'Restore them' },
      { action: 'forget draft', title: 'Forget them' },
    ] as const;
    notices.push({ words, grave: false, actions });
  }
  return notices;
}

function evaluatorNotices(evaluator: EvaluatorState): Notice[] {
  if (evaluator.kind === 'stopped') {
    const words = `The evaluation took longer than ${evaluator.seconds} s and was stopped. The results below are of an earlier text. Change the text to try again.`;
    return [{ words, grave: true, actions: [] }];
  }
  if (evaluator.kind === 'failed') {
    const words = `The evaluation failed, and that is our fault, not your worksheet's: ${evaluator.message}. Your text is safe. Change it to try again.`;
    return [{ words, grave: true, actions: [] }];
  }
  return [];
}
