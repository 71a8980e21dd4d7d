import {
  createClient,
  startEvaluator,
  type EvaluatorClient,
  type EvaluatorState,
} from '../worker/index.ts';
import type { Report } from '../engine/index.ts';
import type { Heading } from './outline.ts';
import { freshSheet, nextSheet, withBaseline } from './sheet-keeper.ts';
import type { Sheet } from './editor/sheet-field.ts';
import { WorksheetEditor } from './editor/worksheet-editor.ts';
import { FileKeeper, type FileState } from './files/file-keeper.ts';
import { createFileService, isFailure, type FileService, type Folder } from './files/service.ts';

/** Milliseconds after which results that are still being recomputed are greyed. */
const GREY_AFTER = 200;
/** Milliseconds after an edit in which the outline follows. */
const OUTLINE_WITHIN = 150;
/** Milliseconds after an edit in which its draft is kept. */
const DRAFT_WITHIN = 400;
const LAST_OPENED = 'loopwright last opened';

/** Everything that the page shows, and what can be done to it. Made once, when the column is on the page. */
export class Desk {
  folder = $state.raw<Folder | null>(null);
  folderFailure = $state.raw<string | null>(null);
  connected = $state(true);
  file = $state.raw<FileState | null>(null);
  sheet = $state.raw<Sheet>(freshSheet());
  /** Where the cursor is in the text; null while it is only read. */
  place = $state<number | null>(null);
  headings = $state.raw<readonly Heading[]>([]);
  evaluator = $state.raw<EvaluatorState>({ kind: 'current' });
  /** Whether the results shown are older than a moment: they are greyed. */
  late = $state(false);

  private readonly service: FileService = createFileService();
  private readonly editor: WorksheetEditor;
  private readonly keeper: FileKeeper;
  private readonly client: EvaluatorClient;
  private readonly stopListening: () => void;
  private outlining: ReturnType<typeof setTimeout> | null = null;
  private drafting: ReturnType<typeof setTimeout> | null = null;
  private greying: ReturnType<typeof setTimeout> | null = null;

  constructor(
    column: HTMLElement,
    private readonly onOpened: (name: string) => void,
  ) {
    this.editor = new WorksheetEditor(column, {
      onChange: (text) => this.textChanged(text),
      onSave: () => void this.save(),
      onPlace: (place) => (this.place = place),
    });
    this.client = createClient({
      startWorker: startEvaluator,
      onReport: (report) => this.reported(report),
      onState: (state) => this.evaluatorIs(state),
      onVocabulary: (words) => this.editor.setVocabulary(words),
    });
    this.keeper = new FileKeeper({
      service: this.service,
      storage: localStorage,
      holder: this.holder(),
      onState: (state) => this.fileIs(state),
    });
    this.stopListening = this.listen();
  }

  /** Lists the folder and opens the worksheet that is asked for, the one opened last, or the first. */
  async begin(asked: string | null): Promise<void> {
    await this.list();
    const names = this.folder?.worksheets.map(({ name }) => name) ?? [];
    const wanted = [asked, localStorage.getItem(LAST_OPENED)].find(
      (name) => name && names.includes(name),
    );
    const name = wanted ?? asked ?? names[0];
    if (name) await this.open(name);
  }

  async list(): Promise<void> {
    const answer = await this.service.list();
    if (isFailure(answer)) this.folderFailure = answer.message;
    else {
      this.folder = answer;
      this.folderFailure = null;
    }
  }

  async open(name: string): Promise<void> {
    localStorage.setItem(LAST_OPENED, name);
    this.keepDraft();
    this.onOpened(name);
    this.sheet = freshSheet();
    this.headings = [];
    await this.keeper.open(name);
  }

  /** Makes a worksheet with a title and opens it; returns why not if it cannot. */
  async create(title: string): Promise<string | null> {
    const words = title.trim().replace(/\.md$/u, '');
    const name = `${words
      .toLowerCase()
      .replace(/[^\p{L}\p{N}/]+/gu, '-')
      .replace(/^-+|-+$/gu, '')}.md`;
    if (name === '.md') return 'Give the worksheet a name.';
    const head = `# ${words}\n\n\`\`\`loop\n`;
    const outcome = await this.service.save(name, `${head}\n\`\`\`\n`, null);
    if (outcome.kind === 'conflict') return `There is a worksheet ${name} already.`;
    if (outcome.kind === 'failed') return outcome.message;
    await this.list();
    await this.open(name);
    this.goTo(head.length, true);
    return null;
  }

