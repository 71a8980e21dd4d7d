import type { FileState } from './files/file-keeper.ts';

/** What the title bar says about the file, and whether there is something to save. */
export interface SavedState {
  readonly words: string;
  readonly savable: boolean;
}

/** The saved state of the open worksheet in words. */
export function savedState(file: FileState | null): SavedState {
  if (file === null) return { words: '', savable: false };
  if (file.phase === 'loading') return { words: 'opening …', savable: false };
  if (file.phase === 'failed') return { words: 'not opened', savable: false };
  if (file.conflict) return { words: 'changed on disk', savable: false };
  if (file.saving) return { words: 'saving …', savable: false };
  if (file.removed) return { words: 'no longer on disk', savable: true };
  return file.edited
    ? { words: 'unsaved edits', savable: true }
    : { words: 'saved', savable: false };
}
