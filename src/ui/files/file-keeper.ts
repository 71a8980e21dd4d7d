import { dropDraft, keepDraft, readDraft, type Draft, type DraftStorage } from './drafts.ts';
import { isFailure, type FileService, type StoredText } from './service.ts';

/** Where an open worksheet stands between the editor and the disk. */
export interface FileState {
  readonly name: string;
  readonly phase: 'loading' | 'open' | 'failed';
  /** Hash of the file that the edits are based on; null before it was read, and of a file that was removed. */
  readonly hash: string | null;
  readonly edited: boolean;
  readonly saving: boolean;
  /** Why the file could not be read or saved; null if it could. */
  readonly failure: string | null;
  /** The file on disk, where it changed while there are unsaved edits. */
  readonly conflict: StoredText | null;
  readonly removed: boolean;
  /** Unsaved text of an earlier visit, offered for restoring. */
  readonly draft: Draft | null;
}

/** The text being edited, as the keeper needs it. */
export interface TextHolder {
  readonly fileText: string;
  readonly edited: boolean;
  open(text: string, keepPlace: boolean): void;
  replace(text: string): void;
  markSaved(text: string): void;
}

export interface KeeperOptions {
  readonly service: FileService;
  readonly storage: DraftStorage;
  readonly holder: TextHolder;
  readonly onState: (state: FileState | null) => void;
}

const OPENED: Omit<FileState, 'name'> = {
  phase: 'loading',
  hash: null,
  edited: false,
  saving: false,
  failure: null,
  conflict: null,
  removed: false,
  draft: null,
};

/**
 * Keeps one worksheet: reads it, saves it, notices when it changed on disk, and keeps a draft of what is not saved. Nothing
 * that the user wrote, here or elsewhere, is overwritten without being asked for.
 */
export class FileKeeper {
  private current: FileState | null = null;

  constructor(private readonly options: KeeperOptions) {}

  get state(): FileState | null {
    return this.current;
  }

  /** Opens a worksheet in the place of the one before. */
  async open(name: string): Promise<void> {
    this.set({ ...OPENED, name });
    const answer = await this.options.service.read(name);
    if (this.current?.name !== name) return;
    if (isFailure(answer)) {
      this.patch({ phase: 'failed', failure: answer.message });
      return;
    }
    this.options.holder.open(answer.text, false);
    const draft = readDraft(this.options.storage, name);
    if (draft?.text === answer.text) dropDraft(this.options.storage, name);
    this.patch({
      phase: 'open',
      hash: answer.hash,
      draft: draft && draft.text !== answer.text ? draft : null,
    });
  }

  /** Notes that the text changed; the draft follows with {@link keepDraft}. */
  textChanged(): void {
    const { state } = this;
    if (state?.phase !== 'open') return;
    const { edited } = this.options.holder;
    if (edited !== state.edited) this.patch({ edited });
  }

  /** Brings the draft up to the text. */
  keepDraft(): void {
    const { state } = this;
    if (state?.phase !== 'open') return;
    const { holder, storage } = this.options;
    const { name, hash } = state;
    if (holder.edited) keepDraft(storage, name, { text: holder.fileText, baseHash: hash });
    else if (!state.draft) dropDraft(storage, name);
  }

  /** Saves over the file that the edits are based on; one that changed since is a conflict. */
  async save(): Promise<void> {
    const { state } = this;
    if (state?.phase !== 'open' || state.saving || state.conflict) return;
    await this.write(state.name, state.hash);
  }

  /** Settles a conflict with a text: it is saved in the place of the file on disk as it was shown. */
  async resolve(text: string): Promise<void> {
    const { state } = this;
    if (!state?.conflict) return;
    const { hash } = state.conflict;
    this.options.holder.replace(text);
    this.patch({ conflict: null, hash });
    await this.write(state.name, hash);
  }

  /** Settles a conflict by taking the file on disk; the edits stay in the undo history. */
  takeDisk(): void {
    const { state } = this;
    if (!state?.conflict) return;
    const { text, hash } = state.conflict;
    this.options.holder.replace(text);
    this.options.holder.markSaved(text);
    this.patch({ conflict: null, hash, edited: false });
    dropDraft(this.options.storage, state.name);
  }

  /** Puts the unsaved text of an earlier visit into the editor, or forgets it. */
  settleDraft(restore: boolean): void {
    const { state } = this;
    if (!state?.draft) return;
    const { text } = state.draft;
    this.patch({ draft: null });
    if (restore) this.options.holder.replace(text);
    else dropDraft(this.options.storage, state.name);
  }

  /** The file of this name has now this hash on disk. */
  async diskChanged(name: string, hash: string): Promise<void> {
    const { state } = this;
    if (state?.name !== name || state.phase === 'loading') return;
    if (state.saving || hash === state.hash || hash === state.conflict?.hash) return;
    const answer = await this.options.service.read(name);
    const now = this.state;
    if (now?.name !== name || isFailure(answer) || answer.hash === now.hash) return;
    if (now.phase === 'open' && now.edited) {
      if (answer.text === this.options.holder.fileText) this.saved(answer.text, answer.hash);
      else this.patch({ conflict: answer, removed: false });
      return;
    }
    this.options.holder.open(answer.text, now.phase === 'open');
    this.patch({ ...OPENED, phase: 'open', hash: answer.hash, draft: now.draft });
  }

  /** The file of this name is gone from the disk: the text stays, and saving makes the file anew. */
  diskRemoved(name: string): void {
    if (this.state?.name === name && this.state.phase === 'open') {
      this.patch({ removed: true, hash: null });
    }
  }

  private async write(name: string, baseHash: string | null): Promise<void> {
    const text = this.options.holder.fileText;
    this.patch({ saving: true, failure: null });
    const outcome = await this.options.service.save(name, text, baseHash);
    if (this.state?.name !== name) return;
    if (outcome.kind === 'saved') this.saved(text, outcome.hash);
    else if (outcome.kind === 'conflict') this.patch({ saving: false, conflict: outcome.disk });
    else this.patch({ saving: false, failure: outcome.message });
  }

  private saved(text: string, hash: string): void {
    const { holder, storage } = this.options;
    holder.markSaved(text);
    const { edited } = holder;
    const name = this.state?.name ?? '';
    if (edited) keepDraft(storage, name, { text: holder.fileText, baseHash: hash });
    else dropDraft(storage, name);
    this.patch({ saving: false, hash, edited, failure: null, conflict: null, removed: false });
  }

  private patch(change: Partial<FileState>): void {
    if (this.current) this.set({ ...this.current, ...change });
  }

  private set(state: FileState): void {
    this.current = Object.freeze(state);
    this.options.onState(this.current);
  }
}