  async save(): Promise<void> {
    await this.keeper.save();
  }

  /** The unsaved text, for the view of a conflict. */
  get fileText(): string {
    return this.editor.fileText;
  }

  resolveConflict(text: string): Promise<void> {
    return this.keeper.resolve(text);
  }

  takeDisk(): void {
    this.keeper.takeDisk();
  }

  settleDraft(restore: boolean): void {
    this.keeper.settleDraft(restore);
  }

  pin(pinned: boolean): void {
    this.take(withBaseline(this.sheet, this.editor.text, pinned));
  }

  goTo(place: number, edit = false): void {
    this.editor.goTo(place, edit);
  }

  writeNumber(name: string, text: string): void {
    this.editor.writeNumber(name, text);
  }

  dragNumber(name: string) {
    return this.editor.dragNumbers([name]);
  }

  /** Keeps the unsaved text in the browser, now. */
  keepDraft(): void {
    if (this.drafting !== null) clearTimeout(this.drafting);
    this.drafting = null;
    this.keeper.keepDraft();
  }

  close(): void {
    if (this.outlining !== null) clearTimeout(this.outlining);
    this.keepDraft();
    this.stopListening();
    this.client.close();
    this.editor.close();
  }

  private holder() {
    const { editor } = this;
    const opened = (text: string, keepPlace: boolean) => {
      editor.open(text, keepPlace);
      if (!keepPlace) this.sheet = freshSheet();
      this.outline();
      this.client.update(editor.text, true);
    };
    return {
      get fileText() {
        return editor.fileText;
      },
      get edited() {
        return editor.edited;
      },
      open: opened,
      replace: (text: string) => editor.replace(text),
      markSaved: (text: string) => editor.markSaved(text),
    };
  }

  private textChanged(text: string): void {
    this.client.update(text);
    this.outlining ??= setTimeout(() => this.outline(), OUTLINE_WITHIN);
    this.keeper.textChanged();
    this.drafting ??= setTimeout(() => this.keepDraft(), DRAFT_WITHIN);
  }

  private reported(report: Report): void {
    // While another worksheet is being opened, the report of the one before is of no use any more.
    if (this.file?.phase === 'open') this.take(nextSheet(this.sheet, report, this.editor.text));
  }

  private outline(): void {
    if (this.outlining !== null) clearTimeout(this.outlining);
    this.outlining = null;
    const { headings, complete } = this.editor.headings;
    this.headings = headings;
    // A long worksheet is parsed bit by bit, so that typing does not wait for it.
    if (!complete) this.outlining = setTimeout(() => this.outline(), OUTLINE_WITHIN);
  }

  private take(sheet: Sheet): void {
    this.sheet = sheet;
    this.editor.show(sheet);
  }

  private evaluatorIs(state: EvaluatorState): void {
    this.evaluator = state;
    if (state.kind === 'computing') {
      this.greying ??= setTimeout(() => this.grey(true), GREY_AFTER);
      return;
    }
    if (this.greying !== null) clearTimeout(this.greying);
    this.greying = null;
    this.grey(state.kind !== 'current');
  }

  private grey(late: boolean): void {
    this.late = late;
    this.editor.setComputing(late);
  }

  private fileIs(state: FileState | null): void {
    this.file = state;
    this.editor.setReadOnly(state?.phase !== 'open' || state.conflict !== null);
  }

  private listen(): () => void {
    return this.service.listen({
      onChanged: (name, hash) => {
        void this.keeper.diskChanged(name, hash);
        void this.list();
      },
      onRemoved: (name) => {
        this.keeper.diskRemoved(name);
        void this.list();
      },
      onAdded: () => void this.list(),
      onConnection: (connected) => {
        if (connected && !this.connected) void this.reconnected();
        this.connected = connected;
      },
    });
  }

  /** After a time without the service: whatever changed meanwhile is noticed now. */
  private async reconnected(): Promise<void> {
    await this.list();
    const entry = this.folder?.worksheets.find(({ name }) => name === this.file?.name);
    if (entry) await this.keeper.diskChanged(entry.name, entry.hash);
  }
}
