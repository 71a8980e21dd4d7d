import { beforeEach, describe, expect, it } from 'vitest';
import { FileKeeper, type FileState } from '../../../src/ui/files/file-keeper.ts';
import type { FileService, SaveOutcome } from '../../../src/ui/files/service.ts';
import { noticesOf } from '../../../src/ui/notices.ts';
import { savedState } from '../../../src/ui/saved-state.ts';

/** A disk with one hash a text, as the service would show it. */
class StandInDisk implements FileService {
  readonly files = new Map<string, string>();
  offline = false;

  hashOf(name: string): string {
    return `hash of ${this.files.get(name)}`;
  }

  async list() {
    return { folder: 'worksheets', worksheets: [] };
  }

  async read(name: string) {
    const text = this.files.get(name);
    return text === undefined ? failure('not there') : { text, hash: this.hashOf(name) };
  }

  async save(name: string, text: string, baseHash: string | null): Promise<SaveOutcome> {
    if (this.offline) return failure('offline');
    const disk = this.files.get(name);
    const hash = disk === undefined ? null : this.hashOf(name);
    if (hash !== baseHash)
      return { kind: 'conflict', disk: { text: disk ?? '', hash: hash ?? '' } };
    this.files.set(name, text);
    return { kind: 'saved', hash: this.hashOf(name) };
  }

  listen() {
    return () => {};
  }
}

function failure(message: string) {
  return { kind: 'failed', message, offline: false } as const;
}

class StandInEditor {
  fileText = '';
  private savedText = '';

  get edited() {
    return this.fileText !== this.savedText;
  }

  open(text: string) {
    this.fileText = this.savedText = text;
  }

  replace(text: string) {
    this.fileText = text;
  }

  markSaved(text: string) {
    this.savedText = text;
  }
}

class StandInStorage {
  readonly items = new Map<string, string>();
  getItem = (key: string) => this.items.get(key) ?? null;
  setItem = (key: string, value: string) => void this.items.set(key, value);
  removeItem = (key: string) => void this.items.delete(key);
}

describe('keeping a worksheet', () => {
  let disk: StandInDisk;
  let editor: StandInEditor;
  let storage: StandInStorage;
  let keeper: FileKeeper;
  let state: FileState | null;

  const start = () => {
    editor = new StandInEditor();
    keeper = new FileKeeper({
      service: disk,
      storage,
      holder: editor,
      onState: (next) => (state = next),
    });
  };
  const type = (text: string) => {
    editor.fileText = text;
    keeper.textChanged();
    keeper.keepDraft();
  };
  const changeOnDisk = (text: string) => {
    disk.files.set('a.md', text);
    return keeper.diskChanged('a.md', disk.hashOf('a.md'));
  };

  beforeEach(async () => {
    disk = new StandInDisk();
    disk.files.set('a.md', 'one');
    storage = new StandInStorage();
    state = null;
    start();
    await keeper.open('a.md');
  });

  it('opens a worksheet as saved', () => {
    expect(editor.fileText).toBe('one');
    expect(savedState(state)).toEqual({ words: 'saved', savable: false });
  });

  it('says that there are unsaved edits until they are saved', async () => {
    type('two');
    expect(savedState(state)).toEqual({ words: 'unsaved edits', savable: true });
    await keeper.save();
    expect(disk.files.get('a.md')).toBe('two');
    expect(savedState(state).words).toBe('saved');
  });

  it('reloads a file that changed on disk while there were no unsaved edits', async () => {
    await changeOnDisk('elsewhere');
    expect(editor.fileText).toBe('elsewhere');
    expect(savedState(state).words).toBe('saved');
  });

  it('shows both texts where the file changed on disk under unsaved edits, and overwrites neither', async () => {
    type('mine');
    await changeOnDisk('theirs');
    expect(state?.conflict?.text).toBe('theirs');
    await keeper.save();
    expect([editor.fileText, disk.files.get('a.md')]).toEqual(['mine', 'theirs']);
  });

  it('finds out at saving that the file changed where nothing was heard of it', async () => {
    disk.files.set('a.md', 'theirs');
    type('mine');
    await keeper.save();
    expect(state?.conflict?.text).toBe('theirs');
    expect(disk.files.get('a.md')).toBe('theirs');
  });

  it('settles a conflict by saving the text chosen', async () => {
    type('mine');
    await changeOnDisk('theirs');
    await keeper.resolve('both');
    expect([editor.fileText, disk.files.get('a.md')]).toEqual(['both', 'both']);
    expect(savedState(state).words).toBe('saved');
  });

  it('settles a conflict by taking the file on disk', async () => {
    type('mine');
    await changeOnDisk('theirs');
    keeper.takeDisk();
    expect(editor.fileText).toBe('theirs');
    expect(savedState(state).words).toBe('saved');
  });

  it('sees no conflict where the file on disk is what was typed', async () => {
    type('same');
    await changeOnDisk('same');
    expect(state?.conflict).toBeNull();
    expect(savedState(state).words).toBe('saved');
  });

  it('keeps unsaved text over a crash and offers it, without touching the file', async () => {
    type('two');
    start();
    await keeper.open('a.md');
    expect(editor.fileText).toBe('one');
    expect(noticesOf(state, { kind: 'current' }, true).map(({ words }) => words)).toEqual([
      'There are unsaved edits of this worksheet from an earlier visit.',
    ]);
    keeper.settleDraft(true);
    expect([editor.fileText, disk.files.get('a.md')]).toEqual(['two', 'one']);
  });

  it('offers no draft of what was saved, nor one that was declined', async () => {
    type('two');
    await keeper.save();
    expect(storage.items.size).toBe(0);
    type('three');
    start();
    await keeper.open('a.md');
    keeper.settleDraft(false);
    expect(storage.items.size).toBe(0);
  });

  it('says why saving failed, and keeps the edits', async () => {
    disk.offline = true;
    type('two');
    await keeper.save();
    expect(state).toMatchObject({ failure: 'offline', saving: false, edited: true });
    disk.offline = false;
    await keeper.save();
    expect(state).toMatchObject({ failure: null, edited: false });
  });

  it('keeps the text of a file that was removed, and saves it anew', async () => {
    disk.files.delete('a.md');
    keeper.diskRemoved('a.md');
    expect(savedState(state)).toEqual({ words: 'no longer on disk', savable: true });
    await keeper.save();
    expect(disk.files.get('a.md')).toBe('one');
    expect(savedState(state).words).toBe('saved');
  });

  it('says that a file could not be opened', async () => {
    await keeper.open('b.md');
    expect(state).toMatchObject({ phase: 'failed', failure: 'not there' });
    expect(savedState(state)).toEqual({ words: 'not opened', savable: false });
  });

  it('drops the answer for a worksheet that was left meanwhile', async () => {
    disk.files.set('b.md', 'b');
    const slow = keeper.open('b.md');
    await keeper.open('a.md');
    await slow;
    expect([state?.name, editor.fileText]).toEqual(['a.md', 'one']);
  });
});
