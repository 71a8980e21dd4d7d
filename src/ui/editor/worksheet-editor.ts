import { isolateHistory } from '@codemirror/commands';
import { Compartment, EditorSelection, EditorState, type Text } from '@codemirror/state';
import { EditorView, highlightSpecialChars, placeholder } from '@codemirror/view';
import type { VocabularyWord } from '../../engine/index.ts';
import { completing, setVocabulary } from './completion.ts';
import { editorKeys, enterFromReading } from './editor-keys.ts';
import { fileText, keepEndings } from './endings-field.ts';
import { functionHelp } from './function-help.ts';
import { headingsOf } from './headings.ts';
import { highlighting } from './highlighting.ts';
import { splitText } from './line-endings.ts';
import { NumberDrag, writeNumbers } from './number-drag.ts';
import { references } from './references-field.ts';
import { resultsField } from './results-field.ts';
import { revealing } from './revealed.ts';
import { isCurrent, sheetKeeping, showSheet, type Sheet } from './sheet-field.ts';
import { typesetting } from './typesetting.ts';
import { worksheetLanguage } from './worksheet-language.ts';

/** What an empty worksheet says. */
const BEGINNING =
  'An empty worksheet. Begin with a title, as in “# Tank level”. Prose is Markdown; statements stand in a cell: a line ```loop, the statements, a line ```.';

export interface EditorEvents {
  /** The text changed; `text` is as edited, with `\n` between lines. */
  readonly onChange: (text: string) => void;
  readonly onSave: () => void;
  /** The cursor is at a place, or nowhere while the text is only read. */
  readonly onPlace: (place: number | null) => void;
}

/** The one document of the page: the worksheet's text, typeset, with its results in it. */
export class WorksheetEditor {
  private readonly view: EditorView;
  private readonly writing = new Compartment();
  private vocabulary: readonly VocabularyWord[] = [];
  /** The document as it was opened or saved last. */
  private savedDoc: Text;

  constructor(
    parent: HTMLElement,
    private readonly events: EditorEvents,
  ) {
    this.view = new EditorView({ parent, state: this.stateOf('') });
    this.savedDoc = this.view.state.doc;
    const { scrollDOM } = this.view;
    scrollDOM.setAttribute('role', 'region');
    scrollDOM.setAttribute('aria-label', 'Worksheet');
    enterFromReading(this.view);
  }

  /** The text of the file as it would be saved now, byte for byte where it was not edited. */
  get fileText(): string {
    return fileText(this.view.state);
  }

  /** The text as edited, that reports are about. */
  get text(): string {
    return this.view.state.doc.toString();
  }

  get edited(): boolean {
    return !this.view.state.doc.eq(this.savedDoc);
  }

  get headings() {
    return headingsOf(this.view.state);
  }

  /** Opens a file's text, forgetting the one before with its history. `keepPlace` stays where the reader was. */
  open(text: string, keepPlace = false): void {
    const { scrollTop } = this.view.scrollDOM;
    const { head } = this.view.state.selection.main;
    this.view.setState(this.stateOf(text, keepPlace ? head : 0));
    this.setVocabulary(this.vocabulary);
    this.savedDoc = this.view.state.doc;
    this.view.scrollDOM.scrollTop = keepPlace ? scrollTop : 0;
  }

  /** Replaces the whole text as an edit that can be undone. */
  replace(text: string): void {
    const { plain } = splitText(text);
    this.view.dispatch({
      changes: { from: 0, to: this.view.state.doc.length, insert: plain },
      // A step of its own, however soon after the last key it comes.
      annotations: isolateHistory.of('full'),
    });
  }

  /** Takes a text that was saved as the one that edits are counted from. */
  markSaved(text: string): void {
    const { plain } = splitText(text);
    const now = this.view.state.doc;
    this.savedDoc = now.toString() === plain ? now : this.view.state.toText(plain);
  }

  /** Shows a report that is of the text as it stands. */
  show(sheet: Sheet): void {
    this.view.dispatch({ effects: showSheet.of(sheet) });
  }

  /** Whether results are being recomputed: they are greyed until then. */
  setComputing(computing: boolean): void {
    this.view.dom.classList.toggle('computing', computing);
  }

  setReadOnly(readOnly: boolean): void {
    if (this.view.state.readOnly === readOnly) return;
    this.view.dispatch({ effects: this.writing.reconfigure(EditorState.readOnly.of(readOnly)) });
  }

  setVocabulary(entries: readonly VocabularyWord[]): void {
    this.vocabulary = entries;
    this.view.dispatch({ effects: setVocabulary.of(entries) });
  }

  /** Scrolls to a place; with `edit`, puts the cursor there. */
  goTo(place: number, edit: boolean): void {
    const at = Math.min(place, this.view.state.doc.length);
    this.view.dispatch({
      selection: EditorSelection.cursor(at),
      effects: EditorView.scrollIntoView(at, { y: 'start', yMargin: 48 }),
    });
    if (edit) this.view.focus();
    else this.view.scrollDOM.focus({ preventScroll: true });
  }

  /** Writes the number of an assumption into the text, as one undo step. */
  writeNumber(name: string, text: string): void {
    writeNumbers(this.view, new Map([[name, text]]));
  }

  /** Begins to drag numbers of assumptions: all until its end is one undo step. */
  dragNumbers(names: readonly string[]): NumberDrag {
    return new NumberDrag(this.view, names);
  }

  get isCurrent(): boolean {
    return isCurrent(this.view.state);
  }

  close(): void {
    this.view.destroy();
  }

  private stateOf(text: string, cursor = 0): EditorState {
    const split = splitText(text);
    return EditorState.create({
      doc: split.plain,
      selection: EditorSelection.cursor(Math.min(cursor, split.plain.length)),
      extensions: [
        keepEndings(split),
        EditorState.lineSeparator.of('\n'),
        this.writing.of([]),
        worksheetLanguage,
        highlighting,
        highlightSpecialChars(),
        EditorView.lineWrapping,
        placeholder(BEGINNING),
        EditorView.contentAttributes.of({ 'aria-label': 'Worksheet text', spellcheck: 'false' }),
        revealing,
        sheetKeeping,
        typesetting,
        references,
        resultsField,
        completing,
        functionHelp,
        editorKeys(this.events.onSave),
        EditorView.updateListener.of((update) => {
          if (update.docChanged) this.events.onChange(this.text);
          if (update.selectionSet || update.focusChanged || update.docChanged) {
            const { hasFocus, state } = update.view;
            this.events.onPlace(hasFocus ? state.selection.main.head : null);
          }
        }),
      ],
    });
  }
}
