import { history, undo } from '@codemirror/commands';
import { EditorState } from '@codemirror/state';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fileText, keepEndings } from '../../../src/ui/editor/endings-field.ts';
import { joinText, splitText } from '../../../src/ui/editor/line-endings.ts';

const SEED = 20261201;

function stateOf(text: string): EditorState {
  const split = splitText(text);
  return EditorState.create({ doc: split.plain, extensions: [history(), keepEndings(split)] });
}

function edited(state: EditorState, from: number, to: number, insert = ''): EditorState {
  return state.update({ changes: { from, to, insert } }).state;
}

describe('line endings', () => {
  it('come back as they were for any text', () => {
    const piece = fc.constantFrom('a', '\n', '\r\n', '\r', '\uFEFF', 'θ', ' ');
    const text = fc.array(piece).map((pieces) => pieces.join(''));
    fc.assert(
      fc.property(text, (typed) => joinText(splitText(typed)) === typed),
      { seed: SEED },
    );
  });

  it('survive edits beside them, and a new line gets the usual ending', () => {
    const state = stateOf('one\r\ntwo\nthree\r\nfour');
    expect(fileText(edited(state, 0, 0, 'zero\n'))).toBe('zero\r\none\r\ntwo\nthree\r\nfour');
    expect(fileText(edited(state, 7, 8, ' '))).toBe('one\r\ntwo three\r\nfour');
  });

  it('come back when a change that joined two lines is undone', () => {
    const text = 'one\r\ntwo\nthree\r\nfour';
    let state = edited(stateOf(text), 7, 8, ' ');
    undo({ state, dispatch: (transaction) => (state = transaction.state) });
    expect(fileText(state)).toBe(text);
  });

  it('keep a byte order mark', () => {
    expect(fileText(edited(stateOf('\uFEFFa\n'), 1, 1, 'b'))).toBe('\uFEFFab\n');
  });
});
