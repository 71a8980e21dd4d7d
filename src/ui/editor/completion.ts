import {
  autocompletion,
  type Completion,
  type CompletionContext,
  type CompletionResult,
} from '@codemirror/autocomplete';
import { StateEffect, StateField, type EditorState, type Extension } from '@codemirror/state';
import { isInCell } from './cells.ts';
import type { VocabularyWord } from '../../engine/index.ts';
import { sheetOf } from './sheet-field.ts';

/** Gives the editor the functions that the evaluator knows. */
export const setVocabulary = StateEffect.define<readonly VocabularyWord[]>();

const vocabularyField = StateField.define<readonly VocabularyWord[]>({
  create: () => [],
  update(entries, transaction) {
    return transaction.effects.find((effect) => effect.is(setVocabulary))?.value ?? entries;
  },
});

const STATEMENT_WORDS = [
  'loop',
  'case',
  'require',
  'draw',
  'tune',
  'unit',
  'points',
  'explain',
  'tabulate',
];
const LINE_WORDS =
  'is are has from to driven by uses as of starts at after over for in with where titled and or not positive negative nonnegative real'.split(
    ' ',
  );
const DRAW_WORDS = ['region', 'response'];

/** Completion of names, words and functions in cells, and of names in `{…}` in prose. */
export const completing: Extension = [
  vocabularyField,
  autocompletion({ override: [complete], icons: false, activateOnTyping: true }),
];

/** The entry of a function, for help on it. */
export function vocabularyWord(state: EditorState, name: string): VocabularyWord | null {
  return state.field(vocabularyField).find((entry) => entry.name === name) ?? null;
}

function complete(context: CompletionContext): CompletionResult | null {
  const word = context.matchBefore(/[\p{L}_][\p{L}\p{N}_]*/u);
  if (!word && !context.explicit) return null;
  const from = word?.from ?? context.pos;
  const { state } = context;
  if (!isInCell(state, from)) {
    const opened = state.sliceDoc(Math.max(0, from - 1), from) === '{';
    return opened ? { from, options: nameOptions(state) } : null;
  }
  const before = state.sliceDoc(state.doc.lineAt(from).from, from);
  if (before.includes('#')) return null;
  return { from, options: optionsAfter(state, before), validFor: /^[\p{L}\p{N}_]*$/u };
}

function optionsAfter(state: EditorState, before: string): Completion[] {
  if (/^\s*draw\s+$/u.test(before)) return DRAW_WORDS.map(wordOption);
  const words = before.trim() === '' ? [...STATEMENT_WORDS, ...LINE_WORDS] : LINE_WORDS;
  return [...nameOptions(state), ...functionOptions(state), ...words.map(wordOption)];
}

function nameOptions(state: EditorState): Completion[] {
  const { report } = sheetOf(state);
  if (!report) return [];
  const options = new Map<string, Completion>();
  for (const { content } of report.assumptions) {
    const { name, valueText, description } = content;
    options.set(name, { label: name, detail: valueText, info: description ?? undefined, boost: 2 });
  }
  for (const { content } of report.results) {
    const { name, shown } = content;
    if (name !== null) options.set(name, { label: name, detail: shown ?? undefined, boost: 2 });
  }
  for (const { content } of report.loops) {
    options.set(content.name, { label: content.name, detail: 'loop', boost: 2 });
    for (const signal of [...content.inputs, ...content.unknowns]) {
      if (!options.has(signal)) options.set(signal, { label: signal, detail: 'signal', boost: 1 });
    }
  }
  return [...options.values()];
}

function functionOptions(state: EditorState): Completion[] {
  return state.field(vocabularyField).map(({ name, signature, help }) => ({
    label: name,
    detail: signature,
    info: help,
    type: 'function',
  }));
}

function wordOption(label: string): Completion {
  return { label, type: 'keyword' };
}
