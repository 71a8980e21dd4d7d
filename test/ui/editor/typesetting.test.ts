import { EditorState } from '@codemirror/state';
import type { Decoration } from '@codemirror/view';
import { ensureSyntaxTree, syntaxTree } from '@codemirror/language';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { revealedField, setFocused } from '../../../src/ui/editor/revealed.ts';
import { typesetBlocks } from '../../../src/ui/editor/typesetter.ts';
import { typesetting } from '../../../src/ui/editor/typesetting.ts';
import { worksheetLanguage } from '../../../src/ui/editor/worksheet-language.ts';

const SEED = 20261201;

function stateOf(doc: string): EditorState {
  const extensions = [worksheetLanguage, revealedField, typesetting];
  const state = EditorState.create({ doc, extensions });
  ensureSyntaxTree(state, state.doc.length, 1000);
  return state.update({}).state;
}

/** Decorations as text: place, class or widget, so that two sets can be compared. */
function shown(ranges: readonly { from: number; to: number; value: Decoration }[]): string[] {
  return ranges
    .map(({ from, to, value }) => {
      const { class: name, widget } = value.spec as { class?: string; widget?: object };
      return `${from}–${to} ${name ?? (widget ? JSON.stringify(widget) : 'hidden')}`;
    })
    .sort();
}

function held(state: EditorState): string[] {
  const ranges: { from: number; to: number; value: Decoration }[] = [];
  state.field(typesetting).between(0, state.doc.length, (from, to, value) => {
    ranges.push({ from, to, value });
  });
  return shown(ranges);
}

function fresh(state: EditorState): string[] {
  return shown(typesetBlocks(state, syntaxTree(state), 0, state.doc.length));
}

describe('typesetting', () => {
  it('leaves words in brackets that lead nowhere as they are', () => {
    const marked = (text: string) => held(stateOf(text));
    expect(marked('As in [1], in [rad/s].')).toEqual([]);
    expect(marked('As in [the report](report.md).')).toContainEqual(
      expect.stringMatching(/ link$/),
    );
  });

  it('hides the markup of prose, joins the lines of a paragraph, and sets cells apart', () => {
    const text = '# Drive\n\nA *b*\nc $x$.\n\n```loop\nJ is 3\n```\n';
    expect(held(stateOf(text))).toEqual(
      [
        '0–0 heading heading-1',
        '0–2 hidden',
        '8–8 blank',
        '11–14 emphasis',
        '11–12 hidden',
        '13–14 hidden',
        '14–15 {"className":"","text":" "}',
        '17–20 {"latex":"x","display":false}',
        '22–22 blank',
        '23–23 fence fence-open',
        '31–31 cell',
        '38–38 fence fence-close',
        '42–42 blank',
      ].sort(),
    );
  });

  it('shows the source of the paragraph that holds the cursor, and of no other', () => {
    const state = stateOf('A *b*\n\nC *d*\n');
    const focused = state.update({ effects: setFocused.of(true), selection: { anchor: 1 } }).state;
    expect(held(focused).filter((row) => row.includes('emphasis'))).toEqual(['9–12 emphasis']);
    const blurred = focused.update({ effects: setFocused.of(false) }).state;
    expect(held(blurred)).toEqual(held(state));
  });

  it('is after any edits and moves of the cursor what typesetting all of it anew gives', () => {
    const piece = fc.constantFrom(
      ...['# h\n', 'a *b*\n', '\n', '```loop\n', '```\n', 'J is 3\n', '* item\n', '  more\n'],
      ...['> quote\n', '---\n', '===\n', '$$\nx\n$$\n', 'c $y$ d', '1. n\n', '    code\n', '\\*'],
    );
    const edit = fc.record({
      at: fc.nat(),
      size: fc.nat(8),
      insert: fc.option(piece, { nil: '' }),
    });
    fc.assert(
      fc.property(
        fc.array(piece, { maxLength: 14 }),
        fc.array(edit, { maxLength: 6 }),
        (doc, edits) => {
          let state = stateOf(doc.join('')).update({ effects: setFocused.of(true) }).state;
          for (const { at, size, insert } of edits) {
            const from = at % (state.doc.length + 1);
            const to = Math.min(state.doc.length, from + size);
            state = state.update({
              changes: { from, to, insert },
              selection: { anchor: from },
            }).state;
            expect(held(state)).toEqual(fresh(state));
            state = state.update({
              selection: { anchor: (at * 7) % (state.doc.length + 1) },
            }).state;
            expect(held(state)).toEqual(fresh(state));
          }
        },
      ),
      { seed: SEED, numRuns: 400 },
    );
  });
});
