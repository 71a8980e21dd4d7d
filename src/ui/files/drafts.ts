/** Unsaved text of a worksheet, kept in the browser so that it survives a crash. */
export interface Draft {
  readonly text: string;
  /** Hash of the file that it was begun from; null for a new worksheet. */
  readonly baseHash: string | null;
}

/** The part of the browser's storage that drafts use. */
export type DraftStorage = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>;

const PREFIX = 'loopwright draft ';

/** The draft of a worksheet, or null if there is none or it cannot be read. */
export function readDraft(storage: DraftStorage, name: string): Draft | null {
  try {
    const draft = JSON.parse(storage.getItem(PREFIX + name) ?? 'null') as Partial<Draft> | null;
    if (typeof draft?.text !== 'string') return null;
    return {
      text: draft.text,
      baseHash: typeof draft.baseHash === 'string' ? draft.baseHash : null,
    };
  } catch {
    return null;
  }
}

/** Keeps a draft; false where the browser has no room for it. */
export function keepDraft(storage: DraftStorage, name: string, draft: Draft): boolean {
  try {
    storage.setItem(PREFIX + name, JSON.stringify(draft));
    return true;
  } catch {
    return false;
  }
}

/** Forgets the draft of a worksheet. */
export function dropDraft(storage: DraftStorage, name: string): void {
  storage.removeItem(PREFIX + name);
}
